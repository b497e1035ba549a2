using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>How far each value lies from the centre of its group, as exact integers in a unit common to all: F and p of a one-way layout do not depend on that unit.</summary>
/// <remarks>Groups of one value are left out: theirs lies at its own centre whatever the spread is. Cost: for medians sorting, N ln N; 64-bit integers wherever they suffice.</remarks>
internal sealed class AbsoluteDeviations
{
    private const int SafeBits = 61;

    private readonly long[]? _narrow;
    private readonly BigInteger[] _wide;
    private readonly ushort[] _groups;
    private readonly int _groupCount;

    private AbsoluteDeviations(GroupedSample sample, long[] counts, Centre[] centres)
    {
        _groupCount = sample.GroupCount;
        int[] kept = [.. Kept(sample.Groups, counts)];
        _groups = new ushort[kept.Length];
        for (int j = 0; j < kept.Length; j++)
        {
            _groups[j] = sample.Groups[kept[j]];
        }

        _narrow = Narrow(sample, centres, kept);
        _wide = _narrow is null ? Wide(sample, centres, kept) : [];
    }

    /// <summary>Deviations from the medians; the median of an even number of values is the mean of the middle two.</summary>
    public static AbsoluteDeviations FromMedians(GroupedSample sample)
    {
        long[] counts = Counts(sample);
        BigInteger[] doubled = sample.IsWide
            ? DoubledMedians(sample.WideMantissas, sample.Groups, counts, m => m)
            : DoubledMedians(sample.Mantissas, sample.Groups, counts, m => m);
        return new(sample, counts, [.. doubled.Select(m => new Centre(2, m, 1))]);
    }

    /// <summary>Deviations from the means, over the least common multiple of the counts.</summary>
    public static AbsoluteDeviations FromMeans(GroupedSample sample)
    {
        long[] counts = Counts(sample);
        var sums = new BigInteger[counts.Length];
        for (int i = 0; i < sample.Count; i++)
        {
            sums[sample.Groups[i]] += sample.MantissaOf(i);
        }

        BigInteger common = 1;
        foreach (long n in counts.Where(n => n > 1).Distinct())
        {
            common = common / BigInteger.GreatestCommonDivisor(common, n) * n;
        }

        return new(sample, counts, [.. sums.Select((sum, i) => new Centre(counts[i], sum, counts[i] > 1 ? common / counts[i] : 0))]);
    }

    /// <summary>The F test of the one-way layout of the deviations.</summary>
    public TestOutcome Test() => new FTest().Test(_narrow is null
        ? new GroupedSample(_wide, 0, _groups, _groupCount)
        : new GroupedSample(_narrow, 0, _groups, _groupCount));

    private static long[] Counts(GroupedSample sample)
    {
        var counts = new long[sample.GroupCount];
        foreach (ushort group in sample.Groups)
        {
            counts[group]++;
        }

        return counts;
    }

    private static List<int> Kept(ReadOnlySpan<ushort> groups, long[] counts)
    {
        var kept = new List<int>(groups.Length);
        for (int i = 0; i < groups.Length; i++)
        {
            if (counts[groups[i]] > 1)
            {
                kept.Add(i);
            }
        }

        return kept;
    }

    private static BigInteger[] DoubledMedians<T>(ReadOnlySpan<T> values, ReadOnlySpan<ushort> groups, long[] counts, Func<T, BigInteger> widen)
    {
        var next = new int[counts.Length];
        for (int i = 1; i < next.Length; i++)
        {
            next[i] = next[i - 1] + (int)counts[i - 1];
        }

        var sorted = new T[values.Length];
        for (int i = 0; i < values.Length; i++)
        {
            sorted[next[groups[i]]++] = values[i];
        }

        var doubled = new BigInteger[counts.Length];
        for (int i = 0; i < doubled.Length; i++)
        {
            int n = (int)counts[i];
            if (n > 0)
            {
                int start = next[i] - n;
                Array.Sort(sorted, start, n);
                doubled[i] = widen(sorted[start + ((n - 1) / 2)]) + widen(sorted[start + (n / 2)]);
            }
        }

        return doubled;
    }

    /// <summary>The deviations in 64 bits; null where they might not fit.</summary>
    private static long[]? Narrow(GroupedSample sample, Centre[] centres, int[] kept)
    {
        if (sample.IsWide)
        {
            return null;
        }

        long lowest = -1;
        long highest = 1;
        foreach (long mantissa in sample.Mantissas)
        {
            lowest = Math.Min(lowest, mantissa);
            highest = Math.Max(highest, mantissa);
        }

        BigInteger largest = BigInteger.Max(highest, -(BigInteger)lowest);
        if (centres.Any(c => (largest * c.Factor * c.Weight).GetBitLength() > SafeBits || (c.Constant * c.Weight).GetBitLength() > SafeBits))
        {
            return null;
        }

        (long Factor, long Constant, long Weight)[] narrow = [.. centres.Select(c => ((long)c.Factor, (long)c.Constant, (long)c.Weight))];
        var deviations = new long[kept.Length];
        for (int j = 0; j < kept.Length; j++)
        {
            (long factor, long constant, long weight) = narrow[sample.Groups[kept[j]]];
            deviations[j] = Math.Abs((factor * sample.Mantissas[kept[j]]) - constant) * weight;
        }

        return deviations;
    }

    private static BigInteger[] Wide(GroupedSample sample, Centre[] centres, int[] kept)
    {
        var deviations = new BigInteger[kept.Length];
        for (int j = 0; j < kept.Length; j++)
        {
            Centre c = centres[sample.Groups[kept[j]]];
            deviations[j] = BigInteger.Abs((c.Factor * sample.MantissaOf(kept[j])) - c.Constant) * c.Weight;
        }

        return deviations;
    }

    /// <summary>A group's centre: the deviation of x is |Factor x - Constant| Weight in the common unit.</summary>
    private readonly record struct Centre(BigInteger Factor, BigInteger Constant, BigInteger Weight);
}
