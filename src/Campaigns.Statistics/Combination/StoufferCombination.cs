using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Combination;

/// <summary>Stouffer's test: the weighted sum of the normal deviates of the p-values over the root of the sum of squared weights is a normal deviate.</summary>
/// <remarks>A p-value of 1 has the deviate of minus infinity: the result is then 1 whatever else was found, and undefined beside a p-value of 0.</remarks>
public sealed class StoufferCombination : CombinationTest
{
    /// <summary>Below this p-value the deviate is found from the logarithm.</summary>
    private const double FromLogBelow = 1e-290;

    /// <inheritdoc/>
    public override string Key => "stouffer";

    /// <inheritdoc/>
    public override string Name => "Stouffer";

    /// <inheritdoc/>
    public override string Assumes => "Independent experiments; a single p = 1 makes its p-value 1. Directions play no part, because the tests combined have none.";

    /// <inheritdoc/>
    public override string Source => "S. A. Stouffer, E. A. Suchman, L. C. DeVinney, S. A. Star and R. M. Williams (1949), The American Soldier, volume 1; weights: T. Liptak (1958), Magyar Tudomanyos Akademia Matematikai Kutato Intezetenek Kozlemenyei 3:171-197";

    /// <inheritdoc/>
    public override bool CountsUntested => false;

    /// <inheritdoc/>
    public override bool TakesWeights => true;

    /// <inheritdoc/>
    protected override CombinationOutcome CombineUsed(ReadOnlySpan<PValue> p, int familySize, ReadOnlySpan<double> weights)
    {
        bool hasZero = false;
        bool hasOne = false;
        DoubleDouble sum = default;
        DoubleDouble squares = default;
        for (int i = 0; i < p.Length; i++)
        {
            bool isZero = double.IsNegativeInfinity(p[i].Log);
            bool isOne = p[i].Value == 1;
            hasZero |= isZero;
            hasOne |= isOne;
            DoubleDouble weight = DoubleDouble.From(weights[i]);
            sum += isZero || isOne ? default : weight * DoubleDouble.From(Deviate(p[i]));
            squares += weight * weight;
        }

        if (hasZero && hasOne)
        {
            return CombinationOutcome.Undefined("p-values of 0 and of 1 stand side by side, whose deviates are opposite infinities");
        }

        if (p.Length == 1 || hasZero || hasOne)
        {
            PValue end = hasOne ? PValue.One : hasZero ? PValue.FromValue(0) : p[0];
            return CombinationOutcome.Of(hasOne || hasZero ? double.NaN : Deviate(p[0]), end);
        }

        double z = (sum / DoubleDouble.Sqrt(squares)).High;
        return CombinationOutcome.Of(z, PValue.FromValueAndLog(NormalLaw.UpperTail(z), NormalLaw.LogUpperTail(z)));
    }

    /// <summary>The normal deviate that is exceeded with probability p, for p inside (0, 1).</summary>
    private static double Deviate(PValue p)
    {
        if (p.Value >= FromLogBelow)
        {
            return p.Value <= 0.5 ? -NormalLaw.Quantile(p.Value) : NormalLaw.Quantile(1 - p.Value);
        }

        // Newton's steps on the logarithm of the tail, whose slope is the reciprocal of Mills' ratio; it is nearly a parabola, so few are needed.
        double z = Math.Sqrt(-2 * p.Log);
        for (int step = 0; step < 60; step++)
        {
            double next = z + ((NormalLaw.LogUpperTail(z) - p.Log) * NormalLaw.MillsRatio(z));
            if (Math.Abs(next - z) <= 1e-15 * z)
            {
                return next;
            }

            z = next;
        }

        return z;
    }
}
