using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What a campaign has risked so far, and how many of its survivors may be false.</summary>
/// <param name="Overview">The campaign in figures.</param>
/// <param name="SurvivorBound">The bound of its survivors by closed testing over all its planned experiments, at the campaign's level.</param>
/// <param name="Confidence">The confidence of that bound.</param>
/// <param name="Corrected">What its correction still risks if nothing is real; null where the campaign is corrected in several families.</param>
/// <param name="LargestSurvivingP">The largest p-value that survives; null where none does.</param>
public sealed record CampaignRisk(CampaignOverview Overview, MarkedBound SurvivorBound, double Confidence, CorrectedRisk? Corrected, PValue? LargestSurvivingP)
{
    /// <summary>The risk of a campaign as it stands; O(m log m).</summary>
    /// <param name="standing">The campaign.</param>
    public static CampaignRisk Of(CampaignStanding standing)
    {
        ArgumentNullException.ThrowIfNull(standing);
        IReadOnlyList<ExperimentResult> experiments = standing.Experiments;
        CampaignBounds bounds = CampaignBounds.Of(experiments, standing.Campaign.Level);
        int[] survivors = [.. Enumerable.Range(0, experiments.Count).Where(i => experiments[i].Survives == true)];
        PValue? largest = null;
        foreach (int i in survivors)
        {
            PValue p = experiments[i].P!.Value;
            largest = largest is { } before && before > p ? before : p;
        }

        return new CampaignRisk(standing.Overview, bounds.Mark(survivors), bounds.Confidence, RiskCurve.Corrected(standing)(standing.TestedCount), largest);
    }
}
