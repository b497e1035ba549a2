using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Numerics;

namespace Campaigns.App.Commands;

/// <summary>The risk of false positives as rows.</summary>
internal static class RiskTable
{
    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("campaign", "campaign"), new("tests", "tests", true), new("level", "level", true), new("expected_false_positives", "expected false", true),
        new("risk_independent", "risk", true), new("risk_at_least", "at least", true), new("risk_at_most", "at most", true),
        new("uncorrected_hits", "hits", true), new("survivors", "survive", true), new("correction", "correction"), new("guarantee", null),
    ];

    /// <summary>A row a campaign, and for several the programme as a whole.</summary>
    public static RowTable Of(IReadOnlyList<CampaignOverview> campaigns, bool withTotal)
    {
        List<Cell[]> rows = [.. campaigns.Select(Row)];
        if (withTotal && campaigns.Count > 1)
        {
            rows.Add(Total(campaigns));
        }

        var below = new List<string>
        {
            "Expected false: false positives to expect without any correction if nothing is real (tests times level), whatever the dependence. Risk: that there is at least one, for independent tests; at least, at most: its bounds whatever the dependence. Hits: experiments whose own p is at most the level; survive: those left by the correction.",
        };
        below.AddRange(campaigns.Select(c => $"{c.Campaign.Code}: {CampaignText.Goal(c.Campaign)}. {Held(c)}"));
        below.AddRange(campaigns.SelectMany(c => CampaignText.Deviations(c).Select(d => $"{c.Campaign.Code}: {d}")));
        if (campaigns.Count > 1)
        {
            below.Add("What does not add up: a false discovery rate held in each campaign does not hold it for all their survivors together.");
        }

        return new RowTable(Columns, rows) { Below = below, WhenEmpty = "The catalog holds no campaigns yet." };
    }

    /// <summary>The risk of one campaign in sentences.</summary>
    public static IReadOnlyList<string> Sentences(CampaignOverview c)
    {
        int tests = c.TestedCount;
        if (tests == 0)
        {
            return ["Cumulative risk: nothing was tested yet."];
        }

        return
        [
            FormattableString.Invariant($"Cumulative risk: {tests} tests at {c.Campaign.Level} each. Without a correction, if nothing is real, {NumberText.Screen(FamilyRisk.ExpectedFalsePositives(tests, c.Campaign.Level), 3)} false positives are to be expected, and the risk of at least one is {Words.Percent(FamilyRisk.AtLeastOneIfIndependent(tests, c.Campaign.Level))} for independent tests (between {Words.Percent(FamilyRisk.AtLeastOneLowerBound(tests, c.Campaign.Level))} and {Words.Percent(FamilyRisk.AtLeastOneUpperBound(tests, c.Campaign.Level))} whatever the dependence). {c.UncorrectedCount} experiments would count as hits; {c.SurvivorCount} survive the correction."),
            $"What the correction holds: {Held(c)}",
        ];
    }

    private static Cell[] Row(CampaignOverview c)
    {
        int tests = c.TestedCount;
        return
        [
            Cell.Text(c.Campaign.Code), Cell.Whole(tests), Cell.Setting(c.Campaign.Level.Value),
            Cell.Number(FamilyRisk.ExpectedFalsePositives(tests, c.Campaign.Level)), Cell.Number(FamilyRisk.AtLeastOneIfIndependent(tests, c.Campaign.Level)),
            Cell.Number(FamilyRisk.AtLeastOneLowerBound(tests, c.Campaign.Level)), Cell.Number(FamilyRisk.AtLeastOneUpperBound(tests, c.Campaign.Level)),
            Cell.Whole(c.UncorrectedCount), Cell.Whole(c.SurvivorCount), Cell.Text(c.Campaign.Correction), Cell.Text(Held(c)),
        ];
    }

    private static string Held(CampaignOverview c) => c.Campaign.JudgedFamilies.Count == 0
        ? FamilyVerdict.ProcedureOf(c.Campaign).Guarantee
        : string.Join(" ", [.. FamilyText.Guarantees(c), FamilyText.Together(c)]);

    /// <summary>All campaigns together: expectations add up, and for independent tests the chances of no false positive multiply.</summary>
    private static Cell[] Total(IReadOnlyList<CampaignOverview> campaigns)
    {
        double expected = campaigns.Sum(c => FamilyRisk.ExpectedFalsePositives(c.TestedCount, c.Campaign.Level));
        double logNone = campaigns.Sum(c => c.TestedCount * Accurate.Log1p(-c.Campaign.Level.Value));
        return
        [
            Cell.Text("programme"), Cell.Whole(campaigns.Sum(c => (long)c.TestedCount)), Cell.Empty,
            Cell.Number(expected), Cell.Number(-Accurate.Expm1(logNone)),
            Cell.Number(campaigns.Max(c => FamilyRisk.AtLeastOneLowerBound(c.TestedCount, c.Campaign.Level))), Cell.Number(Math.Min(1, expected)),
            Cell.Whole(campaigns.Sum(c => (long)c.UncorrectedCount)), Cell.Whole(campaigns.Sum(c => (long)c.SurvivorCount)), Cell.Empty, Cell.Empty,
        ];
    }
}
