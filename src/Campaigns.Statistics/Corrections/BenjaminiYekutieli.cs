using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>The Benjamini-Yekutieli step-up correction for the false discovery rate under any dependence.</summary>
/// <remarks>The adjusted p-value of rank k is the smallest H m p(j) / j over j &gt;= k, at most 1, with H = 1 + 1/2 + ... + 1/m; each quotient is rounded once.</remarks>
public sealed class BenjaminiYekutieli : Correction
{
    /// <inheritdoc/>
    public override string Key => "by";

    /// <inheritdoc/>
    public override string Name => "Benjamini-Yekutieli";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "The expected share of false survivors among all survivors is at most the level, whatever the dependence between experiments.";

    /// <inheritdoc/>
    public override string Source => "Y. Benjamini and D. Yekutieli (2001), Annals of Statistics 29:1165-1188";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level)
    {
        (DoubleDouble factor, double divisor) = HarmonicFactor.Of(familySize);
        return level * divisor * rank / factor.High;
    }

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        (DoubleDouble factor, double divisor) = HarmonicFactor.Of(familySize);
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = ExactProducts.Quotient(sorted[k], factor.High, factor.Low, divisor * (k + 1));
        }

        Steps.Up(adjusted);
    }
}
