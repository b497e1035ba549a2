using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>The cumulative risk of a campaign in the order in which its experiments were tested.</summary>
public static class RiskCurve
{
    /// <summary>A point for each test: by test run, and inside a run in the plan's order.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="testRuns">The number of the latest run of each tested experiment, by its code.</param>
    /// <returns>As many points as experiments with a result; their figures without correction follow <see cref="FamilyRisk"/>.</returns>
    public static IReadOnlyList<RiskPoint> Of(CampaignStanding standing, IReadOnlyDictionary<string, long> testRuns)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ArgumentNullException.ThrowIfNull(testRuns);
        SignificanceLevel level = standing.Campaign.Level;
        Func<int, CorrectedRisk?> corrected = Corrected(standing);
        var points = new List<RiskPoint>();
        int hits = 0;
        int survivors = 0;
        foreach (ExperimentResult experiment in standing.Experiments.Where(e => e.P is not null).OrderBy(e => testRuns[e.Plan.Code]).ThenBy(e => e.Position))
        {
            int tests = points.Count + 1;
            hits += level.Rejects(experiment.P!.Value) ? 1 : 0;
            survivors += experiment.Survives == true ? 1 : 0;
            points.Add(new RiskPoint(
                tests,
                experiment,
                testRuns[experiment.Plan.Code],
                FamilyRisk.AtLeastOneIfIndependent(tests, level),
                FamilyRisk.AtLeastOneLowerBound(tests, level),
                FamilyRisk.AtLeastOneUpperBound(tests, level),
                FamilyRisk.ExpectedFalsePositives(tests, level),
                hits,
                survivors,
                corrected(tests)));
        }

        return points;
    }

    /// <summary>What the campaign's correction risks after some tests; null where it is applied to several families or streams.</summary>
    internal static Func<int, CorrectedRisk?> Corrected(CampaignStanding standing)
    {
        if (standing.Families is not [FamilyStanding family] || standing.Campaign.Streams.Count > 1)
        {
            return _ => null;
        }

        ErrorProcedure procedure = CorrectionRegistry.Find(family.Correction) ?? FamilyVerdict.ProcedureOf(standing.Campaign);
        return tests => CorrectedRisk.Of(procedure, family.Level, family.Size, tests);
    }
}
