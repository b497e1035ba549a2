using System.CommandLine;
using Campaigns.App.Dashboard;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>dashboard: the text-mode dashboard.</summary>
internal sealed class DashboardVerb : Verb
{
    private readonly Argument<string?> _code = new("CODE") { Description = "The campaign; may be left out where the catalog holds one.", Arity = ArgumentArity.ZeroOrOne };
    private readonly Option<bool> _ascii = new("--ascii") { Description = "Draw with ASCII signs alone." };

    public override Command Build() => new("dashboard", Describe("The text-mode dashboard of a campaign; F1 shows its keys.", "dashboard PRIMERS"))
    {
        _code, _ascii,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        string code = session.Typed.GetValue(_code) ?? OnlyCampaign(catalog);
        return DashboardProgram.Run(new CatalogSource(catalog), code, session.Get(_ascii), session.Desk);
    }

    private static string OnlyCampaign(Catalog.Catalog catalog)
    {
        string[] codes = [.. new Campaigns.Catalog.Plans.CampaignStore(catalog).All().Select(c => c.Campaign.Code)];
        return codes switch
        {
            [string only] => only,
            [] => throw new RefusedException("The catalog holds no campaigns yet; 'campaigns start CODE' opens one."),
            _ => throw new UsageException($"Which campaign? The catalog holds {string.Join(", ", codes)}."),
        };
    }
}
