using System.CommandLine;
using Campaigns.App.Dashboard;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>dashboard: the text-mode dashboard.</summary>
internal sealed class DashboardVerb : Verb
{
    private readonly Argument<string?> _code = new("CODE") { Description = "The campaign; without it, where the catalog holds several, the programme is shown first.", Arity = ArgumentArity.ZeroOrOne };
    private readonly Option<bool> _ascii = new("--ascii") { Description = "Draw with ASCII signs alone." };

    public override Command Build() => new("dashboard", Describe("The text-mode dashboard of a campaign; F1 shows its keys.", "dashboard PRIMERS"))
    {
        _code, _ascii,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        (string code, string page) = Opening(catalog, session.Typed.GetValue(_code));
        return DashboardProgram.Run(new CatalogSource(catalog), code, page, session.Get(_ascii), session.Desk);
    }

    /// <summary>The campaign that is opened first and the page that is shown first: what was asked for, or of several campaigns the programme, the one opened last at hand.</summary>
    internal static (string Campaign, string Page) Opening(Catalog.Catalog catalog, string? asked)
    {
        const string one = "Experiments", all = "Programme";
        if (asked is not null)
        {
            return (asked, one);
        }

        string[] codes = [.. new Campaigns.Catalog.Plans.CampaignStore(catalog).All().Select(c => c.Campaign.Code)];
        return codes switch
        {
            [string only] => (only, one),
            [] => throw new RefusedException("The catalog holds no campaigns yet; 'campaigns start CODE' opens one."),
            _ => (codes[^1], all),
        };
    }
}
