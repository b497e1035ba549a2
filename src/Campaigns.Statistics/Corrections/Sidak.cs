using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>Sidak's correction: the probability that the smallest of m independent p-values is at most p.</summary>
/// <remarks>The adjusted p-value is 1 - (1 - p)^m, computed without cancellation and rounded once.</remarks>
public sealed class Sidak : Correction
{
    /// <inheritdoc/>
    public override string Key => "sidak";

    /// <inheritdoc/>
    public override string Name => "Sidak";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Sidak;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level if the experiments are independent, or dependent in the way of Sidak's inequality.";

    /// <inheritdoc/>
    public override string Source => "Z. Sidak (1967), Journal of the American Statistical Association 62:626-633";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level) => -Accurate.Expm1(Accurate.Log1p(-level) / familySize);

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = SidakPower.Of(sorted[k], familySize);
        }
    }
}
