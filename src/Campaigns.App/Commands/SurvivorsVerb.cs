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
        CampaignStanding standing = new StandingReader(catalog).Read(session.Get(_code));
        session.Print(Table(catalog, standing, int.MaxValue));
        return ExitCode.Done;
    }

    /// <summary>The survivors, ranked by p.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="most">Survivors to list.</param>
    public static RowTable Table(Catalog.Catalog catalog, CampaignStanding standing, int most)
    {
        ExperimentResult[] survivors = [.. standing.Experiments.Where(e => e.Survives == true).OrderBy(e => e.P!.Value).ThenBy(e => e.Position)];
        ExperimentResult[] listed = most < survivors.Length ? survivors[..most] : survivors;
        IReadOnlyDictionary<string, WidestGap> gaps = new EffectReader(catalog).WidestGaps(standing.Campaign.Code, listed.Select(e => e.Plan.Code));
        string more = listed.Length < survivors.Length
            ? FormattableString.Invariant($" The first {listed.Length} of {survivors.Length} are shown; 'campaigns survivors {standing.Campaign.Code}' gives all.")
            : "";
        return new RowTable(Columns, listed.Select(e => Row(e, gaps.GetValueOrDefault(e.Plan.Code))))
        {
            Above = [FormattableString.Invariant($"{standing.Campaign.Code}: {standing.SurvivorCount} of {standing.TestedCount} tested experiments survive ({CampaignText.Goal(standing.Campaign)}).{more}")],
            Below = [.. CampaignText.Footnotes(standing), "Gaps are those between sample means; gaps of what was selected look larger than they are.", CampaignText.Caution],
            WhenEmpty = "No experiment survives: no difference shown, which is not the same as no difference.",
        };
    }

    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("experiment", "experiment"), new("title", "title"), new("test", null), new("statistic", "statistic", true), new("df1", null, true), new("df2", null, true),
        new("p", "p", true), new("adjusted_p", "adjusted p", true), new("eta_squared", null, true), new("omega_squared", "omega squared", true),
        new("highest_group", "highest"), new("highest_mean", "mean", true), new("lowest_group", "lowest"), new("lowest_mean", "mean", true),
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
