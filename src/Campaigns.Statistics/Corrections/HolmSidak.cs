using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>Holm's step-down correction with Sidak's in the place of Bonferroni's at every step.</summary>
/// <remarks>The adjusted p-value of rank k is the largest 1 - (1 - p(j))^(m - j + 1) over j &lt;= k, each computed without cancellation and rounded once. Sidak's inequality is needed for every subset of the true nulls.</remarks>
public sealed class HolmSidak : Correction
{
    /// <inheritdoc/>
    public override string Key => "holm-sidak";

    /// <inheritdoc/>
    public override string Name => "Holm-Sidak";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Sidak;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level if the experiments are independent, or dependent in the way of Sidak's inequality.";

    /// <inheritdoc/>
    public override string Source => "B. S. Holland and M. D. Copenhaver (1987), Biometrics 43:417-423";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level) => -Accurate.Expm1(Accurate.Log1p(-level) / (familySize - rank + 1));

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = SidakPower.Of(sorted[k], familySize - k);
        }

        Steps.Down(adjusted);
    }
}
