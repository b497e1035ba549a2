using System.Buffers;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;

namespace Campaigns.Statistics.Corrections;

/// <summary>A stable sort of p-values by radix passes over the bits of the doubles, whose order as integers is their order as numbers from 0 up.</summary>
/// <remarks>
/// The leading 32 of the 62 bits that a p-value can use are packed with its position into one word, and three passes put the words in order. P-values that share those bits form
/// runs, short in continuous data: a run out of order is sorted by its remaining 30 bits, again packed with the position, which keeps ties in their order. Linear unless hostile
/// data make the runs long, then n log n.
/// </remarks>
internal static class Ranking
{
    private const int TrailingBits = 30;
    private const ulong TrailingMask = (1UL << TrailingBits) - 1;
    private const int DigitBits = 11;
    private const int Buckets = 1 << DigitBits;
    private const int Passes = 3;
    private const int PositionBits = 32;

    /// <summary>The values ascending, and for each rank the position it came from; equal values keep their order.</summary>
    /// <param name="values">In [0, 1], without -0.</param>
    public static (double[] Sorted, int[] Order) Ascending(ReadOnlySpan<double> values)
    {
        int n = values.Length;
        ulong[] words = ArrayPool<ulong>.Shared.Rent(n);
        ulong[] spare = ArrayPool<ulong>.Shared.Rent(n);
        for (int i = 0; i < n; i++)
        {
            words[i] = (BitConverter.DoubleToUInt64Bits(values[i]) >> TrailingBits << PositionBits) | (uint)i;
        }

        if (SortByLeadingBits(words.AsSpan(0, n), spare.AsSpan(0, n)))
        {
            (words, spare) = (spare, words);
        }

        SortRuns(words.AsSpan(0, n), values);
        double[] sorted = GC.AllocateUninitializedArray<double>(n);
        int[] order = GC.AllocateUninitializedArray<int>(n);
        for (int rank = 0; rank < n; rank++)
        {
            order[rank] = (int)(uint)words[rank];
            sorted[rank] = values[order[rank]];
        }

        ArrayPool<ulong>.Shared.Return(words);
        ArrayPool<ulong>.Shared.Return(spare);
        return (sorted, order);
    }

    /// <summary>Sorts words by their upper half; words that share it keep their order.</summary>
    /// <returns>Whether the result lies in the spare memory.</returns>
    private static bool SortByLeadingBits(Span<ulong> words, Span<ulong> spare)
    {
        Span<int> counts = stackalloc int[Passes * Buckets];
        counts.Clear();
        ref int count = ref MemoryMarshal.GetReference(counts);
        foreach (ulong word in words)
        {
            Unsafe.Add(ref count, Digit(word, 0))++;
            Unsafe.Add(ref count, Buckets + Digit(word, 1))++;
            Unsafe.Add(ref count, (2 * Buckets) + Digit(word, 2))++;
        }

        bool inSpare = false;
        for (int pass = 0; pass < Passes; pass++)
        {
            Span<int> next = counts.Slice(pass * Buckets, Buckets);
            int sum = 0;
            bool one = false;
            for (int bucket = 0; bucket < Buckets; bucket++)
            {
                one |= next[bucket] == words.Length;
                (next[bucket], sum) = (sum, sum + next[bucket]);
            }

            if (!one)
            {
                Scatter(inSpare ? spare : words, inSpare ? words : spare, next, pass);
                inSpare = !inSpare;
            }
        }

        return inSpare;
    }

    private static void Scatter(ReadOnlySpan<ulong> words, Span<ulong> target, Span<int> next, int pass)
    {
        // Every bucket's next place lies inside the target because the counts add up to its length.
        ref ulong to = ref MemoryMarshal.GetReference(target);
        ref int place = ref MemoryMarshal.GetReference(next);
        foreach (ulong word in words)
        {
            Unsafe.Add(ref to, Unsafe.Add(ref place, Digit(word, pass))++) = word;
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static int Digit(ulong word, int pass) => (int)(word >> (PositionBits + (pass * DigitBits))) & (Buckets - 1);

    private static void SortRuns(Span<ulong> words, ReadOnlySpan<double> values)
    {
        int start = 0;
        for (int end = 1; end <= words.Length; end++)
        {
            if (end < words.Length && words[end] >> PositionBits == words[start] >> PositionBits)
            {
                continue;
            }

            if (end - start > 1)
            {
                SortRun(words[start..end], values);
            }

            start = end;
        }
    }

    private static void SortRun(Span<ulong> run, ReadOnlySpan<double> values)
    {
        bool ordered = true;
        ulong before = 0;
        foreach (ref ulong word in run)
        {
            uint position = (uint)word;
            word = ((BitConverter.DoubleToUInt64Bits(values[(int)position]) & TrailingMask) << PositionBits) | position;
            ordered &= before <= word;
            before = word;
        }

        if (!ordered)
        {
            run.Sort();
        }
    }
}
