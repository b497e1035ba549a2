using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;

namespace Campaigns.Statistics.Corrections;

/// <summary>A stable sort of p-values in linear time: radix passes over the bits of the doubles, whose order as integers is their order as numbers from 0 up.</summary>
/// <remarks>
/// Three passes of 11 bits put the leading 33 of the 62 bits in order (p = 1 is the largest key). What still shares those 33 bits is a short run in
/// continuous data, finished by insertion; a long run, as hostile or finely gridded data give, gets three more passes. Linear in every case.
/// </remarks>
internal static class Ranking
{
    private const int DigitBits = 11;
    private const int Buckets = 1 << DigitBits;
    private const int LeadingShift = 29;
    private const int LongestInsertion = 32;

    /// <summary>The values ascending, and for each rank the position it came from; equal values keep their order.</summary>
    /// <param name="values">In [0, 1], without -0; overwritten.</param>
    public static (double[] Sorted, int[] Order) Ascending(double[] values)
    {
        int n = values.Length;
        int[] order = new int[n];
        for (int i = 0; i < n; i++)
        {
            order[i] = i;
        }

        double[] spareKeys = new double[n];
        int[] spareOrder = new int[n];
        Span<ulong> keys = MemoryMarshal.Cast<double, ulong>(values.AsSpan());
        Span<ulong> spare = MemoryMarshal.Cast<double, ulong>(spareKeys.AsSpan());
        bool inSpare = SortByDigits(keys, order, spare, spareOrder, LeadingShift);
        double[] sorted = inSpare ? spareKeys : values;
        int[] ranks = inSpare ? spareOrder : order;
        FinishRuns(inSpare ? spare : keys, ranks, inSpare ? keys : spare, inSpare ? order : spareOrder);
        return (sorted, ranks);
    }

    /// <summary>Three stable passes over the digits that begin at a bit.</summary>
    /// <returns>Whether the result lies in the spare memory.</returns>
    private static bool SortByDigits(Span<ulong> keys, Span<int> order, Span<ulong> spareKeys, Span<int> spareOrder, int shift)
    {
        Span<int> starts = stackalloc int[3 * Buckets];
        starts.Clear();
        ref int count = ref MemoryMarshal.GetReference(starts);
        foreach (ulong key in keys)
        {
            Unsafe.Add(ref count, (int)((key >> shift) & (Buckets - 1)))++;
            Unsafe.Add(ref count, Buckets + (int)((key >> (shift + DigitBits)) & (Buckets - 1)))++;
            Unsafe.Add(ref count, (2 * Buckets) + (int)((key >> (shift + (2 * DigitBits))) & (Buckets - 1)))++;
        }

        bool inSpare = false;
        for (int pass = 0; pass < 3; pass++)
        {
            int at = shift + (pass * DigitBits);
            Span<int> next = starts.Slice(pass * Buckets, Buckets);
            if (keys.Length == 0 || next[(int)((keys[0] >> at) & (Buckets - 1))] == keys.Length)
            {
                continue;
            }

            int sum = 0;
            for (int bucket = 0; bucket < Buckets; bucket++)
            {
                (next[bucket], sum) = (sum, sum + next[bucket]);
            }

            if (inSpare)
            {
                Scatter(spareKeys, spareOrder, keys, order, next, at);
            }
            else
            {
                Scatter(keys, order, spareKeys, spareOrder, next, at);
            }

            inSpare = !inSpare;
        }

        return inSpare;
    }

    private static void Scatter(Span<ulong> keys, Span<int> order, Span<ulong> toKeys, Span<int> toOrder, Span<int> next, int shift)
    {
        // Every bucket's next place lies inside the target because the counts add up to its length.
        ref ulong target = ref MemoryMarshal.GetReference(toKeys);
        ref int targetOrder = ref MemoryMarshal.GetReference(toOrder);
        ref int place = ref MemoryMarshal.GetReference(next);
        ref int source = ref MemoryMarshal.GetReference(order);
        for (int i = 0; i < keys.Length; i++)
        {
            ulong key = keys[i];
            int to = Unsafe.Add(ref place, (int)((key >> shift) & (Buckets - 1)))++;
            Unsafe.Add(ref target, to) = key;
            Unsafe.Add(ref targetOrder, to) = Unsafe.Add(ref source, i);
        }
    }

    private static void FinishRuns(Span<ulong> keys, Span<int> order, Span<ulong> spareKeys, Span<int> spareOrder)
    {
        int start = 0;
        while (start < keys.Length)
        {
            ulong leading = keys[start] >> LeadingShift;
            int end = start + 1;
            while (end < keys.Length && keys[end] >> LeadingShift == leading)
            {
                end++;
            }

            int length = end - start;
            if (length > LongestInsertion)
            {
                if (SortByDigits(keys[start..end], order[start..end], spareKeys[start..end], spareOrder[start..end], 0))
                {
                    spareKeys[start..end].CopyTo(keys[start..end]);
                    spareOrder[start..end].CopyTo(order[start..end]);
                }
            }
            else if (length > 1)
            {
                Insert(keys[start..end], order[start..end]);
            }

            start = end;
        }
    }

    private static void Insert(Span<ulong> keys, Span<int> order)
    {
        for (int i = 1; i < keys.Length; i++)
        {
            (ulong key, int position) = (keys[i], order[i]);
            int to = i;
            for (; to > 0 && keys[to - 1] > key; to--)
            {
                (keys[to], order[to]) = (keys[to - 1], order[to - 1]);
            }

            (keys[to], order[to]) = (key, position);
        }
    }
}
