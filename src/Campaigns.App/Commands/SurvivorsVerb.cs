using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>survivors: the experiments that survive, with effect.</summary>
internal sealed class SurvivorsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("survivors", Describe("The experiments that survive the campaign's correction, the smallest adjusted p first, with the widest gap between group means in its unit.",
        "survivors PRIMERS"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        session.Print(Table(catalog, session.Get(_code), int.MaxValue).Rows);
        return ExitCode.Done;
    }

    /// <summary>The survivors, ranked by p.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="code">The campaign.</param>
    /// <param name="most">Survivors to list.</param>
    public static (RowTable Rows, CampaignOverview Overview) Table(Catalog.Catalog catalog, string code, int most)
    {
        (CampaignOverview overview, IReadOnlyList<ExperimentResult> listed) = new OverviewReader(catalog).ReadSurvivors(code, most);
        IReadOnlyDictionary<string, WidestGap> gaps = new EffectReader(catalog).WidestGaps(code, listed.Select(e => e.Plan.Code));
        string more = listed.Count < overview.SurvivorCount
            ? FormattableString.Invariant($" The first {listed.Count} of {overview.SurvivorCount} are shown; 'campaigns survivors {code}' gives all.")
            : "";
        var rows = new RowTable(Columns, listed.Select(e => Row(e, gaps.GetValueOrDefault(e.Plan.Code))))
        {
            Above = [FormattableString.Invariant($"{code}: {overview.SurvivorCount} of {overview.TestedCount} tested experiments survive ({CampaignText.Goal(overview.Campaign)}).{more}")],
            Below = [.. CampaignText.Footnotes(overview), "Gap: the widest between two group means of the sample; gaps of what was selected look larger than they are.", CampaignText.Caution],
            WhenEmpty = "No experiment survives: no difference shown, which is not the same as no difference.",
        };
        return (rows, overview);
    }

    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("experiment", "experiment"), new("title", "title"), new("test", null), new("statistic", null, true), new("df1", null, true), new("df2", null, true),
        new("p", "p", true), new("adjusted_p", "adjusted p", true), new("eta_squared", null, true), new("omega_squared", null, true),
        new("highest_group", "highest"), new("highest_mean", null, true), new("lowest_group", "lowest"), new("lowest_mean", null, true),
        new("difference", "gap", true), new("unit", "unit"), new("response", null),
    ];

    private static Cell[] Row(ExperimentResult e, WidestGap? gap) =>
    [
        Cell.Text(e.Plan.Code), Cell.Text(e.Plan.Title), Cell.Text(e.Plan.Test), Cell.Number(e.Statistic), Cell.Number(e.Df1), Cell.Number(e.Df2),
        Cell.P(e.P), Cell.P(e.AdjustedP), Cell.Number(e.EtaSquared), Cell.Number(e.OmegaSquared),
        Cell.Text(gap?.Highest), Cell.Number(gap?.HighestMean), Cell.Text(gap?.Lowest), Cell.Number(gap?.LowestMean),
        Cell.Number(gap?.Difference), Cell.Text(e.Plan.Unit), Cell.Text(e.Plan.Response),
    ];
}
