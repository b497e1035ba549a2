using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Replication;

namespace Campaigns.Domain;

/// <summary>Judges the experiments of a campaign that confirm earlier ones: is the effect there in both?</summary>
/// <remarks>
/// The p-value of a pair is the larger of both (partial conjunction, two of two), corrected at the campaign's level over a family that follows from when the confirmation was fixed.
/// Where it was sealed before the first experiment was tested, the family is every experiment of this campaign that confirms something, tested or not.
/// Where the first was tested before, it may have been chosen by its result. Then the family is every experiment of the first one's family, those that nobody followed counting as p = 1: each such p-value is valid whatever the choice, as the larger of two is at most as small as the one of the two whose hypothesis is true, and the second study is independent of the choice.
/// Source: Y. Benjamini and R. Heller (2008), Biometrics 64:1215-1222; M. Bogomolov and R. Heller (2013), Journal of the American Statistical Association 108:1480-1492.
/// </remarks>
public static class Replicability
{
    /// <summary>The experiments with what came of their confirmations.</summary>
    /// <param name="campaign">Level and correction. Where it is judged by a procedure that decides as experiments arrive, Holm's correction holds the familywise error rate and Benjamini and Hochberg's the false discovery rate of its confirmations.</param>
    /// <param name="experiments">Its experiments.</param>
    /// <param name="earlier">For each of them the experiment that it confirms; null where it confirms none.</param>
    /// <returns>The same experiments in the same order. One that was withdrawn before any data is no confirmation any more; one that was withdrawn after its data came counts as p = 1. O(m log m).</returns>
    public static IReadOnlyList<ExperimentResult> Apply(Campaign campaign, IReadOnlyList<ExperimentResult> experiments, IReadOnlyList<EarlierExperiment?> earlier)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(experiments);
        ArgumentNullException.ThrowIfNull(earlier);
        Campaign judged = campaign with
        {
            Correction = CorrectionRegistry.Find(campaign.Correction) is not null ? campaign.Correction : campaign.ErrorRate == ErrorRate.Familywise ? "holm" : "bh",
            Families = [],
            Online = null,
        };
        int size = FamilySize([.. earlier.OfType<EarlierExperiment>()]);
        var pairs = new List<(int Place, PValue P)>();
        var result = new ExperimentResult[experiments.Count];
        for (int i = 0; i < result.Length; i++)
        {
            result[i] = earlier[i] is { } first ? experiments[i] with { Confirmation = new Confirmation(first) { FamilySize = size, Correction = judged.Correction } } : experiments[i];
            if (earlier[i]?.P is { } p && experiments[i].P is { } own)
            {
                pairs.Add((i, PartialConjunction.Of([p, own], 2, PartialConjunctionForm.Bonferroni)));
            }
        }

        PValue[] larger = [.. pairs.Select(p => p.P)];
        CampaignVerdict verdict = FamilyVerdict.Judge(judged, FamilyMembers.OneFamily(larger, Math.Max(1, size)));
        for (int k = 0; k < larger.Length; k++)
        {
            ExperimentResult experiment = result[pairs[k].Place];
            result[pairs[k].Place] = experiment with
            {
                Confirmation = experiment.Confirmation! with { P = larger[k], AdjustedP = verdict.Adjusted[k], IsReplicated = verdict.Survives[k] },
            };
        }

        return result;
    }

    /// <summary>Every confirmation, and of the families of those that were chosen after looking every experiment that is not confirmed here.</summary>
    private static int FamilySize(IReadOnlyList<EarlierExperiment> earlier)
    {
        int size = earlier.Count;
        foreach (var family in earlier.GroupBy(e => (e.Campaign, e.Family)).Where(f => f.Any(e => e.WasTestedBefore)))
        {
            size += Math.Max(0, family.Max(e => e.FamilySize) - family.Where(e => e.IsInFamily).Select(e => e.Experiment).Distinct(StringComparer.Ordinal).Count());
        }

        return size;
    }
}
