using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.GroupTests;

/// <summary>Welch's test of equal means, variances free to differ.</summary>
/// <remarks>
/// With w_i = n_i/s_i^2, W their sum and m = sum of w_i mean_i/W: F = [sum of w_i (mean_i - m)^2/(k - 1)]/[1 + 2 (k - 2) T/(k^2 - 1)], T = sum of (1 - w_i/W)^2/(n_i - 1), with k - 1 and (k^2 - 1)/(3T) degrees of freedom, the latter fractional.
/// Means are taken as exact differences from that of the heaviest group: the term of that group alone is at least 1/k of W m^2, so that the sum of squares about m keeps about 31 of 32 digits whatever the weights and the offset.
/// Cost: one pass over the values, about 2 ns each, and about 4 us an experiment of five groups; allocates nothing for each value.
/// </remarks>
public sealed class WelchTest : GroupTest
{
    private const int GroupsOnStack = 32;

    /// <inheritdoc/>
    public override string Key => "welch";

    /// <inheritdoc/>
    public override string Name => "Welch's F test, variances free to differ";

    /// <inheritdoc/>
    public override string Hypothesis => "All groups have the same mean.";

    /// <inheritdoc/>
    public override string Assumes => "Independent observations; in every group a normal law, each with its own variance. Groups of about ten values or more: with many small groups, or skewed values in groups of unequal size, it rejects too often, most of all at small significance levels.";

    /// <inheritdoc/>
    public override string Source => "B. L. Welch, On the comparison of several mean values: an alternative approach, Biometrika 38 (1951) 330-336.";

    /// <inheritdoc/>
    /// <remarks>Besides what hinders the F test: a group of one value has no variance, and a constant group would have infinite weight. No group is ever left out of the test for that.</remarks>
    public override TestOutcome Test(GroupedSample sample, RandomDraws draws)
    {
        int groups = sample.GroupCount;
        Span<GroupSums> scratch = groups <= GroupsOnStack ? stackalloc GroupSums[GroupsOnStack] : new GroupSums[groups];
        ExactMoments moments = ExactMoments.Of(sample, scratch);
        OneWayLayout layout = OneWayLayout.Of(moments, sample.Unit);
        if (OwnVariances.Obstacle(layout, moments) is { } reason)
        {
            return new NotTestable(layout.GroupCount, layout.Count, reason);
        }

        Span<WideReal> weights = groups <= GroupsOnStack ? stackalloc WideReal[GroupsOnStack] : new WideReal[groups];
        if (!TryWeigh(moments, weights[..groups]))
        {
            return new NotTestable(layout.GroupCount, layout.Count, NotTestableReason.ConstantGroup);
        }

        (WideReal f, double df2) = Statistic(moments, weights[..groups], layout.GroupCount);
        int df1 = layout.BetweenDegreesOfFreedom;
        PValue p = FDistribution.Once(df1, df2).UpperTailPValue(f);
        return new Tested(layout.GroupCount, layout.Count, Math.Min(f.ToDouble(), double.MaxValue), df1, df2, p, layout.Table());
    }

    /// <summary>Weighs each group by n/s^2, empty ones by 0.</summary>
    /// <returns>Whether no group is constant.</returns>
    private static bool TryWeigh(ExactMoments moments, Span<WideReal> weights)
    {
        for (int i = 0; i < weights.Length; i++)
        {
            weights[i] = WideReal.Zero;
            if (moments.CountOf(i) > 0)
            {
                WideReal variance = OwnVariances.Of(moments, i);
                if (variance.Sign == 0)
                {
                    return false;
                }

                weights[i] = WideReal.From((double)moments.CountOf(i)) / variance;
            }
        }

        return true;
    }

    private static (WideReal F, double Df2) Statistic(ExactMoments moments, ReadOnlySpan<WideReal> weights, int k)
    {
        (WideReal total, int heaviest) = Sum(weights);
        WideReal mean = WideReal.Zero;
        for (int i = 0; i < weights.Length; i++)
        {
            if (weights[i].Sign > 0)
            {
                mean += weights[i] * moments.MeanDifference(heaviest, i);
            }
        }

        mean /= total;
        WideReal squares = WideReal.Zero;
        WideReal t = WideReal.Zero;
        for (int i = 0; i < weights.Length; i++)
        {
            if (weights[i].Sign > 0)
            {
                WideReal above = moments.MeanDifference(heaviest, i) - mean;
                squares += weights[i] * above * above;
                WideReal others = WideReal.From(1.0) - (weights[i] / total);
                t += others * others / (moments.CountOf(i) - 1);
            }
        }

        WideReal pairs = WideReal.From(((double)k * k) - 1);
        WideReal correction = WideReal.From(1.0) + (WideReal.From(2.0 * (k - 2)) * t / pairs);
        return (squares / (k - 1) / correction, (pairs / (t * WideReal.From(3.0))).ToDouble());
    }

    private static (WideReal Total, int Heaviest) Sum(ReadOnlySpan<WideReal> weights)
    {
        WideReal total = WideReal.Zero;
        int heaviest = 0;
        for (int i = 0; i < weights.Length; i++)
        {
            total += weights[i];
            heaviest = (weights[i] - weights[heaviest]).Sign > 0 ? i : heaviest;
        }

        return (total, heaviest);
    }
}
