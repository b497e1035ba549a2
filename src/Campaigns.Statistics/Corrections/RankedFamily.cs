using System.Buffers;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Corrections;

/// <summary>The p-values of one family, ranked once for all corrections, with the size of the family as it was planned.</summary>
/// <remarks>
/// Ascending; equal p-values keep the order in which they were given. P-values below <see cref="TailBound"/> are ranked by their logarithms, so that
/// nothing ties at zero that is not zero. The family is a copy: later changes to the caller's memory do not reach it.
/// </remarks>
public sealed class RankedFamily
{
    /// <summary>Below this p-value ranks and corrections go by the logarithm, because doubles soon lose digits there and then end.</summary>
    internal const double TailBound = 1e-290;

    /// <summary>Below this p-value a double lacks digits.</summary>
    internal const double SmallestNormal = 2.2250738585072014e-308; // 2^-1022

    private readonly double[] _sorted;
    private readonly int[] _order;

    // In the order in which they were given; null where every logarithm is that of its double, which is computed when it is asked for: that is rare, and 100,000 pass through every review.
    private readonly PValue[]? _given;

    private RankedFamily(double[] sorted, int[] order, PValue[]? given, int familySize, int tailCount)
    {
        _sorted = sorted;
        _order = order;
        _given = given;
        FamilySize = familySize;
        TailCount = tailCount;
    }

    /// <summary>P-values at hand.</summary>
    public int Count => _sorted.Length;

    /// <summary>Hypotheses in the family, at least <see cref="Count"/>; those without a p-value count as p = 1.</summary>
    public int FamilySize { get; }

    /// <summary>The p-values at hand as doubles, ascending; one below the range of doubles shows as 0.</summary>
    public ReadOnlySpan<double> Sorted => _sorted;

    /// <summary>For each rank, counted from 0, the position at which that p-value was given.</summary>
    public ReadOnlySpan<int> Order => _order;

    /// <summary>Whether the hypotheses of the family weigh differently for the corrections that ask.</summary>
    public bool HasWeights => ByWeight is not null;

    /// <summary>How many of the p-values lie below <see cref="TailBound"/>: the first ranks.</summary>
    internal int TailCount { get; }

    /// <summary>The same family ranked by p/w, hypotheses of weight 0 last; null without weights. Its p-values need not ascend, and its tail is one of p/w.</summary>
    internal RankedFamily? ByWeight { get; private init; }

    /// <summary>The weights in the order of the ranks, in a family that is ranked by them; else null.</summary>
    internal FamilyWeights? Weights { get; private init; }

    /// <summary>Ranks p-values.</summary>
    /// <param name="pValues">The p-values at hand, in any order.</param>
    /// <param name="familySize">Hypotheses in the family, tested or not; at least the number of p-values.</param>
    /// <exception cref="ArgumentException">The family is smaller than the number of p-values.</exception>
    /// <exception cref="InvalidOperationException">One of the p-values was never given.</exception>
    public static RankedFamily Of(ReadOnlySpan<PValue> pValues, int familySize)
    {
        CheckSize(pValues.Length, familySize);
        double[] values = ArrayPool<double>.Shared.Rent(pValues.Length);
        for (int i = 0; i < pValues.Length; i++)
        {
            values[i] = pValues[i].Value + 0.0;
        }

        (double[] sorted, int[] order) = Ranking.Ascending(values.AsSpan(0, pValues.Length));
        ArrayPool<double>.Shared.Return(values);
        int tail = LowerBound(sorted, TailBound);
        if (tail > 1)
        {
            RankTailByLog(LogsInOrder(pValues, order.AsSpan(0, tail)), sorted.AsSpan(0, tail), order.AsSpan(0, tail));
        }

        return new RankedFamily(sorted, order, WithLogs(pValues, tail), familySize, tail);
    }

    /// <summary>Ranks p-values of hypotheses that weigh differently. Corrections that do not ask for weights see the same family as without.</summary>
    /// <param name="pValues">The p-values at hand, in any order.</param>
    /// <param name="familySize">Hypotheses in the family, tested or not; at least the number of p-values.</param>
    /// <param name="weights">One weight for each p-value, fixed before the data: 0 or more, on any scale. At weight 0 a hypothesis is never rejected, even at p = 0; a weight below 10^-30 of the largest is taken for 0.</param>
    /// <param name="weightOfRest">The sum of the weights of the hypotheses that were planned and not tested, on the same scale; 0 where there are none.</param>
    /// <exception cref="ArgumentException">The family is smaller than the number of p-values; not one weight a p-value; a weight that is negative, infinite or NaN; all 0; a rest where nothing is untested.</exception>
    /// <exception cref="InvalidOperationException">One of the p-values was never given.</exception>
    public static RankedFamily Of(ReadOnlySpan<PValue> pValues, int familySize, ReadOnlySpan<double> weights, double weightOfRest)
    {
        RankedFamily byP = Of(pValues, familySize);
        (double[] scaled, double rest) = FamilyWeights.Scaled(weights, weightOfRest, pValues.Length, familySize);
        return new RankedFamily(byP._sorted, byP._order, byP._given, familySize, byP.TailCount) { ByWeight = OfWeighted(pValues, familySize, scaled, rest) };
    }

