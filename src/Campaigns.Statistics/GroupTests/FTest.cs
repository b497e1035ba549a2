using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.GroupTests;

/// <summary>The F test of the one-way analysis of variance.</summary>
/// <remarks>
/// Statistic and table come from exact integer sums of the typed decimals (<see cref="OneWayLayout"/>), the p-value with its logarithm from the upper tail of the F law (<see cref="FDistribution"/>).
/// Cost: about 2 ns a value and 0.4 us an experiment; allocates the outcome alone.
/// </remarks>
public sealed class FTest : GroupTest
{
    /// <inheritdoc/>
    public override string Key => "f";

    /// <inheritdoc/>
    public override string Name => "One-way analysis of variance, F test";

    /// <inheritdoc/>
    public override string Hypothesis => "All groups have the same mean.";

    /// <inheritdoc/>
    public override string Assumes => "Independent observations; in every group a normal law with the same variance. Moderate departures from normality matter little, unequal variances matter where the groups differ in size.";

    /// <inheritdoc/>
    public override string Source => "R. A. Fisher, Statistical Methods for Research Workers, 1925.";

    /// <inheritdoc/>
    /// <remarks>Equal means give F = 0 and p = 1. The reason why a sample is not testable is decided by the exact values, in the order of <see cref="NotTestableReason"/>.</remarks>
    public override TestOutcome Test(GroupedSample sample, RandomDraws draws)
    {
        OneWayLayout layout = OneWayLayout.Of(sample);
        if (layout.Obstacle is NotTestableReason reason)
        {
            return new NotTestable(layout.GroupCount, layout.Count, reason);
        }

        VariationTable table = layout.Table();
        int df1 = layout.BetweenDegreesOfFreedom;
        int df2 = layout.WithinDegreesOfFreedom;
        FDistribution law = FDistribution.For(df1, df2);
        PValue p = table.F < FDistribution.PowerLawFrom ? law.UpperTailPValue(table.F) : law.UpperTailPValue(layout.F);
        return new Tested(layout.GroupCount, layout.Count, table.F, df1, df2, p, table);
    }
}
