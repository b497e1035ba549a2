using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Campaigns.Statistics.Permutation;

/// <summary>Compares drawn arrangements of a small design for eight experiments at once: <see cref="SubsetSums"/> with one experiment a lane.</summary>
/// <remarks>
/// All experiments see the same arrangements. Whatever the order of addition and the width of the machine's vectors, comparisons are exact (<see cref="PermutationScores"/>), so counts are the same on every machine.
/// Cost: about 4 ns for an arrangement of 24 values in 4 groups and all eight experiments; the tables take 16 kB for every eight values.
/// </remarks>
internal sealed class PackedSubsetSums
{
    /// <summary>Experiments in one pack.</summary>
    public const int Lanes = 8;

    private const int BitsPerTable = 8;
    private const int TableLength = 1 << BitsPerTable;
    private const int LeastTables = 3;
    private const int EntryBits = 6;
    private const int EntryBytes = 1 << EntryBits;
    private const int TableBytes = TableLength * EntryBytes;

    private readonly PermutationScores[] _experiments;
    private readonly Vector512<double> _total;
    private readonly Vector512<double> _low;
    private readonly Vector512<double> _high;
    private readonly Vector512<double>[] _weights;

    private readonly Memory<double> _sums;

    private PackedSubsetSums(PermutationScores[] experiments, Memory<double> memory)
    {
        _experiments = experiments;
        PermutationDesign design = experiments[0].Design;
        _total = Lane(e => e.Total);
        _low = Lane(e => e.Low);
        _high = Lane(e => e.High);
        _weights = [.. Enumerable.Range(0, design.Sizes.Length).Select(group => Lane(e => e.Weights[group]))];
        _sums = memory;
        Span<Vector512<double>> sums = MemoryMarshal.Cast<double, Vector512<double>>(memory.Span);
        for (int position = 0; position < sums.Length / TableLength * BitsPerTable; position++)
        {
            // All subsets whose highest member this is: those without it, and it.
            Vector512<double> value = position < design.Count ? Lane(e => e.Values[position]) : default;
            int subsets = 1 << (position % BitsPerTable);
            Span<Vector512<double>> table = sums.Slice(position / BitsPerTable * TableLength, TableLength);
            table[0] = default;
            for (int i = 0; i < subsets; i++)
            {
                table[subsets + i] = table[i] + value;
            }
        }
    }

    /// <summary>Numbers that the tables of some experiments take.</summary>
    public static int MemoryOf(PermutationDesign design, int experiments) => (PacksOf(experiments) * TablesOf(design) * TableLength * Lanes) + Lanes;

    /// <summary>Makes the tables of any number of experiments.</summary>
    /// <param name="experiments">All of the same design of at most 64 values.</param>
    /// <param name="memory">At least <see cref="MemoryOf"/>, in use as long as the packs are. Used from the first place that is aligned to a vector, because a load that straddles two cache lines takes twice the time; should the array move, nothing but time is lost.</param>
    /// <returns>Packs of eight; the last may hold fewer.</returns>
    public static PackedSubsetSums[] Of(IReadOnlyList<PermutationScores> experiments, double[] memory)
    {
        int length = TablesOf(experiments[0].Design) * TableLength * Lanes;
        int start = (int)(-Marshal.UnsafeAddrOfPinnedArrayElement(memory, 0) & (EntryBytes - 1)) / sizeof(double);
        return [.. experiments.Chunk(Lanes).Select((pack, i) => new PackedSubsetSums(pack, memory.AsMemory(start + (i * length), length)))];
    }

    private static int PacksOf(int experiments) => (experiments + Lanes - 1) / Lanes;

    private static int TablesOf(PermutationDesign design) => Math.Max(LeastTables, (design.Count + BitsPerTable - 1) / BitsPerTable);

    /// <summary>Counts, for each experiment, the arrangements that give at least the observed F.</summary>
    /// <param name="sets">Arrangements, as <see cref="SubsetDraws.Draw"/> gives them.</param>
    /// <param name="counts">For each experiment the count to add to.</param>
    public void CountAsExtreme(ReadOnlySpan<ulong> sets, Span<long> counts)
    {
        (Vector512<long> above, Vector512<long> near) = Compare(sets);
        for (int lane = 0; lane < _experiments.Length; lane++)
        {
            counts[lane] += above[lane] == near[lane] ? above[lane] : new SubsetSums(_experiments[lane]).CountAsExtreme(sets);
        }
    }

    /// <summary>For each lane how many S are certainly, and how many may be, at least the observed one.</summary>
    private (Vector512<long> Above, Vector512<long> Near) Compare(ReadOnlySpan<ulong> sets)
    {
        ref Vector512<double> sums = ref Unsafe.As<double, Vector512<double>>(ref MemoryMarshal.GetReference(_sums.Span));
        ref Vector512<double> weights = ref MemoryMarshal.GetArrayDataReference(_weights);
        nuint end = (nuint)_sums.Length * sizeof(double);
        Vector512<double> total = _total;
        Vector512<double> low = _low;
        Vector512<double> high = _high;
        Vector512<long> above = default;
        Vector512<long> near = default;
        int draws = sets.Length / (_weights.Length - 1);
        for (int draw = 0; draw < draws; draw++)
        {
            Vector512<double> rest = total;
            Vector512<double> s = default;
            nuint group = 0;
            for (int at = draw; at < sets.Length; at += draws)
            {
                Vector512<double> sum = Sum(ref sums, end, sets[at]);
                rest -= sum;
                s += sum * Unsafe.Add(ref weights, group++) * sum;
            }

            s += rest * Unsafe.Add(ref weights, group) * rest;
            above -= Vector512.GreaterThanOrEqual(s, high).AsInt64();
            near -= Vector512.GreaterThanOrEqual(s, low).AsInt64();
        }

        return (above, near);
    }

    /// <summary>The sum of a set, one table entry for every eight positions; the first three tables, which serve up to 24 values, without a loop.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Sum(ref Vector512<double> sums, nuint end, ulong set)
    {
        Vector512<double> sum = Entry(ref sums, 0, set << EntryBits)
            + Entry(ref sums, TableBytes, set >> (BitsPerTable - EntryBits))
            + Entry(ref sums, 2 * TableBytes, set >> ((2 * BitsPerTable) - EntryBits));
        for (nuint table = LeastTables * TableBytes; table < end; table += TableBytes)
        {
            set >>= BitsPerTable;
            sum += Entry(ref sums, table, set >> ((2 * BitsPerTable) - EntryBits));
        }

        return sum;
    }

    /// <summary>An entry of the table that begins at a byte; the entry's number stands in the bits above <see cref="EntryBits"/>.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Entry(ref Vector512<double> sums, nuint table, ulong shifted) =>
        Unsafe.AddByteOffset(ref Unsafe.AddByteOffset(ref sums, (nuint)shifted & (TableBytes - EntryBytes)), table);

    /// <summary>One number of each experiment; 0 in lanes without one.</summary>
    private Vector512<double> Lane(Func<PermutationScores, double> number)
    {
        Span<double> lanes = stackalloc double[Lanes];
        for (int i = 0; i < _experiments.Length; i++)
        {
            lanes[i] = number(_experiments[i]);
        }

        return Vector512.Create<double>(lanes);
    }
}
