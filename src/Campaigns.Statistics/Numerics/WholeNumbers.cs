using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Numerics;

/// <summary>Integers of any size, kept in 64 bits where they fit, and handed out in limbs of 64 bits so that their sums can be formed in 128.</summary>
internal sealed class WholeNumbers
{
    private const int LimbBits = 62;

    private readonly long[]? _narrow;
    private readonly BigInteger[] _wide = [];

    private WholeNumbers(long[] narrow)
    {
        _narrow = narrow;
        LimbCount = 1;
        UInt128 largest = 0;
        foreach (long value in narrow)
        {
            largest = UInt128.Max(largest, (UInt128)Int128.Abs(value));
        }

        Largest = WideReal.From(largest);
    }

    private WholeNumbers(BigInteger[] wide)
    {
        _wide = wide;
        BigInteger largest = wide.Max(BigInteger.Abs);
        LimbCount = (int)(largest.GetBitLength() / LimbBits) + 1;
        Largest = WideReal.From(largest);
    }

    /// <summary>How many there are.</summary>
    public int Count => _narrow?.Length ?? _wide.Length;

    /// <summary>Limbs of each number: 1 where all fit 64 bits.</summary>
    public int LimbCount { get; }

    /// <summary>The largest magnitude.</summary>
    public WideReal Largest { get; }

    /// <summary>A number, exact up to 106 bits.</summary>
    /// <param name="i">0 to <see cref="Count"/> - 1.</param>
    public WideReal this[int i] => _narrow is null ? WideReal.From(_wide[i]) : WideReal.From((Int128)_narrow[i]);

    /// <summary>The mantissas of a sample less the smallest of them: an origin that does not depend on which value comes first.</summary>
    /// <param name="sample">At least one value.</param>
    public static WholeNumbers AboutSmallest(GroupedSample sample)
    {
        if (sample.IsWide)
        {
            BigInteger[] mantissas = sample.WideMantissas.ToArray();
            BigInteger smallest = mantissas.Min();
            return Of([.. mantissas.Select(m => m - smallest)]);
        }

        long origin = long.MaxValue;
        foreach (long mantissa in sample.Mantissas)
        {
            origin = Math.Min(origin, mantissa);
        }

        var differences = new long[sample.Count];
        long wrapped = 0;
        for (int i = 0; i < differences.Length; i++)
        {
            differences[i] = sample.Mantissas[i] - origin;
            wrapped |= differences[i];
        }

        return wrapped >= 0 ? new(differences) : new([.. sample.Mantissas.ToArray().Select(m => m - (BigInteger)origin)]);
    }

    /// <summary>Integers as they stand.</summary>
    /// <param name="values">At least one.</param>
    public static WholeNumbers Of(BigInteger[] values) =>
        Array.TrueForAll(values, v => v >= long.MinValue && v <= long.MaxValue)
            ? new([.. values.Select(v => (long)v)])
            : new(values);

    /// <summary>One limb of every number: number i is the sum over p of limb p times 2 to the power of <see cref="Shift"/>(p).</summary>
    /// <param name="p">0 to <see cref="LimbCount"/> - 1.</param>
    public ReadOnlySpan<long> Limb(int p)
    {
        if (_narrow is not null)
        {
            return _narrow;
        }

        // The shift of a negative number goes towards minus infinity, so that all limbs but the last are not negative.
        BigInteger mask = (BigInteger.One << LimbBits) - 1;
        bool last = p == LimbCount - 1;
        return _wide.Select(v => (long)(last ? v >> Shift(p) : (v >> Shift(p)) & mask)).ToArray();
    }

    /// <summary>The power of two that a limb is to be multiplied by.</summary>
    /// <param name="p">The limb.</param>
    public static int Shift(int p) => p * LimbBits;

    /// <summary>The numbers less one term for each row and one for each column of a two-way table.</summary>
    /// <param name="rows">For each number its row.</param>
    /// <param name="rowTerms">One a row.</param>
    /// <param name="columns">For each number its column.</param>
    /// <param name="columnTerms">One a column.</param>
    public WholeNumbers Less(int[] rows, BigInteger[] rowTerms, int[] columns, BigInteger[] columnTerms)
    {
        var rest = new BigInteger[Count];
        for (int i = 0; i < rest.Length; i++)
        {
            rest[i] = (_narrow is null ? _wide[i] : _narrow[i]) - rowTerms[rows[i]] - columnTerms[columns[i]];
        }

        return Of(rest);
    }
}
