using Campaigns.Statistics.Probability;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.Domain;

/// <summary>What a campaign has risked so far, and how many of its survivors may be false.</summary>
/// <param name="Overview">The campaign in figures.</param>
/// <param name="SurvivorBound">The bound of its survivors by closed testing over all its planned experiments, at the campaign's level.</param>
/// <param name="Confidence">The confidence of that bound.</param>
/// <param name="Corrected">What its correction still risks if nothing is real; null where the campaign is corrected in several families.</param>
/// <param name="LargestSurvivingP">The largest p-value that survives; null where none does.</param>
/// <param name="TrueNulls">The estimated share of true nulls among its tests.</param>
public sealed record CampaignRisk(
    CampaignOverview Overview,
    MarkedBound SurvivorBound,
    double Confidence,
    CorrectedRisk? Corrected,
    PValue? LargestSurvivingP,
    TrueNullShare TrueNulls)
{
    /// <summary>An estimate of the number of false survivors: the true nulls among the tests, each of which would have a p-value up to the largest surviving one with just that probability. Null without an estimate of the share.</summary>
    /// <remarks>Source: J. D. Storey (2002), Journal of the Royal Statistical Society B 64:479-498, the numerator of his estimate of the false discovery rate. No bound; more than the survivors are cut to their number.</remarks>
    public double? ExpectedFalseSurvivors => LargestSurvivingP is not { } largest ? 0
        : TrueNulls.Share is { } share ? Math.Min(Overview.SurvivorCount, share * Overview.TestedCount * largest.Value)
        : null;

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
            // A decision that stands survives a change of its data, which takes the result away: then the p counts on which it was made.
            if ((experiments[i].P ?? experiments[i].Entry?.P) is { } p)
            {
                largest = largest is { } before && before > p ? before : p;
            }
        }

        PValue[] tested = [.. experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        return new CampaignRisk(standing.Overview, bounds.Mark(survivors), bounds.Confidence, RiskCurve.Corrected(standing)(standing.TestedCount), largest, TrueNullShare.Estimate(tested));
    }
}
