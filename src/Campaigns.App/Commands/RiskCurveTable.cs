using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>The risk of a campaign test by test, as rows.</summary>
internal static class RiskCurveTable
{
    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("tests", "tests", true), new("experiment", "experiment"), new("p", "p", true), new("risk_independent", "risk", true), new("risk_at_least", "at least", true, 2),
        new("risk_at_most", "at most", true, 2), new("expected_false_positives", "expected false", true), new("uncorrected_hits", "hits", true), new("survivors", "survive", true),
        new("corrected_risk", "corrected", true), new("corrected_risk_is", null), new("corrected_expected_false", null, true), new("test_run", "run", true, 1),
    ];

    /// <summary>A row a test, in the order of testing.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="points">Its risk, test by test.</param>
    public static RowTable Of(CampaignStanding standing, IReadOnlyList<RiskPoint> points) => new(Columns, points.Select(Row))
    {
        Above = [FormattableString.Invariant($"{standing.Campaign.Code}: the risk test by test, {points.Count} tests of a family of {standing.FamilySize}, each at {standing.Campaign.Level}")],
        Below =
        [
            "In the order of testing: by test run, inside a run in the plan's order; an experiment tested again stands where its latest test stands. Without correction, if nothing is real: risk, that there is at least one false positive, for independent tests; at least, at most: its bounds whatever the dependence; expected false: whatever the dependence.",
            "Hits: tests so far whose own p is at most the level. Survive: those of them that survive the correction over the whole family as the campaign stands today.",
            RiskTable.CorrectedMeans([.. points.Select(p => p.Corrected).OfType<CorrectedRisk>()]),
            $"{standing.Campaign.Code}: {CampaignText.Goal(standing.Campaign)}. {FamilyVerdict.ProcedureOf(standing.Campaign).Guarantee}",
            .. CampaignText.Deviations(standing.Overview),
        ],
        WhenEmpty = "No experiment has a result yet.",
    };

    private static Cell[] Row(RiskPoint point) =>
    [
        Cell.Whole(point.Tests), Cell.Text(point.Experiment.Plan.Code), Cell.P(point.Experiment.P), Cell.Number(point.Independent), Cell.Number(point.AtLeast),
        Cell.Number(point.AtMost), Cell.Number(point.ExpectedFalse), Cell.Whole(point.Hits), Cell.Whole(point.Survivors),
        Cell.Number(point.Corrected?.AtLeastOne), Cell.Text(RiskTable.Exactness(point.Corrected)), Cell.Number(point.Corrected?.ExpectedFalse), Cell.Whole(point.TestRun),
    ];
}
