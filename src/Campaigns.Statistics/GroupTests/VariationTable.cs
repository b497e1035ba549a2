namespace Campaigns.Statistics.GroupTests;

/// <summary>One line of the table of variation.</summary>
/// <param name="SumOfSquares">Sum of squared deviations, in squared units of the response; positive infinity only where it lies beyond the range of doubles.</param>
/// <param name="DegreesOfFreedom">At least 0.</param>
/// <param name="MeanSquare">Sum of squares over degrees of freedom; NaN never: 0 where there are no degrees of freedom.</param>
public readonly record struct VariationLine(double SumOfSquares, int DegreesOfFreedom, double MeanSquare);

/// <summary>The table of variation of a one-way layout, every number correctly rounded from the exact decimals, or off by at most one unit in the last place.</summary>
/// <param name="Between">Between the group means: k - 1 degrees of freedom.</param>
/// <param name="Within">Within the groups: N - k degrees of freedom.</param>
/// <param name="Total">About the grand mean: N - 1 degrees of freedom.</param>
/// <param name="F">Between mean square over within mean square.</param>
/// <param name="EtaSquared">Between over total sum of squares (R squared); in [0, 1].</param>
/// <param name="OmegaSquared">(SSB - (k - 1) MSW) / (SST + MSW); negative where F is below 1.</param>
/// <param name="ResidualStandardDeviation">Square root of the within mean square, in units of the response.</param>
public sealed record VariationTable(
    VariationLine Between,
    VariationLine Within,
    VariationLine Total,
    double F,
    double EtaSquared,
    double OmegaSquared,
    double ResidualStandardDeviation)
{
    /// <summary>Between blocks, groups disregarded; null where the layout has no blocks. With it, <see cref="Between"/> is adjusted for blocks, and the lines add up to the total.</summary>
    public VariationLine? Blocks { get; init; }
}
