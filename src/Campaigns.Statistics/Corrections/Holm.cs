namespace Campaigns.Statistics.Corrections;

/// <summary>Holm's step-down correction, never weaker than Bonferroni's.</summary>
/// <remarks>With p(1) &lt;= p(2) &lt;= ..., the adjusted p-value of rank k is the largest (m - j + 1) p(j) over j &lt;= k; each product is rounded once.</remarks>
public sealed class Holm : Correction
{
    /// <inheritdoc/>
    public override string Key => "holm";

    /// <inheritdoc/>
    public override string Name => "Holm";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level, whatever the dependence between experiments.";

    /// <inheritdoc/>
    public override string Source => "S. Holm (1979), Scandinavian Journal of Statistics 6:65-70";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level) => level / (familySize - rank + 1);

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = (familySize - k) * sorted[k];
        }

        Steps.Down(adjusted);
    }
}