    /// <summary>Ranks p-values given as doubles in [0, 1].</summary>
    /// <param name="pValues">The p-values at hand, in any order.</param>
    /// <param name="familySize">Hypotheses in the family, tested or not; at least the number of p-values.</param>
    /// <exception cref="ArgumentException">The family is smaller than the number of p-values, or one of them is NaN or outside [0, 1].</exception>
    public static RankedFamily Of(ReadOnlySpan<double> pValues, int familySize)
    {
        CheckSize(pValues.Length, familySize);
        double[] values = ArrayPool<double>.Shared.Rent(pValues.Length);
        for (int i = 0; i < pValues.Length; i++)
        {
            double p = pValues[i];
            if (!(p >= 0 && p <= 1))
            {
                throw new ArgumentException(FormattableString.Invariant($"A p-value lies in [0, 1]; number {i + 1} of the family is {p:R}."), nameof(pValues));
            }

            // Adding 0 turns -0 into 0: its sign bit would rank it last.
            values[i] = p + 0.0;
        }

        (double[] sorted, int[] order) = Ranking.Ascending(values.AsSpan(0, pValues.Length));
        ArrayPool<double>.Shared.Return(values);
        return new RankedFamily(sorted, order, null, familySize, LowerBound(sorted, TailBound));
    }

    /// <summary>The natural logarithm of the p-value of a rank, as it was given or else of its double.</summary>
    internal double Log(int rank) => _given is null ? Math.Log(_sorted[rank]) : _given[_order[rank]].Log;

    private static RankedFamily OfWeighted(ReadOnlySpan<PValue> pValues, int familySize, double[] weights, double rest)
    {
        var quotients = new (double High, double Low, int Position)[pValues.Length];
        for (int i = 0; i < quotients.Length; i++)
        {
            double high = weights[i] == 0 ? double.PositiveInfinity : OverWeight(pValues[i], weights[i]);

            // What the rounded quotient leaves out ranks those that are equal only by rounding.
            double low = weights[i] == 0 ? 0 : Math.FusedMultiplyAdd(-high, weights[i], pValues[i].Value) / weights[i];
            quotients[i] = (high, low, i);
        }

        Array.Sort(quotients, static (a, b) => a.High != b.High ? a.High.CompareTo(b.High) : a.Low != b.Low ? a.Low.CompareTo(b.Low) : a.Position.CompareTo(b.Position));
        double[] keys = [.. quotients.Select(q => q.High)];
        int[] order = [.. quotients.Select(q => q.Position)];
        int tail = LowerBound(keys, TailBound);
        double[] logs = LogsInOrder(pValues, order.AsSpan(0, tail));
        for (int rank = 0; rank < tail; rank++)
        {
            logs[rank] -= Math.Log(weights[order[rank]]);
        }

        RankTailByLog(logs, keys.AsSpan(0, tail), order.AsSpan(0, tail));
        double[] inOrder = new double[order.Length];
        for (int rank = 0; rank < order.Length; rank++)
        {
            inOrder[rank] = pValues[order[rank]].Value + 0.0;
        }

        return new RankedFamily(inOrder, order, WithLogs(pValues, tail), familySize, tail) { Weights = FamilyWeights.InOrder(weights, rest, order) };
    }

    /// <summary>p/w as a double, from the logarithm where p has lost digits and a small weight brings the quotient back into the range.</summary>
    private static double OverWeight(PValue p, double weight)
    {
        if (p.Value >= SmallestNormal)
        {
            return p.Value / weight;
        }

        double log = p.Log - Math.Log(weight);
        return Math.Exp(log) >= TailBound ? Math.Exp(log) : (p.Value + 0.0) / weight;
    }

    private static double[] LogsInOrder(ReadOnlySpan<PValue> pValues, ReadOnlySpan<int> order)
    {
        double[] logs = new double[order.Length];
        for (int rank = 0; rank < order.Length; rank++)
        {
            logs[rank] = pValues[order[rank]].Log;
        }

        return logs;
    }

    /// <summary>A copy of the p-values where one has a logarithm of its own, or lies so low that its double may be one of another rank; else null.</summary>
    private static PValue[]? WithLogs(ReadOnlySpan<PValue> pValues, int tailCount)
    {
        if (tailCount > 0)
        {
            return pValues.ToArray();
        }

        foreach (ref readonly PValue p in pValues)
        {
            if (p.HasOwnLog)
            {
                return pValues.ToArray();
            }
        }

        return null;
    }

    private static void CheckSize(int count, int familySize)
    {
        if (familySize < count)
        {
            throw new ArgumentException(
                FormattableString.Invariant($"A family of {familySize} cannot hold {count} p-values: its size counts every planned hypothesis, tested or not."),
                nameof(familySize));
        }
    }

    private static void RankTailByLog(ReadOnlySpan<double> logs, Span<double> sorted, Span<int> order)
    {
        var keys = new (double Log, int Position, double Value)[order.Length];
        for (int rank = 0; rank < keys.Length; rank++)
        {
            keys[rank] = (logs[rank], order[rank], sorted[rank]);
        }

        Array.Sort(keys, static (a, b) => a.Log != b.Log ? a.Log.CompareTo(b.Log) : a.Position.CompareTo(b.Position));
        double highest = 0;
        for (int rank = 0; rank < keys.Length; rank++)
        {
            order[rank] = keys[rank].Position;

            // Values and logarithms come from separate computations: where they disagree by a rounding, the values stay ascending.
            highest = Math.Max(highest, keys[rank].Value);
            sorted[rank] = highest;
        }
    }

    private static int LowerBound(ReadOnlySpan<double> sorted, double bound)
    {
        int low = 0;
        int high = sorted.Length;
        while (low < high)
        {
            int middle = low + ((high - low) >> 1);
            if (sorted[middle] < bound)
            {
                low = middle + 1;
            }
            else
            {
                high = middle;
            }
        }

        return low;
    }
}
