using System.Buffers;
using System.Numerics;
using System.Runtime.CompilerServices;

namespace Campaigns.Statistics.GroupTests;

/// <summary>Ranks of exact values: equal values share the mean of their ranks, and twice a rank is an integer.</summary>
internal static class RankSums
{
    /// <summary>Ranks all values of a sample together and adds up by group.</summary>
    /// <param name="sample">Any sample; every value belongs to one of its groups.</param>
    /// <param name="sums">One entry a group; overwritten.</param>
    /// <returns>The sum of t^3 - t over all ties, t the number of equal values.</returns>
    /// <remarks>Sums fit 64 bits for any number of values that an array can hold. Sorts in borrowed buffers: O(N log N), nothing allocated for each value.</remarks>
    public static Int128 Fill(GroupedSample sample, Span<RankSum> sums) =>
        sample.IsWide
            ? Fill<BigInteger>(sample.WideMantissas, sample.Groups, sums)
            : Fill(sample.Mantissas, sample.Groups, sums);

    private static Int128 Fill<T>(ReadOnlySpan<T> values, ReadOnlySpan<ushort> groups, Span<RankSum> sums)
        where T : IEquatable<T>, IComparable<T>
    {
        T[] borrowedValues = ArrayPool<T>.Shared.Rent(values.Length);
        ushort[] borrowedGroups = ArrayPool<ushort>.Shared.Rent(values.Length);
        try
        {
            Span<T> sorted = borrowedValues.AsSpan(0, values.Length);
            Span<ushort> owners = borrowedGroups.AsSpan(0, values.Length);
            values.CopyTo(sorted);
            groups.CopyTo(owners);
            sorted.Sort(owners);
            return Add<T>(sorted, owners, sums);
        }
        finally
        {
            ArrayPool<T>.Shared.Return(borrowedValues, RuntimeHelpers.IsReferenceOrContainsReferences<T>());
            ArrayPool<ushort>.Shared.Return(borrowedGroups);
        }
    }

    private static Int128 Add<T>(ReadOnlySpan<T> sorted, ReadOnlySpan<ushort> owners, Span<RankSum> sums)
        where T : IEquatable<T>
    {
        sums.Clear();
        Int128 tied = 0;
        int next;
        for (int first = 0; first < sorted.Length; first = next)
        {
            next = first + 1;
            while (next < sorted.Length && sorted[next].Equals(sorted[first]))
            {
                next++;
            }

            Int128 t = next - first;
            tied += (t * t * t) - t;
            for (int i = first; i < next; i++)
            {
                // Ranks first + 1 to next have the mean (first + 1 + next)/2.
                ref RankSum sum = ref sums[owners[i]];
                sum.Count++;
                sum.Doubled += (long)first + 1 + next;
            }
        }

        return tied;
    }
}
