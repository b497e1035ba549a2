using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;

namespace Campaigns.App.Commands;

/// <summary>The survivors of a campaign as rows, and the comparisons that are claimed inside them.</summary>
internal static class SurvivorTables
{
    /// <summary>A row a survivor.</summary>
    public static RowTable Rows(SurvivorData data)
    {
        (CampaignOverview overview, IReadOnlyList<ExperimentResult> listed, IReadOnlyDictionary<string, WidestGap> gaps, ILookup<string, ExperimentComparison> comparisons) = data;
        string code = overview.Campaign.Code;
        string more = listed.Count < overview.SurvivorCount
            ? FormattableString.Invariant($" The first {listed.Count} of {overview.SurvivorCount} are shown; 'campaigns survivors {code}' gives all.")
            : "";
        var verdict = new ComparisonVerdict(overview.Campaign, overview.Families);
        return new RowTable(Columns, listed.Select(e => Row(e, gaps.GetValueOrDefault(e.Plan.Code), [.. comparisons[e.Plan.Code]], verdict.SelectedRisk(e)!.Value)))
        {
            Above = [FormattableString.Invariant($"{code}: {Counted(overview)} {Wording.Counted.Word(overview.SurvivorCount, "survives", "survive")} ({CampaignText.Goal(overview.Campaign)}).{more}")],
            Below = [.. OnlineText.OnOtherData(listed), .. CampaignText.Footnotes(overview, listed.Select(e => e.Plan.Test).DefaultIfEmpty(overview.Campaign.DefaultTest)), .. UnitNotes.Of(listed), "Gap: the widest between two group means of the sample; gaps of what was selected look larger than they are. Its selected interval comes from the follow-up.", CampaignText.Caution],
            WhenEmpty = "No experiment survives: no difference shown, which is not the same as no difference.",
        };
    }

    /// <summary>A row a comparison that is claimed.</summary>
    public static RowTable Claims(SurvivorData data)
    {
        (CampaignOverview overview, IReadOnlyList<ExperimentResult> listed, _, ILookup<string, ExperimentComparison> comparisons) = data;
        return new RowTable(ClaimColumns, listed.SelectMany(e => comparisons[e.Plan.Code]).Where(c => c.Survives == true).Select(ComparisonsVerb.Row))
        {
            Above = ["Comparisons claimed inside the survivors"],
            WhenEmpty = "None.",
            Below = [.. WithoutClaim(listed, comparisons), .. ExperimentWording.NotClaimed(listed.SelectMany(e => comparisons[e.Plan.Code])), .. ExperimentWording.Comparisons(overview, listed.Select(e => e.Plan.FollowUp))],
        };
    }

    /// <summary>How many of how many survive, for a sentence. A standing decision stands while the values of its experiment, changed since, await a new test.</summary>
    public static string Counted(CampaignOverview overview) => overview.Campaign.Streams.Count > 0 && overview.AwaitingNewTest > 0
        ? FormattableString.Invariant($"{overview.SurvivorCount} experiments, by standing decisions, {overview.TestedCount} having a result and {overview.AwaitingNewTest} awaiting a new test,")
        : FormattableString.Invariant($"{overview.SurvivorCount} of {Wording.Counted.Of(overview.TestedCount, "tested experiment")}");

    /// <summary>Claims stand inside selected experiments, so people see the intervals that account for it before the others; that all are claimed they know from the heading.</summary>
    private static IReadOnlyList<Column> ClaimColumns { get; } =
    [
        .. ComparisonsVerb.Columns.Select(c => c.Name switch
        {
            "selected_lower" or "selected_upper" => c with { GivesWay = 1 },
            "lower" or "upper" => c with { GivesWay = 5 },
            "survives" or "note" => c with { Heading = null },
            _ => c,
        }),
    ];

