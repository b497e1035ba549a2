using Campaigns.Statistics.Blocks;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.FollowUps;

/// <summary>What follow-up comparisons know of the groups of one experiment: estimated means, their common uncertainty, and each group's own.</summary>
/// <remarks>
/// Differences are formed in about 32 digits from exact sums and rounded once, so that a large offset of the values costs nothing.
/// The covariance of two estimated means is the residual variance times an entry of <c>factors</c>: 1/n on the diagonal and 0 elsewhere for plain groups; within blocks, a generalised inverse of the adjusted normal equations.
/// </remarks>
public sealed class GroupEstimates
{
    /// <summary>Below this share of the means a difference is the rounding error of 32 digits.</summary>
    private const double RoundingShare = 1e-30;

    private readonly WideReal[] _means;
    private readonly int[] _counts;
    private readonly double[] _ownStandardErrors;
    private readonly double[,] _factors;

    /// <summary>For each group how far the solution of the normal equations may have left its mean off; empty where means are not solved for.</summary>
    private WideReal[] _roundings = [];

    /// <summary>Collects the estimates.</summary>
    /// <param name="means">Estimated mean of each group in units of the response, up to a constant common to all; anything for groups without a value.</param>
    /// <param name="counts">Values of each group; 0 where it has none.</param>
    /// <param name="ownStandardErrors">Standard error of each group's mean from its own variance, sd/sqrt(n); NaN for fewer than two values or where it makes no sense.</param>
    /// <param name="factors">Covariances of the estimated means over the residual variance; only differences are used, so that a generalised inverse will do.</param>
    /// <param name="residualStandardDeviation">Square root of the residual mean square, in units of the response; not negative.</param>
    /// <param name="degreesOfFreedom">Of the residual mean square; positive.</param>
    /// <param name="withinBlocks">Whether the means are adjusted for blocks.</param>
    public GroupEstimates(WideReal[] means, int[] counts, double[] ownStandardErrors, double[,] factors, double residualStandardDeviation, int degreesOfFreedom, bool withinBlocks)
    {
        _means = means;
        _counts = counts;
        _ownStandardErrors = ownStandardErrors;
        _factors = factors;
        ResidualStandardDeviation = residualStandardDeviation;
        DegreesOfFreedom = degreesOfFreedom;
        WithinBlocks = withinBlocks;
    }

    /// <summary>Groups of the experiment, those without a value included.</summary>
    public int GroupCount => _counts.Length;

    /// <summary>Groups with at least one value: the k of all-pairs procedures.</summary>
    public int ComparedCount => _counts.Count(n => n > 0);

    /// <summary>Degrees of freedom of the residual mean square.</summary>
    public int DegreesOfFreedom { get; }

    /// <summary>Square root of the residual mean square, in units of the response; 0 where values inside every group are all the same.</summary>
    public double ResidualStandardDeviation { get; }

    /// <summary>Whether the means are adjusted for blocks; groups then have no variance of their own.</summary>
    public bool WithinBlocks { get; }

    /// <summary>Estimates of plain groups.</summary>
    /// <param name="units">Independent values.</param>
    /// <returns>Null where fewer than two groups hold values, or no group holds two.</returns>
    public static GroupEstimates? OneWay(GroupedSample units)
    {
        OneWayLayout layout = OneWayLayout.Of(units);
        if (layout.Obstacle is NotTestableReason.TooFewGroups or NotTestableReason.NoReplication)
        {
            return null;
        }

        int groups = units.GroupCount;
        ExactMoments moments = ExactMoments.Of(units, new GroupSums[groups]);
        var means = new WideReal[groups];
        var counts = new int[groups];
        var own = new double[groups];
        var factors = new double[groups, groups];
        WideReal within = WideReal.Zero;
        for (int i = 0; i < groups; i++)
        {
            int n = counts[i] = (int)moments.CountOf(i);
            if (n > 0)
            {
                WideReal squares = moments.CountTimesSquaredDeviations(i) / n;
                within += squares;
                means[i] = moments.Sum(i) / n * units.Unit;
                factors[i, i] = 1.0 / n;
                own[i] = n < 2 ? double.NaN : (WideReal.Sqrt(squares / (n - 1) / n) * units.Unit).ToDouble();
            }
        }

        double residual = (WideReal.Sqrt(within / layout.WithinDegreesOfFreedom) * units.Unit).ToDouble();
        return new GroupEstimates(means, counts, own, factors, residual, layout.WithinDegreesOfFreedom, withinBlocks: false);
    }

