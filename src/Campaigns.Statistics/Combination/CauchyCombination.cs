using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Combination;

/// <summary>The Cauchy combination: the weighted mean of cot(pi p) has, far out, the tail of a Cauchy law, whatever many kinds of dependence.</summary>
/// <remarks>
/// The p-value is atan2(1, T) / pi: half less atan(T) / pi would lose every digit of a small one. p = 1, whose cotangent is minus infinity, counts as 1 - 1/n among n p-values, a
/// convention. Where the smallest p-value is below 10^-300 all terms are taken over the largest.
/// </remarks>
public sealed class CauchyCombination : CombinationTest
{
    private const double ScaledBelow = 1e-300;
    private const double LogPi = 1.1447298858494001741; // Abramowitz and Stegun (1964), table 1.1

    /// <inheritdoc/>
    public override string Key => "cauchy";

    /// <inheritdoc/>
    public override string Name => "Cauchy combination";

    /// <inheritdoc/>
    public override string Assumes => "Exact for independent experiments; under dependence an approximation for small p-values, proved for pairwise normal statistics, and not exact near 0.05 when the dependence is strong. p = 1 counts as 1 - 1/n by convention.";

    /// <inheritdoc/>
    public override string Source => "Y. Liu and J. Xie (2020), Journal of the American Statistical Association 115:393-402";

    /// <inheritdoc/>
    public override bool CountsUntested => false;

    /// <inheritdoc/>
    public override bool TakesWeights => true;

    /// <inheritdoc/>
    protected override CombinationOutcome CombineUsed(ReadOnlySpan<PValue> p, int familySize, ReadOnlySpan<double> weights)
    {
        if (p.Length == 1)
        {
            return CombinationOutcome.Of(p[0].Value is 0 or 1 ? double.NaN : Cotangent(p[0].Value), p[0]);
        }

        PValue smallest = PValue.One;
        DoubleDouble total = default;
        for (int i = 0; i < p.Length; i++)
        {
            smallest = p[i] < smallest ? p[i] : smallest;
            total += DoubleDouble.From(weights[i]);
        }

        if (double.IsNegativeInfinity(smallest.Log))
        {
            return CombinationOutcome.Of(double.PositiveInfinity, PValue.FromValue(0));
        }

        double shift = smallest.Value < ScaledBelow ? smallest.Log : 0;
        DoubleDouble sum = default;
        for (int i = 0; i < p.Length; i++)
        {
            sum += DoubleDouble.From(weights[i]) * DoubleDouble.From(Term(p[i], shift, p.Length));
        }

        double mean = (sum / total).High;
        if (shift < 0)
        {
            // Far out the tail is 1 / (pi T).
            double log = shift - Math.Log(mean) - LogPi;
            return CombinationOutcome.Of(mean * Math.Exp(-shift), PValue.FromLog(log));
        }

        return CombinationOutcome.Of(mean, PValue.FromValue(Math.Min(1, Math.Atan2(1, mean) / Math.PI)));
    }

    /// <summary>cot(pi p) times e^shift.</summary>
    private static double Term(PValue p, double shift, int count) =>
        shift < 0 && p.Value < 1e-20 ? Math.Exp(shift - p.Log) / Math.PI
        : Cotangent(p.Value == 1 ? 1 - (1.0 / count) : p.Value) * Math.Exp(shift);

    /// <summary>cot(pi p) for p inside (0, 1), each part of the range by its own distance from 0, from one half or from 1, which is exact.</summary>
    private static double Cotangent(double p) =>
        p < 0.25 ? 1 / Math.Tan(Math.PI * p)
        : p > 0.75 ? -1 / Math.Tan(Math.PI * (1 - p))
        : Math.Tan(Math.PI * (0.5 - p));
}