    /// <summary>Survivors in which groups were compared and none told apart: the test and the comparisons ask different questions.</summary>
    private static IEnumerable<string> WithoutClaim(IReadOnlyList<ExperimentResult> listed, ILookup<string, ExperimentComparison> comparisons)
    {
        string[] codes = [.. listed.Select(e => e.Plan.Code).Where(code => comparisons.Contains(code) && !comparisons[code].Any(c => c.Survives == true))];
        if (codes.Length > 0)
        {
            yield return $"Survives without a pair that is claimed: {string.Join(", ", codes)}. The groups differ somewhere, and no single pair stands out enough to be named.";
        }
    }

    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("experiment", "experiment"), new("title", "title"), new("test", null), new("statistic", null, true), new("df1", null, true), new("df2", null, true),
        new("p", "p", true), new("adjusted_p", "adjusted p", true), new("eta_squared", null, true), new("omega_squared", null, true),
        new("highest_group", "highest", CutLast: true), new("highest_mean", null, true), new("lowest_group", "lowest", CutLast: true), new("lowest_mean", null, true),
        new("difference", "gap", true), new("unit", "unit"), new("response", null), new("claimed_comparisons", null), new("amendments", null), new("family", null), new("level", null, true),
        new("selected_lower", "selected lower", true, 1, NotWithout: "selected_upper"), new("selected_upper", "selected upper", true, 1), new("selected_confidence", null, true),
        new("eta_squared_lower", null, true), new("eta_squared_upper", null, true), new("not_claimed", null),
    ];

    private static Cell[] Row(ExperimentResult e, WidestGap? gap, ExperimentComparison[] comparisons, double risk) =>
    [
        Cell.Text(e.Plan.Code), Cell.Text(e.Plan.Title), Cell.Text(e.Plan.Test), Cell.Number(e.Statistic), Cell.Number(e.Df1), Cell.Number(e.Df2),
        Cell.P(e.P), Cell.P(e.AdjustedP), Cell.Number(e.EtaSquared), Cell.Number(e.OmegaSquared),
        Cell.Text(gap?.Highest), Cell.Number(gap?.HighestMean), Cell.Text(gap?.Lowest), Cell.Number(gap?.LowestMean),
        Cell.Number(gap?.Difference), Cell.Text(e.Plan.Unit), Cell.Text(e.Plan.Response),
        Cell.Text(string.Join("; ", comparisons.Where(c => c.Survives == true).Select(Claim))), Cell.Text(string.Join("; ", e.Amendments)),
        Cell.Text(e.Family?.Name), e.Family is { } family ? Cell.Setting(family.Level.Value) : Cell.Empty,
        .. Intervals(e, gap, comparisons, risk),
        Cell.Text(string.Join("; ", comparisons.Where(c => c.NotClaimedBecause is not null).Select(c => $"{c.GroupB} - {c.GroupA}: {c.NotClaimedBecause}"))),
    ];

    /// <summary>The intervals that account for the selection: of the gap, from the follow-up, and of eta squared.</summary>
    private static Cell[] Intervals(ExperimentResult e, WidestGap? gap, ExperimentComparison[] comparisons, double risk)
    {
        Interval? ofGap = gap is null ? null : SurvivorData.OfGap(gap, comparisons);
        Interval? ofEta = EffectSection.SelectedEtaSquared(e, risk);
        return [Cell.Number(ofGap?.Lower), Cell.Number(ofGap?.Upper), Cell.Number(1 - risk), Cell.Number(ofEta?.Lower), Cell.Number(ofEta?.Upper)];
    }

    /// <summary>For example "B - A 2.5 [1.2, 3.8]".</summary>
    private static string Claim(ExperimentComparison c)
    {
        string interval = c.Comparison is { Lower: { } lower, Upper: { } upper } ? $" [{NumberText.Screen(lower, 3)}, {NumberText.Screen(upper, 3)}]" : "";
        return $"{c.GroupB} - {c.GroupA} {NumberText.Screen(c.Comparison.Difference, 3)}{interval}";
    }
}
