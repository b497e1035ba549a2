using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Permutation;

/// <summary>The values of an experiment as integers, and sums of squared group sums formed from them without rounding.</summary>
internal sealed class ExactScores
{
    // Exactly one of the two is in use: 64-bit integers wherever every sum of them fits.
    private readonly long[]? _narrow;
    private readonly BigInteger[]? _wide;

    private ExactScores(long[]? narrow, BigInteger[]? wide, BigInteger multiple, BigInteger observed)
    {
        _narrow = narrow;
        _wide = wide;
        Multiple = multiple;
        Observed = observed;
    }

    /// <summary>Least common multiple of the group sizes.</summary>
    public BigInteger Multiple { get; }

    /// <summary><see cref="Multiple"/> times the sum of T_i^2/n_i of the groups as they were observed.</summary>
    public BigInteger Observed { get; }

    /// <summary>The largest magnitude.</summary>
    public BigInteger Largest => _narrow is not null
        ? BigInteger.Max(BigInteger.Abs(_narrow[0]), BigInteger.Abs(_narrow[^1]))
        : BigInteger.Max(BigInteger.Abs(_wide![0]), BigInteger.Abs(_wide[^1]));

    /// <summary>Takes the values of a sample about the middle of their range, over the greatest common divisor of their differences, ascending.</summary>
    public static ExactScores Of(GroupedSample sample, int[] sizes)
    {
        BigInteger multiple = sizes.Where(n => n > 0).Aggregate(BigInteger.One, (m, n) => m / BigInteger.GreatestCommonDivisor(m, n) * n);
        if (Narrow(sample) is long[] narrow)
        {
            var sums = new long[sizes.Length];
            for (int i = 0; i < narrow.Length; i++)
            {
                sums[sample.Groups[i]] += narrow[i];
            }

            Array.Sort(narrow);
            return new(narrow, null, multiple, Spread([.. sums.Select(s => (BigInteger)s)], sizes, multiple));
        }

        BigInteger[] wide = Wide(sample);
        var wideSums = new BigInteger[sizes.Length];
        for (int i = 0; i < wide.Length; i++)
        {
            wideSums[sample.Groups[i]] += wide[i];
        }

        Array.Sort(wide);
        return new(null, wide, multiple, Spread(wideSums, sizes, multiple));
    }

    /// <summary>The values over 2^<paramref name="shift"/>, as doubles; off by no more than two roundings of the largest.</summary>
    public double[] Rounded(int shift) => _narrow is not null
        ? [.. _narrow.Select(v => (double)(v >> shift))]
        : [.. _wide!.Select(v => (double)(long)(v >> shift))];

    /// <summary><see cref="Multiple"/> times the sum of T_i^2/n_i of an arrangement.</summary>
    public BigInteger Spread(ReadOnlySpan<int> order, ReadOnlySpan<int> sizes)
    {
        var sums = new BigInteger[sizes.Length];
        for (int group = 0; group < sizes.Length; group++)
        {
            sums[group] = Sum(order[..sizes[group]]);
            order = order[sizes[group]..];
        }

        return Spread(sums, sizes, Multiple);
    }

    private static BigInteger Spread(BigInteger[] sums, ReadOnlySpan<int> sizes, BigInteger multiple)
    {
        BigInteger spread = 0;
        for (int i = 0; i < sizes.Length; i++)
        {
            spread += sizes[i] == 0 ? 0 : sums[i] * sums[i] * (multiple / sizes[i]);
        }

        return spread;
    }

    private BigInteger Sum(ReadOnlySpan<int> positions)
    {
        if (_narrow is not null)
        {
            long sum = 0;
            foreach (int position in positions)
            {
                sum += _narrow[position];
            }

            return sum;
        }

        BigInteger wideSum = 0;
        foreach (int position in positions)
        {
            wideSum += _wide![position];
        }

        return wideSum;
    }

    /// <summary>The values as 64-bit integers whose every sum fits; null where they are too wide for that.</summary>
    private static long[]? Narrow(GroupedSample sample)
    {
        if (sample.IsWide)
        {
            BigInteger[] wide = Wide(sample);
            return BigInteger.Max(BigInteger.Abs(wide.Min()), wide.Max()) * wide.Length <= long.MaxValue ? [.. wide.Select(v => (long)v)] : null;
        }

        ReadOnlySpan<long> mantissas = sample.Mantissas;
        (long lowest, long highest) = (long.MaxValue, long.MinValue);
        foreach (long mantissa in mantissas)
        {
            lowest = Math.Min(lowest, mantissa);
            highest = Math.Max(highest, mantissa);
        }

        if ((Int128)highest - lowest > long.MaxValue)
        {
            return null;
        }

        long divisor = 0;
        for (int i = 0; i < mantissas.Length && divisor != 1; i++)
        {
            divisor = GreatestCommonDivisor(divisor, mantissas[i] - lowest);
        }

        divisor = Math.Max(divisor, 1);
        long middle = (highest - lowest) / divisor / 2;
        if ((Int128)(middle + 1) * mantissas.Length > long.MaxValue)
        {
            return null;
        }

        var values = new long[mantissas.Length];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = ((mantissas[i] - lowest) / divisor) - middle;
        }

        return values;
    }

    private static BigInteger[] Wide(GroupedSample sample)
    {
        var values = new BigInteger[sample.Count];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = sample.MantissaOf(i);
        }

        BigInteger lowest = values.Min();
        BigInteger divisor = values.Aggregate(BigInteger.Zero, (d, v) => d.IsOne ? d : BigInteger.GreatestCommonDivisor(d, v - lowest));
        divisor = BigInteger.Max(divisor, 1);
        BigInteger middle = (values.Max() - lowest) / divisor / 2;
        return [.. values.Select(v => ((v - lowest) / divisor) - middle)];
    }

    private static long GreatestCommonDivisor(long a, long b)
    {
        while (b != 0)
        {
            (a, b) = (b, a % b);
        }

        return a;
    }
}
