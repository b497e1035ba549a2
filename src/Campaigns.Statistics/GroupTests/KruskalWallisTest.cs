using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.GroupTests;

/// <summary>Kruskal and Wallis's rank test with the correction for ties.</summary>
/// <remarks>
/// With midranks, rank sums R_i, and t values in each tie: H = [12/(N (N + 1)) sum of R_i^2/n_i - 3 (N + 1)]/[1 - sum of (t^3 - t)/(N^3 - N)].
/// Formed as 3 (N - 1) sum of d_i^2/n_i over N^3 - N - sum of (t^3 - t), d_i = 2 R_i - n_i (N + 1): integers all, positive terms, one rounding at the end.
/// The p-value is the upper tail of the chi-squared law with k - 1 degrees of freedom, which H approaches as the groups grow.
/// Cost: sorting, about N log2 N times 5 ns, and about 1 us an experiment; allocates nothing for each value.
/// </remarks>
public sealed class KruskalWallisTest : GroupTest
{
    private const int GroupsOnStack = 32;

    /// <inheritdoc/>
    public override string Key => "kruskal-wallis";

    /// <inheritdoc/>
    public override string Name => "Kruskal-Wallis rank test, corrected for ties";

    /// <inheritdoc/>
    public override string Hypothesis => "All groups have the same distribution.";

    /// <inheritdoc/>
    public override string Assumes => "Independent observations, in every group the same distribution of any shape, so that it is no cure for unequal variances. Groups of about five values or more: with fewer the p-value is too large, most of all the smallest ones.";

    /// <inheritdoc/>
    public override string Source => "W. H. Kruskal and W. A. Wallis, Use of ranks in one-criterion variance analysis, Journal of the American Statistical Association 47 (1952) 583-621.";

    /// <inheritdoc/>
    /// <remarks>
    /// Values that are constant inside every group while the groups differ can be ranked and are tested. Where every group holds a single value, H is N - 1 whatever the values, and says nothing: no replication.
    /// </remarks>
    public override TestOutcome Test(GroupedSample sample, RandomDraws draws)
    {
        OneWayLayout layout = OneWayLayout.Of(sample);
        if (layout.Obstacle is { } reason && reason != NotTestableReason.ZeroWithinVariation)
        {
            return new NotTestable(layout.GroupCount, layout.Count, reason);
        }

        double h = Statistic(sample);
        int df = layout.BetweenDegreesOfFreedom;
        VariationTable? table = layout.Obstacle is null ? layout.Table() : null;
        return new Tested(layout.GroupCount, layout.Count, h, df, null, ChiSquared.UpperTailPValue(h, df), table);
    }

    private static double Statistic(GroupedSample sample)
    {
        int groups = sample.GroupCount;
        Span<RankSum> sums = groups <= GroupsOnStack ? stackalloc RankSum[GroupsOnStack] : new RankSum[groups];
        sums = sums[..groups];
        Int128 n = sample.Count;
        Int128 tied = RankSums.Fill(sample, sums);
        WideReal squares = WideReal.Zero;
        foreach (RankSum group in sums)
        {
            if (group.Count > 0)
            {
                WideReal above = WideReal.From(group.Doubled - (group.Count * (n + 1)));
                squares += above * above / group.Count;
            }
        }

        return (squares * WideReal.From(3 * (n - 1)) / WideReal.From((n * n * n) - n - tied)).ToDouble();
    }
}
