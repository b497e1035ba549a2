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

    private readonly double[] _sorted;
    private readonly int[] _order;
    private readonly double[]? _logs;

    private RankedFamily(double[] sorted, int[] order, double[]? logs, int familySize)
    {
        _sorted = sorted;
        _order = order;
        _logs = logs;
        FamilySize = familySize;
        TailCount = LowerBound(sorted, TailBound);
    }

    /// <summary>P-values at hand.</summary>
    public int Count => _sorted.Length;

    /// <summary>Hypotheses in the family, at least <see cref="Count"/>; those without a p-value count as p = 1.</summary>
    public int FamilySize { get; }

    /// <summary>The p-values at hand as doubles, ascending; one below the range of doubles shows as 0.</summary>
    public ReadOnlySpan<double> Sorted => _sorted;

    /// <summary>For each rank, counted from 0, the position at which that p-value was given.</summary>
    public ReadOnlySpan<int> Order => _order;

    /// <summary>How many of the p-values lie below <see cref="TailBound"/>: the first ranks.</summary>
    internal int TailCount { get; }

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
            RankTailByLog(pValues, sorted.AsSpan(0, tail), order.AsSpan(0, tail));
        }

        double[] logs = new double[order.Length];
        for (int rank = 0; rank < order.Length; rank++)
        {
            logs[rank] = pValues[order[rank]].Log;
        }

        return new RankedFamily(sorted, order, logs, familySize);
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
        return new RankedFamily(sorted, order, null, familySize);
    }

    /// <summary>The natural logarithm of the p-value of a rank, as it was given or else of its double.</summary>
    internal double Log(int rank) => _logs is null ? Math.Log(_sorted[rank]) : _logs[rank];

    private static void CheckSize(int count, int familySize)
    {
        if (familySize < count)
        {
            throw new ArgumentException(
                FormattableString.Invariant($"A family of {familySize} cannot hold {count} p-values: its size counts every planned hypothesis, tested or not."),
                nameof(familySize));
        }
    }

    private static void RankTailByLog(ReadOnlySpan<PValue> pValues, Span<double> sorted, Span<int> order)
    {
        var keys = new (double Log, int Position, double Value)[order.Length];
        for (int rank = 0; rank < keys.Length; rank++)
        {
            keys[rank] = (pValues[order[rank]].Log, order[rank], sorted[rank]);
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
