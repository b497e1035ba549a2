using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;

namespace Campaigns.App.Commands;

/// <summary>survivors: the experiments that survive, with effect.</summary>
internal sealed class SurvivorsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("survivors", Describe("The experiments that survive the campaign's correction, the smallest adjusted p first, with the widest gap between group means in its unit, and the comparisons inside them that are claimed, with their intervals.",
        "survivors PRIMERS"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        Print(session, Read(catalog, session.Get(_code), int.MaxValue));
        return ExitCode.Done;
    }

    /// <summary>What is shown of the survivors of a campaign.</summary>
    /// <param name="Rows">A row a survivor.</param>
    /// <param name="Claims">The comparisons claimed inside them; for people, below.</param>
    /// <param name="Overview">The campaign in figures.</param>
    public sealed record Survivors(RowTable Rows, RowTable Claims, CampaignOverview Overview);

    /// <summary>Prints the survivors: for people with the comparisons claimed inside them as a second table.</summary>
    public static void Print(Session session, Survivors survivors)
    {
        session.Print(survivors.Rows);
        if (session.Format == RowFormat.Table && (survivors.Claims.Rows.Any() || survivors.Claims.Below.Count > 0))
        {
            session.Host.Out.WriteLine();
            session.Print(survivors.Claims);
        }
    }

    /// <summary>The survivors, ranked by p.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="code">The campaign.</param>
    /// <param name="most">Survivors to list.</param>
    public static Survivors Read(Catalog.Catalog catalog, string code, int most) => catalog.Snapshot(() => ReadNow(catalog, code, most));

    /// <summary>A standing decision stands while the values of its experiment, changed since, await a new test.</summary>
    private static string Counted(CampaignOverview overview) => overview.Campaign.Streams.Count > 0 && overview.AwaitingNewTest > 0
        ? FormattableString.Invariant($"{overview.SurvivorCount} experiments, by standing decisions, {overview.TestedCount} having a result and {overview.AwaitingNewTest} awaiting a new test,")
        : FormattableString.Invariant($"{overview.SurvivorCount} of {overview.TestedCount} tested experiments");

    private static Survivors ReadNow(Catalog.Catalog catalog, string code, int most)
    {
        (CampaignOverview overview, IReadOnlyList<ExperimentResult> listed) = new OverviewReader(catalog).ReadSurvivors(code, most);
        IReadOnlyDictionary<string, WidestGap> gaps = new EffectReader(catalog).WidestGaps(code, listed.Select(e => e.Plan.Code));
        ILookup<string, ExperimentComparison> comparisons = new ComparisonReader(catalog).OfSurvivors(overview, listed);
        string more = listed.Count < overview.SurvivorCount
            ? FormattableString.Invariant($" The first {listed.Count} of {overview.SurvivorCount} are shown; 'campaigns survivors {code}' gives all.")
            : "";
        var verdict = new ComparisonVerdict(overview.Campaign, overview.Families);
        var rows = new RowTable(Columns, listed.Select(e => Row(e, gaps.GetValueOrDefault(e.Plan.Code), [.. comparisons[e.Plan.Code]], verdict.SelectedRisk(e)!.Value)))
        {
            Above = [FormattableString.Invariant($"{code}: {Counted(overview)} survive ({CampaignText.Goal(overview.Campaign)}).{more}")],
            Below = [.. OnlineText.OnOtherData(listed), .. CampaignText.Footnotes(overview, listed.Select(e => e.Plan.Test).DefaultIfEmpty(overview.Campaign.DefaultTest)), .. UnitNotes.Of(listed), "Gap: the widest between two group means of the sample; gaps of what was selected look larger than they are. Its selected interval comes from the follow-up.", CampaignText.Caution],
            WhenEmpty = "No experiment survives: no difference shown, which is not the same as no difference.",
        };
        var claims = new RowTable(ClaimColumns, listed.SelectMany(e => comparisons[e.Plan.Code]).Where(c => c.Survives == true).Select(ComparisonsVerb.Row))
        {
            Above = ["Comparisons claimed inside the survivors"],
            WhenEmpty = "None.",
            Below = [.. WithoutClaim(listed, comparisons), .. ExperimentWording.NotClaimed(listed.SelectMany(e => comparisons[e.Plan.Code])), .. ExperimentWording.Comparisons(overview, listed.Select(e => e.Plan.FollowUp))],
        };
        return new Survivors(rows, claims, overview);
    }

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
        Interval? ofGap = gap is null ? null : OfGap(gap, comparisons);
        Interval? ofEta = EffectSection.SelectedEtaSquared(e, risk);
        return [Cell.Number(ofGap?.Lower), Cell.Number(ofGap?.Upper), Cell.Number(1 - risk), Cell.Number(ofEta?.Lower), Cell.Number(ofEta?.Upper)];
    }

    /// <summary>The selected interval of highest less lowest mean; null where the follow-up does not compare these two, or estimates another difference, as within incomplete blocks.</summary>
    private static Interval? OfGap(WidestGap gap, ExperimentComparison[] comparisons)
    {
        const double Rounding = 1e-9;
        foreach (ExperimentComparison c in comparisons)
        {
            bool upwards = (c.GroupA, c.GroupB) == (gap.Lowest, gap.Highest);
            if ((upwards || (c.GroupB, c.GroupA) == (gap.Lowest, gap.Highest)) && Math.Abs(Math.Abs(c.Comparison.Difference) - gap.Difference) <= Rounding * gap.Difference)
            {
                return upwards || c.SelectedInterval is not { } downwards ? c.SelectedInterval : new Interval(-downwards.Upper, -downwards.Lower);
            }
        }

        return null;
    }

    /// <summary>For example "B - A 2.5 [1.2, 3.8]".</summary>
    private static string Claim(ExperimentComparison c)
    {
        string interval = c.Comparison is { Lower: { } lower, Upper: { } upper } ? $" [{NumberText.Screen(lower, 3)}, {NumberText.Screen(upper, 3)}]" : "";
        return $"{c.GroupB} - {c.GroupA} {NumberText.Screen(c.Comparison.Difference, 3)}{interval}";
    }
}
