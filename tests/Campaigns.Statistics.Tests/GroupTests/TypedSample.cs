using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Rows of an experiment as exact decimals: what a sample borrows its spans from.</summary>
internal sealed class TypedSample
{
    private readonly BigInteger[] _mantissas;
    private readonly int _decimals;
    private readonly ushort[] _groups;
    private readonly int _groupCount;

    public TypedSample(BigInteger[] mantissas, int decimals, ushort[] groups, int groupCount)
    {
        _mantissas = mantissas;
        _decimals = decimals;
        _groups = groups;
        _groupCount = groupCount;
    }

    public int Count => _groups.Length;

    /// <summary>The decimals as they were typed.</summary>
    public static TypedSample OfText(IEnumerable<(string Group, string Value)> rows) =>
        Of([.. rows.Select(r => (r.Group, ExactDecimal(r.Value)))]);

    /// <summary>The doubles nearest to what was typed, all their binary digits.</summary>
    public static TypedSample OfDoubles(IEnumerable<(string Group, string Value)> rows) =>
        Of([.. rows.Select(r => (r.Group, ExactDecimal(double.Parse(r.Value, CultureInfo.InvariantCulture))))]);

    public TestOutcome Test(GroupTest test) =>
        IsNarrow
            ? test.Test(new GroupedSample(Narrow(), _decimals, _groups, _groupCount))
            : test.Test(new GroupedSample(_mantissas, _decimals, _groups, _groupCount));

    public TestOutcome TestAsWide(GroupTest test) => test.Test(new GroupedSample(_mantissas, _decimals, _groups, _groupCount));

    public GroupSummary[] Summaries(double confidence) =>
        IsNarrow
            ? GroupSummaries.Of(new GroupedSample(Narrow(), _decimals, _groups, _groupCount), confidence)
            : GroupSummaries.Of(new GroupedSample(_mantissas, _decimals, _groups, _groupCount), confidence);

    public GroupEstimates? Estimates() =>
        IsNarrow
            ? GroupEstimates.OneWay(new GroupedSample(Narrow(), _decimals, _groups, _groupCount))
            : GroupEstimates.OneWay(new GroupedSample(_mantissas, _decimals, _groups, _groupCount));

    public bool IsNarrow => _mantissas.All(m => m >= long.MinValue && m <= long.MaxValue);

    public TypedSample Shuffled(int seed)
    {
        int[] order = [.. Enumerable.Range(0, Count)];
        new Random(seed).Shuffle(order);
        return new([.. order.Select(i => _mantissas[i])], _decimals, [.. order.Select(i => _groups[i])], _groupCount);
    }

    /// <summary>The same groups under other numbers, one number left without a value.</summary>
    public TypedSample Relabelled(int seed)
    {
        ushort[] names = [.. Enumerable.Range(0, _groupCount + 1).Select(i => (ushort)i)];
        new Random(seed).Shuffle(names);
        return new(_mantissas, _decimals, [.. _groups.Select(g => names[g])], _groupCount + 1);
    }

    public TypedSample Mapped(Func<BigInteger, BigInteger> map) => new([.. _mantissas.Select(map)], _decimals, _groups, _groupCount);

    public TypedSample Plus(BigInteger constant) => new([.. _mantissas.Select(m => m + constant)], _decimals, _groups, _groupCount);

    public TypedSample Times(BigInteger factor) => new([.. _mantissas.Select(m => m * factor)], _decimals, _groups, _groupCount);

    public TypedSample WithDecimals(int decimals) => new(_mantissas, decimals, _groups, _groupCount);

    public static (BigInteger Mantissa, int Exponent) ExactDecimal(string text)
    {
        int e = text.IndexOfAny(['e', 'E']);
        int exponent = e < 0 ? 0 : int.Parse(text.AsSpan(e + 1), NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture);
        string digits = e < 0 ? text : text[..e];
        int point = digits.IndexOf('.', StringComparison.Ordinal);
        if (point >= 0)
        {
            exponent -= digits.Length - point - 1;
            digits = digits.Remove(point, 1);
        }

        return (BigInteger.Parse(digits, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture), exponent);
    }

    public static (BigInteger Mantissa, int Exponent) ExactDecimal(double value)
    {
        long bits = BitConverter.DoubleToInt64Bits(value);
        int biased = (int)((bits >> 52) & 0x7FF);
        long fraction = bits & 0xFFFFFFFFFFFFF;
        BigInteger mantissa = biased == 0 ? fraction : fraction | (1L << 52);
        int exponent = Math.Max(biased, 1) - 1075;
        mantissa = bits < 0 ? -mantissa : mantissa;
        while (exponent < 0 && mantissa.IsEven && !mantissa.IsZero)
        {
            mantissa >>= 1;
            exponent++;
        }

        return exponent >= 0
            ? (mantissa << exponent, 0)
            : (mantissa * BigInteger.Pow(5, -exponent), exponent);
    }

    private static TypedSample Of((string Group, (BigInteger Mantissa, int Exponent) Value)[] rows)
    {
        string[] names = [.. rows.Select(r => r.Group).Distinct()];
        int lowest = rows.Length == 0 ? 0 : rows.Min(r => r.Value.Exponent);
        return new(
            [.. rows.Select(r => r.Value.Mantissa * BigInteger.Pow(10, r.Value.Exponent - lowest))],
            -lowest,
            [.. rows.Select(r => (ushort)Array.IndexOf(names, r.Group))],
            names.Length);
    }

    private long[] Narrow() => [.. _mantissas.Select(m => (long)m)];
}
