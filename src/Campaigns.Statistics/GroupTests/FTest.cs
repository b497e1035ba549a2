using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.GroupTests;

/// <summary>The F test of the one-way analysis of variance.</summary>
/// <remarks>
/// Statistic and table come from exact integer sums of the typed decimals (<see cref="OneWayLayout"/>), the p-value with its logarithm from the upper tail of the F law (<see cref="FDistribution"/>).
/// Cost: about 2 ns a value and 0.4 us an experiment; allocates the outcome alone.
/// </remarks>
public sealed class FTest : GroupTest
{
    /// <summary>From here on the upper tail of F is a pure power of F, to far beyond double accuracy, for any degrees of freedom that an experiment can have.</summary>
    private const double PowerLawFrom = 1e300;

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
        return new Tested(layout.GroupCount, layout.Count, table.F, df1, df2, UpperTail(layout.F, df1, df2), table);
    }

    /// <summary>The p-value of an F that may lie beyond the largest double.</summary>
    /// <param name="f">Not negative.</param>
    /// <param name="df1">First degrees of freedom.</param>
    /// <param name="df2">Second degrees of freedom.</param>
    internal static PValue UpperTail(WideReal f, double df1, double df2)
    {
        FDistribution law = FDistribution.For(df1, df2);
        double rounded = f.ToDouble();
        if (rounded < PowerLawFrom)
        {
            return law.UpperTailPValue(rounded);
        }

        // P(F > f) falls as f to the power of -df2/2.
        double factor = (f / PowerLawFrom).Log();
        return PValue.FromLog(law.LogUpperTail(PowerLawFrom) - (law.Df2 / 2 * factor));
    }
}
