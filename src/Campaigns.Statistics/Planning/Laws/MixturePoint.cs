using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Planning.Laws;

/// <summary>How an experiment that has a real effect with a given probability comes out at a level: the four cells, as probabilities that sum to one.</summary>
internal readonly record struct MixturePoint(double FalseBelow, double TrueBelow, double NullAbove, double RealAbove)
{
    public double Below => FalseBelow + TrueBelow;

    public double Above => NullAbove + RealAbove;

    /// <summary>The cells at a point of the curve.</summary>
    public static MixturePoint Of(CampaignDesign campaign, TestPoint point)
    {
        (double none, double real) = (campaign.ShareNull, campaign.ShareReal);
        return new(none * point.Level, real * point.Found, none * (1 - point.Level), real * point.Missed);
    }

    /// <summary>The probability that at least one of n independent trials succeeds.</summary>
    /// <param name="succeeds">Probability of success.</param>
    /// <param name="fails">Its complement, to its own accuracy.</param>
    /// <param name="n">Trials; at least 0.</param>
    public static double AtLeastOne(double succeeds, double fails, double n) =>
        n == 0 ? 0 : -Accurate.Expm1(n * (succeeds < 0.5 ? Accurate.Log1p(-succeeds) : Math.Log(fails)));
}
