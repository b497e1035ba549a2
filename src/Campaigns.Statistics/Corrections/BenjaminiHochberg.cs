namespace Campaigns.Statistics.Corrections;

/// <summary>The Benjamini-Hochberg step-up correction for the false discovery rate.</summary>
/// <remarks>The adjusted p-value of rank k is the smallest m p(j) / j over j &gt;= k, at most 1; each quotient is rounded once.</remarks>
public sealed class BenjaminiHochberg : Correction
{
    /// <inheritdoc/>
    public override string Key => "bh";

    /// <inheritdoc/>
    public override string Name => "Benjamini-Hochberg";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.PositiveRegression;

    /// <inheritdoc/>
    public override string Guarantee => "The expected share of false survivors among all survivors is at most the level if the experiments are independent or positively dependent.";

    /// <inheritdoc/>
    public override string Source => "Y. Benjamini and Y. Hochberg (1995), Journal of the Royal Statistical Society B 57:289-300; positive dependence: Y. Benjamini and D. Yekutieli (2001), Annals of Statistics 29:1165-1188";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level) => level * rank / familySize;

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = ExactProducts.Quotient(sorted[k], familySize, 0, k + 1);
        }

        Steps.Up(adjusted);
    }
}
