using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.FollowUps;

/// <summary>What the procedures have in common: which pairs there are, and how a pair is put down.</summary>
internal static class Pairing
{
    public const string NoVariation = "the residual variation is zero, so that there is no measure of chance";

    /// <summary>All pairs of groups with values, the earlier group first, in order.</summary>
    public static IEnumerable<(int A, int B)> AllPairs(GroupEstimates estimates)
    {
        for (int a = 0; a < estimates.GroupCount; a++)
        {
            for (int b = a + 1; b < estimates.GroupCount; b++)
            {
                if (estimates.CountOf(a) > 0 && estimates.CountOf(b) > 0)
                {
                    yield return (a, b);
                }
            }
        }
    }

    /// <summary>The probability that simultaneous intervals leave, and a check of the confidence.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The confidence is outside (0, 1).</exception>
    public static double Risk(double confidence) =>
        confidence > 0 && confidence < 1
            ? 1 - confidence
            : throw new ArgumentOutOfRangeException(nameof(confidence), confidence, "A confidence lies between 0 and 1, both excluded.");

    /// <summary>The line of a pair whose standard error comes from the residual mean square.</summary>
    /// <param name="estimates">What is known of the groups.</param>
    /// <param name="a">The group that is taken away.</param>
    /// <param name="b">The group that it is taken from.</param>
    /// <param name="statistic">The procedure's statistic from t.</param>
    /// <param name="p">Its p-value from |t|, which is positive and finite.</param>
    /// <param name="halfWidth">Half width of the interval in standard errors of the difference.</param>
    /// <remarks>A difference of exactly zero has p = 1, whatever else; where the residual variation is zero any other difference has an obstacle, never p = 0.</remarks>
    public static GroupComparison Pooled(GroupEstimates estimates, int a, int b, Func<double, double> statistic, Func<double, PValue> p, double halfWidth)
    {
        double difference = estimates.Difference(a, b);
        if (estimates.ResidualStandardDeviation == 0 && difference != 0)
        {
            return new GroupComparison(a, b, difference) { Obstacle = NoVariation };
        }

        double t = estimates.T(a, b);
        GroupComparison line = new(a, b, difference)
        {
            Statistic = Math.Clamp(statistic(t), -double.MaxValue, double.MaxValue),
            DegreesOfFreedom = estimates.DegreesOfFreedom,
            P = t == 0 ? PValue.One : p(Math.Abs(t)),
        };
        return WithInterval(line, halfWidth * estimates.StandardErrorOfDifference(a, b));
    }

    /// <summary>The line with difference plus and minus half a width; without them where one is zero or out of range.</summary>
    public static GroupComparison WithInterval(GroupComparison line, double half)
    {
        double lower = line.Difference - half;
        double upper = line.Difference + half;
        return half > 0 && double.IsFinite(lower) && double.IsFinite(upper) ? line with { Lower = lower, Upper = upper } : line;
    }
}
