using System.Diagnostics.CodeAnalysis;
using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Numerics;

/// <summary>Per group of an experiment the count n, the sum S and the sum of squares Q of its mantissas about a common origin, as exact integers.</summary>
/// <remarks>
/// Integer addition is exact, so what is derived here has the same bits in whatever order the rows come and whatever the origin is: n Q - S^2 (n times the sum of squares about the group's own mean) and N S - n S_total do not depend on the origin at all.
/// One pass, no allocation for 64-bit mantissas whose sums fit 128 bits (50 values: differences below 2^57, or 17 digits); beyond that the sums are kept as integers of any size.
/// Cost: about 2 ns a value on the narrow path.
/// </remarks>
public readonly ref struct ExactMoments
{
    private readonly ReadOnlySpan<GroupSums> _narrow;
    private readonly WideSums[]? _wide;
    private readonly long _origin;
    private readonly BigInteger _wideOrigin;
    private readonly long _total;
    private readonly BigInteger _wideTotal;

    private ExactMoments(ReadOnlySpan<GroupSums> sums, long origin, int count)
    {
        _narrow = sums;
        _origin = origin;
        Count = count;
        foreach (ref readonly GroupSums group in sums)
        {
            _total += group.Sum;
        }
    }

    private ExactMoments(WideSums[] sums, BigInteger origin, int count)
    {
        _wide = sums;
        _wideOrigin = origin;
        Count = count;
        foreach (WideSums group in sums)
        {
            _wideTotal += group.Sum;
        }
    }

    /// <summary>Groups of the sample, those without a value included.</summary>
    public int GroupCount => _wide?.Length ?? _narrow.Length;

    /// <summary>Values in all groups.</summary>
    public int Count { get; }

    /// <summary>Sums a sample about its first value.</summary>
    /// <param name="sample">Any sample; it may be empty.</param>
    /// <param name="scratch">At least as many entries as the sample has groups; overwritten, and in use as long as the result is.</param>
    /// <exception cref="ArgumentException">The scratch space is too short, or a value names a group that the sample does not have.</exception>
    public static ExactMoments Of(GroupedSample sample, Span<GroupSums> scratch) =>
        sample.IsWide
            ? About(sample, sample.Count == 0 ? BigInteger.Zero : sample.WideMantissas[0], scratch)
            : About(sample, sample.Count == 0 ? 0 : sample.Mantissas[0], scratch);

    /// <summary>Sums a sample of 64-bit mantissas about a given origin.</summary>
    /// <param name="sample">A sample that is not wide.</param>
    /// <param name="origin">The origin, as a mantissa.</param>
    /// <param name="scratch">As in <see cref="Of(GroupedSample, Span{GroupSums})"/>.</param>
    /// <exception cref="ArgumentException">As in <see cref="Of(GroupedSample, Span{GroupSums})"/>, or the sample is wide.</exception>
    public static ExactMoments About(GroupedSample sample, long origin, Span<GroupSums> scratch)
    {
        if (sample.IsWide)
        {
            throw new ArgumentException("A wide sample needs a wide origin.", nameof(sample));
        }

        if (scratch.Length < sample.GroupCount)
        {
            throw new ArgumentException("The scratch space has fewer entries than the sample has groups.", nameof(scratch));
        }

        Span<GroupSums> sums = scratch[..sample.GroupCount];
        return TryAdd(sample, origin, sums)
            ? new(sums, origin, sample.Count)
            : About(sample, (BigInteger)origin, scratch);
    }

    /// <summary>Sums any sample about a given origin, with integers of any size.</summary>
    /// <inheritdoc cref="About(GroupedSample, long, Span{GroupSums})"/>
    public static ExactMoments About(GroupedSample sample, BigInteger origin, Span<GroupSums> scratch)
    {
        var sums = new WideSums[sample.GroupCount];
        ReadOnlySpan<ushort> groups = sample.Groups;
        for (int i = 0; i < groups.Length; i++)
        {
            BigInteger mantissa = sample.IsWide ? sample.WideMantissas[i] : sample.Mantissas[i];
            BigInteger difference = mantissa - origin;
            int group = groups[i];
            if (group >= sums.Length)
            {
                ThrowUnknownGroup(group);
            }

            sums[group].Add(difference);
        }

        return new(sums, origin, sample.Count);
    }

    /// <summary>Values in a group.</summary>
    /// <param name="group">0 to <see cref="GroupCount"/> - 1.</param>
    public long CountOf(int group) => _wide is null ? _narrow[group].Count : _wide[group].Count;

    /// <summary>n Q - S^2 of a group: n times its sum of squared deviations from its own mean, in squared units of the last typed decimal. Zero exactly where all its values are the same.</summary>
    /// <param name="group">0 to <see cref="GroupCount"/> - 1.</param>
    public WideReal CountTimesSquaredDeviations(int group) =>
        _wide is null
            ? WideReal.From(_narrow[group].CountTimesSquaredDeviations)
            : WideReal.From(_wide[group].CountTimesSquaredDeviations);

    /// <summary>The sums of squares within and between groups, in squared units of the last typed decimal.</summary>
    /// <returns>SSW = sum of (n Q - S^2)/n, and SSB = sum of (N S - n S_total)^2/(n N^2); each exactly zero where it is zero, else of about 32 digits.</returns>
    public (WideReal Within, WideReal Between) SumsOfSquares()
    {
        double total = Math.Max(1, Count);
        if (_wide is not null)
        {
            WideReal wideWithin = WideReal.Zero;
            WideReal wideBetween = WideReal.Zero;
            foreach (WideSums group in _wide.Where(g => g.Count > 0))
            {
                wideWithin += WideReal.From(group.CountTimesSquaredDeviations) / group.Count;
                WideReal above = WideReal.From((group.Sum * Count) - (_wideTotal * group.Count));
                wideBetween += above * above / group.Count;
            }

            return (wideWithin, wideBetween / total / total);
        }

        // No number here comes near 2^255, nor near the smallest doubles: the exponent of a WideReal is not needed.
        DoubleDouble within = default;
        DoubleDouble between = default;
        foreach (ref readonly GroupSums group in _narrow)
        {
            if (group.Count > 0)
            {
                within += DoubleDouble.From(group.CountTimesSquaredDeviations) / group.Count;
                DoubleDouble above = DoubleDouble.From(Math.BigMul(group.Sum, Count) - Math.BigMul(_total, group.Count));
                between += above * above / group.Count;
            }
        }

        return (WideReal.From(within), WideReal.From(between / total / total));
    }

    /// <summary>The sum of a group's mantissas themselves, the origin put back.</summary>
    /// <param name="group">0 to <see cref="GroupCount"/> - 1.</param>
    public WideReal Sum(int group) =>
        _wide is null
            ? WideReal.From(Math.BigMul(_origin, _narrow[group].Count) + _narrow[group].Sum)
            : WideReal.From((_wideOrigin * _wide[group].Count) + _wide[group].Sum);

    /// <summary>Mean of group b less mean of group a, in units of the last typed decimal: (n_a S_b - n_b S_a)/(n_a n_b), whose numerator is an exact integer, so that nothing cancels, whatever the offset of the values.</summary>
    /// <param name="a">The group that is taken away; it holds a value.</param>
    /// <param name="b">The group that it is taken from; it holds a value.</param>
    /// <exception cref="DivideByZeroException">A group is empty.</exception>
    public WideReal MeanDifference(int a, int b)
    {
        WideReal above = _wide is null
            ? WideReal.From(Math.BigMul(_narrow[b].Sum, _narrow[a].Count) - Math.BigMul(_narrow[a].Sum, _narrow[b].Count))
            : WideReal.From((_wide[b].Sum * _wide[a].Count) - (_wide[a].Sum * _wide[b].Count));
        return above / CountOf(a) / CountOf(b);
    }

    /// <summary>Adds up with 64-bit sums and 128-bit sums of squares.</summary>
    /// <returns>Whether nothing that is derived from the sums can leave 127 bits; if not, the sums mean nothing.</returns>
    private static bool TryAdd(GroupedSample sample, long origin, Span<GroupSums> sums)
    {
        sums.Clear();
        ReadOnlySpan<long> mantissas = sample.Mantissas;
        ReadOnlySpan<ushort> groups = sample.Groups[..mantissas.Length];
        long wrapped = 0;
        ulong spread = 0;
        for (int i = 0; i < mantissas.Length; i++)
        {
            long mantissa = mantissas[i];
            long difference = mantissa - origin;
            wrapped |= (mantissa ^ origin) & (mantissa ^ difference);
            long sign = difference >> 63;
            ulong magnitude = (ulong)((difference ^ sign) - sign);
            spread |= magnitude;
            int group = groups[i];
            if (group >= sums.Length)
            {
                ThrowUnknownGroup(group);
            }

            ref GroupSums into = ref sums[group];
            into.Count++;
            into.Sum += difference;
            ulong high = Math.BigMul(magnitude, magnitude, out ulong low);
            ulong squares = into.SquaresLow + low;
            into.SquaresHigh += high + (squares < low ? 1UL : 0);
            into.SquaresLow = squares;
        }

        // |difference| < 2^bits and N < 2^countBits bound every sum and every product formed from them.
        int bits = 64 - BitOperations.LeadingZeroCount(spread);
        int countBits = 32 - BitOperations.LeadingZeroCount((uint)mantissas.Length);
        return wrapped >= 0 && bits + countBits <= 63 && 2 * (bits + countBits) <= 126;
    }

    [DoesNotReturn]
    private static void ThrowUnknownGroup(int group) =>
        throw new ArgumentException(FormattableString.Invariant($"A value belongs to group {group}, which the sample does not have."));

    private struct WideSums
    {
        public long Count;
        public BigInteger Sum;
        public BigInteger Squares;

        public void Add(BigInteger difference)
        {
            Count++;
            Sum += difference;
            Squares += difference * difference;
        }

        public readonly BigInteger CountTimesSquaredDeviations => (Count * Squares) - (Sum * Sum);
    }
}