    /// <summary>Estimates of groups within blocks, adjusted for block effects.</summary>
    /// <param name="units">Independent values with their blocks.</param>
    /// <returns>Null where a value has no block, fewer than two groups hold values, no block links some of them, or no residual degree of freedom is left.</returns>
    /// <remarks>From <see cref="BlockLayout"/>; the factors are minus half the variances of the differences, a generalised inverse from which these come back without rounding.</remarks>
    public static GroupEstimates? InBlocks(GroupedSample units)
    {
        var layout = BlockLayout.Of(units);
        if (!layout.IsFitted)
        {
            return null;
        }

        int groups = units.GroupCount;
        var means = new WideReal[groups];
        var counts = new int[groups];
        var own = new double[groups];
        var factors = new double[groups, groups];
        var roundings = new WideReal[groups];
        double[,] variances = layout.Elimination.DifferenceVariances();
        int[] numbers = layout.Design.GroupNumbers;
        Array.Fill(own, double.NaN);
        for (int i = 0; i < numbers.Length; i++)
        {
            means[numbers[i]] = layout.Fit.Effects[i] * units.Unit;
            roundings[numbers[i]] = layout.Fit.Roundings[i] * units.Unit;
            counts[numbers[i]] = layout.Design.GroupCounts[i];
            for (int h = 0; h < numbers.Length; h++)
            {
                factors[numbers[i], numbers[h]] = -variances[i, h] / 2;
            }
        }

        return new GroupEstimates(means, counts, own, factors, layout.ResidualStandardDeviation.ToDouble(), layout.ResidualDegreesOfFreedom, withinBlocks: true) { _roundings = roundings };
    }

    /// <summary>Values of a group.</summary>
    /// <param name="group">0 to <see cref="GroupCount"/> - 1.</param>
    public int CountOf(int group) => _counts[group];

    /// <summary>Mean of group b less mean of group a, in units of the response, rounded once.</summary>
    /// <param name="a">The group that is taken away.</param>
    /// <param name="b">The group that it is taken from.</param>
    /// <returns>Exactly 0 where the means are the same.</returns>
    public double Difference(int a, int b) => WideDifference(a, b).ToDouble();

    /// <summary>That difference over its standard error from the residual mean square: Student's t.</summary>
    /// <param name="a">The group that is taken away.</param>
    /// <param name="b">The group that it is taken from.</param>
    /// <returns>0 where the difference is 0; the largest double, with the sign of the difference, where the quotient exceeds it or the residual standard deviation is 0. Never NaN.</returns>
    public double T(int a, int b)
    {
        WideReal difference = WideDifference(a, b);
        double error = Math.Sqrt(VarianceFactor(a, b));
        return difference.Sign == 0 ? 0
            : ResidualStandardDeviation == 0 ? double.MaxValue * difference.Sign
            : Math.Clamp((difference / ResidualStandardDeviation / error).ToDouble(), -double.MaxValue, double.MaxValue);
    }

    /// <summary>Standard error of that difference, from the residual mean square.</summary>
    /// <param name="a">One group.</param>
    /// <param name="b">Another.</param>
    public double StandardErrorOfDifference(int a, int b) => ResidualStandardDeviation * Math.Sqrt(VarianceFactor(a, b));

    /// <summary>Standard error of a group's mean from its own variance; NaN where it has none.</summary>
    /// <param name="group">0 to <see cref="GroupCount"/> - 1.</param>
    public double OwnStandardError(int group) => _ownStandardErrors[group];

    /// <summary>Correlation of the estimated differences of groups a and b with a third.</summary>
    /// <param name="a">One group.</param>
    /// <param name="b">Another.</param>
    /// <param name="from">The group that both are held against.</param>
    /// <returns>In [-1, 1]; n_from-dependent and positive for plain groups: sqrt(n_a n_b/((n_a + n_from)(n_b + n_from))).</returns>
    public double CorrelationOfDifferences(int a, int b, int from)
    {
        double covariance = _factors[a, b] - _factors[a, from] - _factors[from, b] + _factors[from, from];
        return Math.Clamp(covariance / Math.Sqrt(VarianceFactor(a, from) * VarianceFactor(b, from)), -1, 1);
    }

    private WideReal WideDifference(int a, int b)
    {
        WideReal difference = _means[b] - _means[a];
        if (_roundings.Length > 0 && (difference.Size - (_roundings[a] + _roundings[b])).Sign <= 0)
        {
            return WideReal.Zero;
        }

        double size = Math.Max(Magnitude(_means[a]), Magnitude(_means[b]));
        return Magnitude(difference) <= size + Math.Log(RoundingShare) ? WideReal.Zero : difference;

        static double Magnitude(WideReal value) => value.Size.Log();
    }

    private double VarianceFactor(int a, int b) => _factors[a, a] + _factors[b, b] - _factors[a, b] - _factors[b, a];
}
