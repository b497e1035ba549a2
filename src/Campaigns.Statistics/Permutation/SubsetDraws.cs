using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics.X86;

namespace Campaigns.Statistics.Permutation;

/// <summary>Draws random arrangements of a small design as sets of bits: bit i of a group's set tells that the group takes position i.</summary>
/// <remarks>
/// A group takes a random subset of the positions that are still free. Where there are few such subsets they are listed, and one is drawn by its number; else its members are drawn by Floyd's method (J. Bentley and R. Floyd, Programming pearls: a sample of brilliance, Communications of the ACM 30(9), 1987).
/// Cost: about 2 ns a group from a list, 2 ns a member otherwise; a list takes up to 1 MB and 1 ms to make.
/// </remarks>
internal sealed class SubsetDraws
{
    /// <summary>Most values that a set of bits can hold.</summary>
    public const int MostValues = 64;

    private const int LongestList = 1 << 18;
    private const int BitsListed = 32;
    private const int MostKept = 1 << 20;

    private readonly int[] _sizes;
    private readonly int _count;
    private readonly uint[]?[] _lists;
    private volatile KeptSets? _kept;

    public SubsetDraws(PermutationDesign design)
    {
        ArgumentOutOfRangeException.ThrowIfGreaterThan(design.Count, MostValues);
        _count = design.Count;
        _sizes = design.Sizes[..^1].ToArray();
        _lists = new uint[]?[_sizes.Length];
        int free = _count;
        for (int group = 0; group < _sizes.Length; group++)
        {
            _lists[group] = Subsets(free, _sizes[group]);
            free -= _sizes[group];
        }
    }

    /// <summary>The arrangements of one piece of the draws from a seed.</summary>
    /// <param name="seed">The seed.</param>
    /// <param name="piece">Number of the piece, which is the seed's stream.</param>
    /// <param name="draws">Arrangements of the piece, at most <see cref="RandomArrangements.DrawsPerPiece"/>.</param>
    /// <returns>The sets of the first group in all arrangements, then those of the second, and so on to the last but one, which leaves the rest to the last.</returns>
    /// <remarks>The sets of the seed asked for last are kept, up to 8 MB: the next experiment of the same design mostly asks for the same.</remarks>
    public ReadOnlySpan<ulong> Sets(ulong seed, int piece, int draws)
    {
        KeptSets? kept = _kept;
        if (kept?.Seed != seed)
        {
            _kept = kept = new(seed, MostKept / (RandomArrangements.DrawsPerPiece * _sizes.Length));
        }

        if (piece < kept.Pieces.Length && kept.Pieces[piece] is ulong[] before && before.Length == draws * _sizes.Length)
        {
            return before;
        }

        ulong[] sets = Draw(new RandomNumbers(seed, (ulong)piece), draws);
        if (piece < kept.Pieces.Length)
        {
            kept.Pieces[piece] = sets;
        }

        return sets;
    }

    private ulong[] Draw(RandomNumbers random, int draws)
    {
        var sets = new ulong[draws * _sizes.Length];
        Span<ulong> free = stackalloc ulong[RandomArrangements.DrawsPerPiece];
        free = free[..draws];
        free.Fill(ulong.MaxValue >> (MostValues - _count));
        int freeCount = _count;
        for (int group = 0; group < _sizes.Length; group++)
        {
            Span<ulong> chosen = sets.AsSpan(group * draws, draws);
            random = _lists[group] is uint[] list
                ? FromList(random, list, free, chosen)
                : OneByOne(random, freeCount, _sizes[group], free, chosen);
            freeCount -= _sizes[group];
        }

        return sets;
    }

    private static RandomNumbers FromList(RandomNumbers random, uint[] list, Span<ulong> free, Span<ulong> sets)
    {
        for (int i = 0; i < sets.Length && i < free.Length; i++)
        {
            ulong set = Deposit(list[random.Below((uint)list.Length)], free[i]);
            sets[i] = set;
            free[i] ^= set;
        }

        return random;
    }

    private static RandomNumbers OneByOne(RandomNumbers random, int freeCount, int size, Span<ulong> free, Span<ulong> sets)
    {
        for (int i = 0; i < sets.Length && i < free.Length; i++)
        {
            ulong set = Deposit(Subset(freeCount, size, ref random), free[i]);
            sets[i] = set;
            free[i] ^= set;
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

    /// <summary>Sets by piece; threads may draw the same piece at the same time, and keep either.</summary>
    private sealed class KeptSets(ulong seed, int pieces)
    {
        public ulong Seed { get; } = seed;

        public ulong[]?[] Pieces { get; } = new ulong[]?[pieces];
    }
}
