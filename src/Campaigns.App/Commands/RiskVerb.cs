using System.CommandLine;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>risk: the cumulative false-positive risk.</summary>
internal sealed class RiskVerb : Verb
{
    private readonly Argument<string?> _code = new("CODE") { Description = "The campaign; without it, all campaigns of the catalog.", Arity = ArgumentArity.ZeroOrOne };

    public override Command Build() => new("risk", Describe("What many tests at once risk: false positives without correction if nothing is real, and what the correction holds.",
        "risk PRIMERS"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        string? code = session.Typed.GetValue(_code);
        var campaigns = new CampaignStore(catalog);
        IReadOnlyList<StoredCampaign> chosen = code is null ? campaigns.All() : [campaigns.Get(code)];
        var overview = new OverviewReader(catalog);
        CampaignOverview[] rows = [.. chosen.Select(overview.Read)];
        session.Print(RiskTable.Of(rows, withTotal: code is null));
        return ExitCode.Done;
    }
}
