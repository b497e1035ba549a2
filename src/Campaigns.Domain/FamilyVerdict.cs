using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What a campaign's correction makes of its family: the one way from p-values to survivors.</summary>
public static class FamilyVerdict
{
    /// <summary>The correction that a campaign names.</summary>
    /// <exception cref="RefusedException">This version of the program does not have it.</exception>
    public static Correction CorrectionOf(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return CorrectionRegistry.Find(campaign.Correction)
            ?? throw new RefusedException($"The campaign '{campaign.Code}' names the correction '{campaign.Correction}', which this version of the program does not have.");
    }

    /// <summary>The experiments with their adjusted p-values and whether they survive.</summary>
    /// <param name="campaign">Level and correction.</param>
    /// <param name="experiments">Experiments, those without a result included, in any order.</param>
    /// <param name="familySize">Hypotheses counted, at least the experiments with a result; the others count as p = 1.</param>
    /// <returns>The same experiments in the same order. O(m log m).</returns>
    public static IReadOnlyList<ExperimentResult> Apply(Campaign campaign, IReadOnlyList<ExperimentResult> experiments, int familySize)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(experiments);
        PValue[] p = [.. experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        PValue[] adjusted = CorrectionOf(campaign).Adjust(RankedFamily.Of(p, familySize));
        var judged = new ExperimentResult[experiments.Count];
        int next = 0;
        for (int i = 0; i < judged.Length; i++)
        {
            ExperimentResult experiment = experiments[i];
            judged[i] = experiment.P is null
                ? experiment
                : experiment with { AdjustedP = adjusted[next], Survives = campaign.Level.Rejects(adjusted[next++]) };
        }

        return judged;
    }
}
