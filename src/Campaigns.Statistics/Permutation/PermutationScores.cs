using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Permutation;

/// <summary>The values of one experiment, ready to tell of any arrangement whether its F is at least the observed one.</summary>
/// <remarks>
/// For given values F rises with S = sum of T_i^2/n_i, T_i the sum of group i, whatever constant is taken from the values before: arrangements are compared by S.
/// The comparison is exact, so an arrangement that ties with the observed one always counts, in whatever order its sums were formed. The values are the typed decimals as integers, about the middle of their range and over their greatest common divisor; then
/// either everything that is formed from them stays below 2^53, where doubles hold integers exactly (24 values: up to 7 digits), or S is computed in doubles with a bound on its rounding error, and the rare S that comes too near the observed one is formed again from integers of any size.
/// Values are sorted, so that the order of the rows, the names of the groups, a constant added or a positive factor change nothing in what a seed gives.
/// Source of the method of bounds: J. R. Shewchuk, Discrete and Computational Geometry 18, 1997 (floating-point filters).
/// </remarks>
public sealed class PermutationScores
{
    private const double UnitRoundoff = 1.1102230246251565e-16;
    private const double ExactDoubles = 9007199254740992;
    private const int BitsKept = 60;

    private readonly ExactScores _exact;

    private PermutationScores(PermutationDesign design, ExactScores exact)
    {
        _exact = exact;
        Design = design;
        BigInteger largest = exact.Largest;
        int shift = (int)Math.Max(0, (long)largest.GetBitLength() - BitsKept);
        Values = exact.Rounded(shift);
        Total = Values.Sum();
        Weights = new double[design.Sizes.Length];
        BigInteger multiple = exact.Multiple;
        bool allExact = multiple * design.Count * largest * largest <= (BigInteger)ExactDoubles;
        for (int i = 0; i < Weights.Length; i++)
        {
            Weights[i] = allExact ? (double)(multiple / design.Sizes[i]) : 1.0 / design.Sizes[i];
        }

        (Low, High) = allExact
            ? ((double)exact.Observed, (double)exact.Observed)
            : Bounds(shift, largest * design.Count <= (BigInteger)ExactDoubles);
    }

    /// <summary>The group sizes.</summary>
    public PermutationDesign Design { get; }

    /// <summary>The values as doubles, ascending.</summary>
    internal double[] Values { get; }

    /// <summary>The sum of the values.</summary>
    internal double Total { get; }

    /// <summary>For each group the factor of its squared sum.</summary>
    internal double[] Weights { get; }

    /// <summary>Below this computed S, an arrangement is less extreme than the observed one.</summary>
    internal double Low { get; }

    /// <summary>From this computed S on, it is at least as extreme; equal to <see cref="Low"/> where nothing is rounded.</summary>
    internal double High { get; }

    /// <summary>Takes the values of an experiment.</summary>
    /// <param name="sample">Any sample with at least two groups that hold values.</param>
    /// <param name="design">Its design, where the caller has it at hand; one that differs is not used.</param>
    /// <exception cref="ArgumentException">Fewer than two groups hold values, or a value belongs to no group.</exception>
    public static PermutationScores Of(GroupedSample sample, PermutationDesign? design = null)
    {
        var sizes = new int[sample.GroupCount];
        foreach (ushort group in sample.Groups)
        {
            sizes[group < sizes.Length ? group : throw new ArgumentException(FormattableString.Invariant($"A value belongs to group {group}, which the sample does not have."), nameof(sample))]++;
        }

        var own = PermutationDesign.Of(sizes);
        return new(own.Equals(design) ? design : own, ExactScores.Of(sample, sizes));
    }

    /// <summary>Whether an arrangement gives at least the observed F; exact.</summary>
    /// <param name="order">Positions of the sorted values, 0 to N - 1, those of the design's first group first, then those of its second, and so on.</param>
    /// <exception cref="ArgumentException">Not N positions.</exception>
    public bool IsAsExtreme(ReadOnlySpan<int> order) =>
        order.Length == Design.Count
            ? _exact.Spread(order, Design.Sizes) >= _exact.Observed
            : throw new ArgumentException("An arrangement places every value.", nameof(order));

    /// <summary>The interval outside which a computed S tells the truth.</summary>
    /// <remarks>
    /// With u = 2^-53, X the largest value and N values: a value is off by at most 2 u X, a sum of them by 8 N^2 u X at most whatever the order of addition (by nothing where sums of integers stay below 2^53), hence S by 2 k X d + k d^2, d being that bound; rounding of products and of their sum adds k + 3 units. All of it is doubled.
    /// </remarks>
    private (double Low, double High) Bounds(int shift, bool sumsExact)
    {
        double groups = Design.Sizes.Length;
        double largest = Math.Max(Math.Abs(Values[0]), Math.Abs(Values[^1]));
        double sumError = sumsExact ? 0 : 8.0 * Design.Count * Design.Count * UnitRoundoff * largest;
        double observed = (WideReal.From(_exact.Observed) / WideReal.From(_exact.Multiple) * WideReal.PowerOfTwo(-2L * shift)).ToDouble();
        double error = 2 * (((groups + 8) * UnitRoundoff * observed) + (groups * sumError * ((2 * largest) + sumError)));
        return (observed - error, observed + error);
    }
}
