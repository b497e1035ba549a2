using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Effects;

/// <summary>How large the differences between the groups of one experiment are, freed of the unit of the response, with confidence intervals.</summary>
/// <remarks>
/// All of it refers to the F test: independent, normally distributed values with the same variance in every group.
/// The intervals come from those lambda at which the F that was seen would be just as extreme as the confidence allows: P(F > F_seen; lower) = (1 - confidence)/2 = P(F at most F_seen; upper); Cohen's f is sqrt(lambda/N), the share of the population's variation lambda/(lambda + N).
/// With confidence 1 - 2 level the lower bound exceeds 0 exactly where the p-value is below the level. A bound of 0 is a result, not a failure, and both may be 0, where F is smaller than chance alone lets expect.
/// Source: Steiger (2004), Psychological Methods 9:164.
/// </remarks>
public sealed record EffectSizes
{
    private EffectSizes()
    {
    }

    /// <summary>Eta squared: the share of the variation seen that lies between the groups, SSB/(SSB + SSW); in [0, 1]. Chance alone makes it positive.</summary>
    public required double EtaSquared { get; init; }

    /// <summary>Epsilon squared, (SSB - df1 MSW)/(SSB + SSW): eta squared less what chance contributes on average; negative where F is below 1.</summary>
    public required double EpsilonSquared { get; init; }

    /// <summary>Omega squared, (SSB - df1 MSW)/(SSB + SSW + MSW): an estimate of the share of the population's variation; negative where F is below 1.</summary>
    public required double OmegaSquared { get; init; }

    /// <summary>Cohen's f of the sample, sqrt(SSB/SSW): the spread of the group means over the spread within groups; at least 0.</summary>
    public required double CohenF { get; init; }

    /// <summary>Confidence of the intervals, in (0, 1): 1 - 2 level.</summary>
    public required double Confidence { get; init; }

    /// <summary>The interval of the noncentrality lambda.</summary>
    public required Interval NoncentralityInterval { get; init; }

    /// <summary>The interval of the share of the population's variation, lambda/(lambda + N); within [0, 1].</summary>
    public required Interval EtaSquaredInterval { get; init; }

    /// <summary>The interval of the population's Cohen's f, sqrt(lambda/N).</summary>
    public required Interval CohenFInterval { get; init; }

    /// <summary>The effect sizes of a table of variation.</summary>
    /// <param name="table">Of a one-way layout, or within blocks.</param>
    /// <param name="level">The level of the F test that the intervals match; below 0.5. 0.05 gives 90 % intervals.</param>
    /// <returns>Within blocks the partial effect sizes: the variation between blocks is left out of every share, and N is df1 + df2 + 1, the observations less the degrees of freedom of the blocks.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The level is 0.5 or more.</exception>
    public static EffectSizes Of(VariationTable table, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(table);
        EffectSizes sizes = Of(table.F, table.Between.DegreesOfFreedom, table.Within.DegreesOfFreedom, level);

        // The table of a one-way layout has these two rounded once from exact numbers.
        return table.Blocks is null ? sizes with { EtaSquared = table.EtaSquared, OmegaSquared = table.OmegaSquared } : sizes;
    }

    /// <summary>The effect sizes that belong to a value of F.</summary>
    /// <param name="f">F; at least 0 and finite.</param>
    /// <param name="df1">Degrees of freedom between groups, positive and finite.</param>
    /// <param name="df2">Degrees of freedom within groups, positive and finite. N is taken as df1 + df2 + 1, which it is in a one-way layout.</param>
    /// <param name="level">The level of the F test that the intervals match; below 0.5.</param>
    /// <exception cref="ArgumentOutOfRangeException">An argument is outside its range.</exception>
    /// <remarks>Cost: two noncentral F tails inverted, about 30 us, ten times that for lambda above 200. Sums of squares do not enter, so that responses of 1e-300 or 1e300 are as good as others.</remarks>
    public static EffectSizes Of(double f, double df1, double df2, SignificanceLevel level)
    {
        if (!(f >= 0 && double.IsFinite(f)))
        {
            throw new ArgumentOutOfRangeException(nameof(f), f, "F is at least 0 and finite.");
        }

        if (level.Value >= 0.5)
        {
            throw new ArgumentOutOfRangeException(nameof(level), level.Value, "The level of an interval's match is below 0.5.");
        }

        double ratio = df1 / df2;
        double total = (ratio * f) + 1;
        var lambda = new Interval(
            NoncentralF.NoncentralityOfUpperTail(f, df1, df2, level.Value),
            NoncentralF.NoncentralityOfLowerTail(f, df1, df2, level.Value));
        double n = df1 + df2 + 1;
        return new EffectSizes
        {
            EtaSquared = Share(ratio * f),
            EpsilonSquared = double.IsFinite(total) ? ratio * (f - 1) / total : 1,
            OmegaSquared = double.IsFinite(total) ? ratio * (f - 1) / (total + (1 / df2)) : 1,
            CohenF = Math.Sqrt(ratio) * Math.Sqrt(f),
            Confidence = 1 - (2 * level.Value),
            NoncentralityInterval = lambda,
            EtaSquaredInterval = new Interval(Share(lambda.Lower / n), Share(lambda.Upper / n)),
            CohenFInterval = new Interval(Math.Sqrt(lambda.Lower / n), Math.Sqrt(lambda.Upper / n)),
        };
    }

    /// <summary>r/(1 + r), which is 1 where r lies beyond the range of doubles.</summary>
    private static double Share(double r) => double.IsFinite(r) ? r / (1 + r) : 1;
}
