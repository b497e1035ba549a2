namespace Campaigns.Statistics.Corrections;

/// <summary>No correction: the p-values as they are, for comparison.</summary>
/// <remarks>The adjusted p-value is p.</remarks>
public sealed class Uncorrected : Correction
{
    /// <inheritdoc/>
    public override string Key => "none";

    /// <inheritdoc/>
    public override string Name => "No correction";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.PerTest;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "Each test on its own gives a false positive with probability at most the level; over the family nothing is held.";

    /// <inheritdoc/>
    public override string Source => "The definition of a p-value; R. A. Fisher (1925), Statistical Methods for Research Workers";

    /// <inheritdoc/>
    public override double? BoundaryAt(int rank, int familySize, double level) => level;

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        sorted.CopyTo(adjusted);
    }
}
