namespace Campaigns.Statistics.Corrections;

/// <summary>Hochberg's step-up correction, never weaker than Holm's.</summary>
/// <remarks>The adjusted p-value of rank k is the smallest (m - j + 1) p(j) over j &gt;= k, at most 1; each product is rounded once.</remarks>
public sealed class Hochberg : Correction
{
    /// <inheritdoc/>
    public override string Key => "hochberg";

    /// <inheritdoc/>
    public override string Name => "Hochberg";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Simes;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level if Simes' inequality holds for the true nulls, as it does for independent experiments.";

    /// <inheritdoc/>
    public override string Source => "Y. Hochberg (1988), Biometrika 75:800-802";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level) => level / (familySize - rank + 1);

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = (familySize - k) * sorted[k];
        }

        Steps.Up(adjusted);
    }
}
