namespace Campaigns.Statistics.Corrections;

/// <summary>Bonferroni's correction: every p-value times the size of the family.</summary>
/// <remarks>The adjusted p-value is m p, one product rounded once.</remarks>
public sealed class Bonferroni : Correction
{
    /// <inheritdoc/>
    public override string Key => "bonferroni";

    /// <inheritdoc/>
    public override string Name => "Bonferroni";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level, whatever the dependence between experiments.";

    /// <inheritdoc/>
    public override string Source => "O. J. Dunn (1961), Journal of the American Statistical Association 56:52-64";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level) => level / familySize;

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = familySize * sorted[k];
        }
    }
}
