using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>The law of von Neumann's ratio of the residuals of a layout in run order, the sum of squared successive differences over the sum of squares, for independent normal errors of equal variance.</summary>
/// <param name="Mean">Its exact mean: 2 only about, and for groups run one after the other far from it.</param>
/// <param name="Variance">Its exact variance.</param>
/// <param name="DegreesOfFreedom">Residual degrees of freedom of the layout.</param>
/// <remarks>
/// With A the matrix of squared differences and M the projector on residuals, mean tr(MA)/v, variance 2 (tr((MA)^2) - tr(MA)^2/v)/(v (v + 2)); the traces come from counts of neighbours, so that no matrix of the size of the sample is formed.
/// A quarter of the ratio is then taken for a beta variable with these moments.
/// Cost: linear in the number of values; with blocks, times the square of the number of groups.
/// Sources: J. von Neumann, Annals of Mathematical Statistics 12 (1941) 367; J. Durbin and G. S. Watson, Biometrika 37 (1950) 409 and 38 (1951) 159, on moments and the beta law.
/// </remarks>
public readonly record struct SuccessiveDifferences(double Mean, double Variance, int DegreesOfFreedom)
{
    /// <summary>Below that, the variance is nothing but rounding: the layout leaves the ratio no choice.</summary>
    private const double SmallestVariance = 1e-12;

    /// <summary>Moments for a layout of groups.</summary>
    /// <param name="groups">Group of each value, in run order; numbers from 0 on.</param>
    /// <returns>Null for fewer than two residual degrees of freedom, or where the ratio cannot vary.</returns>
    public static SuccessiveDifferences? OneWay(ReadOnlySpan<int> groups)
    {
        var averaging = new LevelAverages(groups);
        double trace = Trace(groups.Length) - averaging.Trace;
        double square = SquareTrace(groups.Length) - (2 * averaging.TraceOfSquare) + averaging.SquareTrace;
        return Moments(trace, square, groups.Length - averaging.Levels);
    }

    /// <summary>Moments for an additive layout of blocks and groups.</summary>
    /// <param name="blocks">Block of each value, in run order; numbers from 0 on.</param>
    /// <param name="groups">Group of each value, in run order; numbers from 0 on.</param>
    /// <returns>Null where blocks do not connect all groups, for fewer than two residual degrees of freedom, or where the ratio cannot vary.</returns>
    /// <remarks>The projector on blocks and groups is that on blocks, P, and X C^- X' with X the groups less their averages in each block and C = X'X.</remarks>
    public static SuccessiveDifferences? WithinBlocks(ReadOnlySpan<int> blocks, ReadOnlySpan<int> groups)
    {
        var averaging = new LevelAverages(blocks);
        if (AdjustedGroups.Of(blocks, groups) is not { } adjusted)
        {
            return null;
        }

        double trace = Trace(groups.Length) - averaging.Trace - adjusted.Trace;
        double square = SquareTrace(groups.Length)
            - (2 * averaging.TraceOfSquare) - (2 * adjusted.TraceOfSquare)
            + averaging.SquareTrace + (2 * adjusted.MixedTrace) + adjusted.SquareTrace;
        return Moments(trace, square, groups.Length - averaging.Levels - adjusted.Rank);
    }

    /// <summary>The two-sided p-value of a ratio: twice the smaller tail.</summary>
    /// <param name="ratio">Between 0 and 4, both excluded.</param>
    public PValue TwoSidedPValue(double ratio)
    {
        double sum = (Mean * (4 - Mean) / Variance) - 1;
        double alpha = sum * Mean / 4;
        double beta = sum * (4 - Mean) / 4;

        // A beta variable x with (alpha, beta) is F with (2 alpha, 2 beta) degrees of freedom by way of F = x beta/((1 - x) alpha).
        var law = new FDistribution(2 * alpha, 2 * beta);
        double f = ratio * beta / ((4 - ratio) * alpha);
        return PValue.FromLog(Math.Min(0, Math.Log(2) + Math.Min(law.LogLowerTail(f), law.LogUpperTail(f))));
    }

    private static SuccessiveDifferences? Moments(double trace, double square, int df)
    {
        if (df < 2)
        {
            return null;
        }

        double mean = trace / df;
        double variance = 2 * (square - (trace * mean)) / ((double)df * (df + 2));
        bool varies = variance > SmallestVariance && mean > 0 && mean < 4 && mean * (4 - mean) > variance;
        return varies ? new SuccessiveDifferences(mean, variance, df) : null;
    }

    /// <summary>tr(A): 2 for every value, 1 at both ends.</summary>
    private static double Trace(int count) => 2.0 * (count - 1);

    /// <summary>tr(A^2): the squares of that, and two ones for every pair of neighbours.</summary>
    private static double SquareTrace(int count) => (4.0 * (count - 2)) + 2 + (2.0 * (count - 1));
}
