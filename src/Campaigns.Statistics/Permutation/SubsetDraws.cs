using System.Buffers;
using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics.X86;

namespace Campaigns.Statistics.Permutation;

/// <summary>Draws random arrangements of a small design as sets of bits: bit i of a group's set tells that the group takes position i.</summary>
/// <remarks>
/// A group takes a random subset of the positions that are still free. Once only groups of the largest size are to come, each takes the lowest free position besides, since an exchange of whole groups of equal size changes no F: less is left to chance, and every partition is still as likely as any other.
/// Where there are few such subsets they are listed, and one is drawn by its number; else its members are drawn by Floyd's method (J. Bentley and R. Floyd, Programming pearls: a sample of brilliance, Communications of the ACM 30(9), 1987).
/// Cost: about 1.5 ns a group from a list, 1.5 ns a member otherwise; a list takes up to 1 MB and 1 ms to make.
/// </remarks>
internal sealed class SubsetDraws
{
    /// <summary>Most values that a set of bits can hold.</summary>
    public const int MostValues = 64;

    private const int LongestList = 1 << 18;
    private const int BitsListed = 32;

    private readonly int[] _sizes;
    private readonly int _largest;
    private readonly int _count;
    private readonly uint[]?[] _lists;

    public SubsetDraws(PermutationDesign design)
    {
        ArgumentOutOfRangeException.ThrowIfGreaterThan(design.Count, MostValues);
        _count = design.Count;
        _sizes = design.Sizes[..^1].ToArray();
        _largest = design.Sizes[^1];
        _lists = new uint[]?[_sizes.Length];
        int free = _count;
        for (int group = 0; group < _sizes.Length; group++)
        {
            int taken = _sizes[group] == _largest ? 1 : 0;
            _lists[group] = Subsets(free - taken, _sizes[group] - taken);
            free -= _sizes[group];
        }
    }

    /// <summary>Sets for one arrangement: one for each group but the last, which takes what is left.</summary>
    public int SetsPerDraw => _sizes.Length;

    /// <summary>Draws arrangements.</summary>
    /// <param name="random">The stream that they come from.</param>
    /// <param name="sets">Filled with the sets of the first group in all arrangements, then those of the second, and so on to the last but one: its length is the number of arrangements times <see cref="SetsPerDraw"/>.</param>
    public void Draw(RandomNumbers random, Span<ulong> sets)
    {
        int draws = sets.Length / _sizes.Length;
        ulong[] memory = ArrayPool<ulong>.Shared.Rent(draws);
        Span<ulong> free = memory.AsSpan(0, draws);
        free.Fill(ulong.MaxValue >> (MostValues - _count));
        int freeCount = _count;
        for (int group = 0; group < _sizes.Length; group++)
        {
            Span<ulong> chosen = sets.Slice(group * draws, draws);
            bool isOneOfTheLargest = _sizes[group] == _largest;
            random = _lists[group] is uint[] list
                ? FromList(random, list, isOneOfTheLargest, free, chosen)
                : OneByOne(random, freeCount, _sizes[group], isOneOfTheLargest, free, chosen);
            freeCount -= _sizes[group];
        }

        ArrayPool<ulong>.Shared.Return(memory);
    }

    private static RandomNumbers FromList(RandomNumbers random, uint[] list, bool takesLowest, Span<ulong> free, Span<ulong> sets)
    {
        ulong mask = takesLowest ? ulong.MaxValue : 0;
        for (int i = 0; i < sets.Length && i < free.Length; i++)
        {
            ulong open = free[i];
            ulong lowest = open & (0 - open) & mask;
            ulong set = lowest | Deposit(list[random.Below((uint)list.Length)], open ^ lowest);
            sets[i] = set;
            free[i] = open ^ set;
        }

        return random;
    }

    private static RandomNumbers OneByOne(RandomNumbers random, int freeCount, int size, bool takesLowest, Span<ulong> free, Span<ulong> sets)
    {
        int taken = takesLowest ? 1 : 0;
        for (int i = 0; i < sets.Length && i < free.Length; i++)
        {
            ulong open = free[i];
            ulong lowest = takesLowest ? open & (0 - open) : 0;
            ulong set = lowest | Deposit(Subset(freeCount - taken, size - taken, ref random), open ^ lowest);
            sets[i] = set;
            free[i] = open ^ set;
        }

        return random;
    }

    /// <summary>A random subset of the lowest <paramref name="count"/> bits, by Floyd's method.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static ulong Subset(int count, int size, ref RandomNumbers random)
    {
        ulong set = 0;
        for (int top = count - size; top < count; top++)
        {
            ulong bit = 1UL << (int)random.Below((uint)top + 1);
            set |= (set & bit) == 0 ? bit : 1UL << top;
        }

        return set;
    }

    /// <summary>The bits of a set, in order, at the places of the bits of a mask.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static ulong Deposit(ulong set, ulong mask)
    {
        if (Bmi2.X64.IsSupported)
        {
            return Bmi2.X64.ParallelBitDeposit(set, mask);
        }

        ulong deposited = 0;
        for (; set != 0; set >>= 1, mask &= mask - 1)
        {
            deposited |= (set & 1) == 0 ? 0 : mask & (0 - mask);
        }

        return deposited;
    }

    /// <summary>All subsets of a size, ascending as numbers; null where there are too many to list, or too large ones.</summary>
    private static uint[]? Subsets(int count, int size)
    {
        UInt128 ways = 1;
        for (int i = 1; i <= size && ways <= LongestList; i++)
        {
            ways = ways * (UInt128)(count - size + i) / (UInt128)i;
        }

        if (ways > LongestList || count > BitsListed)
        {
            return null;
        }

        var list = new uint[(int)ways];
        ulong set = (1UL << size) - 1;
        for (int i = 0; i < list.Length; i++)
        {
            list[i] = (uint)set;

            // The next number with as many bits: the lowest run of ones moves its top bit up and the rest down.
            ulong low = set & (0 - set);
            ulong moved = set + low;
            set = moved | ((set ^ moved) >> (2 + BitOperations.TrailingZeroCount(low)));
        }

        return list;
    }
}
