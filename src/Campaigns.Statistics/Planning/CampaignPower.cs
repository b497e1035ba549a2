using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning.Laws;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Planning;

/// <summary>What a correction brings over a whole campaign, by exact laws for finite m.</summary>
/// <remarks>
/// Independent experiments (see <see cref="CampaignDesign"/>). Exact for procedures whose levels depend on rank alone: none, bonferroni, sidak, holm, holm-sidak, hochberg, bh, by. The others are drawn by <see cref="CampaignSimulation"/>.
/// Masses below 1e-20 of the least chance that counts are left out; what remains are rounding errors, seen below 1e-11 relative at m = 1,000.
/// </remarks>
public static class CampaignPower
{
    /// <summary>Up to so many experiments a fixed number of real effects has an exact law here; its time grows with m^2.5 and more.</summary>
    public const int MostOfNumber = 2_000;

    /// <summary>Up to so many experiments a share of real effects has an exact law here.</summary>
    public const int MostOfShare = 100_000;

    /// <summary>Whether an exact law is known and affordable.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="procedure">The correction.</param>
    public static bool IsExact(CampaignDesign campaign, ErrorProcedure procedure)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return (procedure is Correction correction ? SteppingOf.Correction(correction) : Stepping.None) switch
        {
            Stepping.None => false,
            Stepping.OneLevel => true,
            _ => campaign.Experiments <= (campaign.Real.Number is null ? MostOfShare : MostOfNumber),
        };
    }

    /// <summary>Expected survivors, true and false, and the realised error rates.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="correction">One for which <see cref="IsExact"/> holds.</param>
    /// <param name="level">The level of the correction.</param>
    /// <param name="stop">Ends the work early.</param>
    /// <exception cref="ArgumentException">No exact law is known or affordable.</exception>
    /// <exception cref="OperationCanceledException">It was stopped.</exception>
    public static CampaignExpectation Exact(CampaignDesign campaign, Correction correction, SignificanceLevel level, CancellationToken stop = default)
    {
        ArgumentNullException.ThrowIfNull(correction);
        if (!IsExact(campaign, correction))
        {
            throw new ArgumentException(FormattableString.Invariant($"No exact law is at hand for {correction.Name} over {campaign.Experiments} experiments; draw campaigns instead."), nameof(correction));
        }

        var ladder = new LevelLadder(campaign, correction, level);
        bool isNumber = campaign.Real.Number is not null;
        return SteppingOf.Correction(correction) switch
        {
            Stepping.OneLevel => OneLevel.Expect(campaign, ladder),
            Stepping.Up => isNumber ? StepUpOfNumber.Expect(campaign, ladder, stop) : StepUpOfShare.Expect(campaign, ladder, stop),
            _ => isNumber ? StepDownOfNumber.Expect(campaign, ladder, stop) : StepDownOfShare.Expect(campaign, ladder, stop),
        };
    }
}
