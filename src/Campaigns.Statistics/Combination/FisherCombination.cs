using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Combination;

/// <summary>Fisher's test: -2 times the sum of ln p follows a chi-squared law with two degrees of freedom for each p-value.</summary>
public sealed class FisherCombination : CombinationTest
{
    /// <inheritdoc/>
    public override string Key => "fisher";

    /// <inheritdoc/>
    public override string Name => "Fisher";

    /// <inheritdoc/>
    public override string Assumes => "Independent experiments; positive dependence makes its p-value too small.";

    /// <inheritdoc/>
    public override string Source => "R. A. Fisher (1932), Statistical Methods for Research Workers, 4th edition, section 21.1";

    /// <inheritdoc/>
    public override bool CountsUntested => false;

    /// <inheritdoc/>
    protected override CombinationOutcome CombineUsed(ReadOnlySpan<PValue> p, int familySize, ReadOnlySpan<double> weights)
    {
        if (p.Length == 1)
        {
            return CombinationOutcome.Of(-2 * p[0].Log, p[0]);
        }

        DoubleDouble sum = default;
        foreach (PValue value in p)
        {
            if (double.IsNegativeInfinity(value.Log))
            {
                return CombinationOutcome.Of(double.PositiveInfinity, PValue.FromValue(0));
            }

            sum += DoubleDouble.From(value.Log);
        }

        double statistic = -2 * sum.High;
        return CombinationOutcome.Of(statistic, ChiSquared.UpperTailPValue(statistic, 2.0 * p.Length));
    }
}
