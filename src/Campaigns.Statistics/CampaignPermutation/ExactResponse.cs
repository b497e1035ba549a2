using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>One response as integers, and its share of variation between groups under any arrangement, rounded once.</summary>
/// <remarks>
/// The share is that of two integers, correctly rounded to a double: arrangements with equal shares give the same double, in whatever order sums are formed, and shares of different responses are compared by the same rule. Shares that differ by less than a double tells count as equal, which only makes p larger.
/// Where all that is formed stays below 2^53, doubles hold every integer on the way and give the same share (<see cref="FitsDoubles"/>: up to 7 digits for 24 specimens).
/// </remarks>
internal sealed class ExactResponse
{
    private const long ExactDoubles = 1L << 53;

    private readonly long[]? _narrow;

    public ExactResponse(GroupedSample sample, PermutedStatistic statistic, ArrangedDesign design, ShareForm form)
    {
        Form = form;
        Values = statistic switch
        {
            PermutedStatistic.Ranks => AboutTheMiddle(DoubledRanks(sample)),
            PermutedStatistic.WithinBlocks => OverDivisor(WithinBlocks(Mantissas(sample), design)),
            _ => AboutTheMiddle(Mantissas(sample)),
        };
        BigInteger total = Values.Aggregate(BigInteger.Zero, (sum, v) => sum + v);
        BigInteger squares = Values.Aggregate(BigInteger.Zero, (sum, v) => sum + (v * v));
        BigInteger largest = Values.Max(v => BigInteger.Abs(v));
        Constant = form.ConstantFactor * total * total;
        Total = (form.Unit * squares) - Constant;
        BigInteger products = form.Terms.Aggregate(BigInteger.Zero, (sum, t) => sum + (BigInteger.Abs(t.Factor) * design.Sizes[t.First] * design.Sizes[t.Second]));
        FitsDoubles = form.Unit * squares <= ExactDoubles && (form.ConstantFactor > 0 || products * largest * largest <= ExactDoubles);
        _narrow = largest * Values.Length <= long.MaxValue ? [.. Values.Select(v => (long)v)] : null;
    }

    /// <summary>How the share is formed.</summary>
    public ShareForm Form { get; }

    /// <summary>The values by specimen.</summary>
    public BigInteger[] Values { get; }

    /// <summary>What is taken off the form and off the total.</summary>
    public BigInteger Constant { get; }

    /// <summary>The denominator of the share; 0 for a response without variation.</summary>
    public BigInteger Total { get; }

    /// <summary>Whether doubles hold every integer on the way to a share.</summary>
    public bool FitsDoubles { get; }

    /// <summary>The share of an arrangement, from 0 to 1.</summary>
    /// <param name="order">The specimen at every place.</param>
    /// <param name="sizes">Places of each group.</param>
    public double Share(ReadOnlySpan<int> order, ReadOnlySpan<int> sizes)
    {
        var sums = new BigInteger[sizes.Length];
        for (int group = 0; group < sizes.Length; group++)
        {
            sums[group] = Sum(order[..sizes[group]]);
            order = order[sizes[group]..];
        }

        BigInteger share = -Constant;
        foreach ((int first, int second, BigInteger factor) in Form.Terms)
        {
            share += factor * sums[first] * sums[second];
        }

        return Quotient(share, Total);
    }

    /// <summary>a/b rounded to the nearest double, ties to even; 0 &lt;= a &lt;= b.</summary>
    internal static double Quotient(BigInteger a, BigInteger b)
    {
        if (a.IsZero)
        {
            return 0;
        }

        // A quotient of 63 or 64 bits, its last bit telling whether anything was cut off.
        int shift = (int)(63 + b.GetBitLength() - a.GetBitLength());
        var quotient = BigInteger.DivRem(a << shift, b, out BigInteger rest);
        ulong bits = (ulong)quotient | (rest.IsZero ? 0UL : 1UL);
        return Math.ScaleB((double)bits, -shift);
    }

    private BigInteger Sum(ReadOnlySpan<int> specimens)
    {
        if (_narrow is not null)
        {
            long sum = 0;
            foreach (int i in specimens)
            {
                sum += _narrow[i];
            }

            return sum;
        }

        BigInteger wide = 0;
        foreach (int i in specimens)
        {
            wide += Values[i];
        }

        return wide;
    }

    private static BigInteger[] Mantissas(GroupedSample sample)
    {
        var values = new BigInteger[sample.Count];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = sample.MantissaOf(i);
        }

        return values;
    }

    private static BigInteger[] DoubledRanks(GroupedSample sample)
    {
        BigInteger[] values = Mantissas(sample);
        BigInteger[] sorted = [.. values.Order()];
        var doubled = new Dictionary<BigInteger, BigInteger>();
        for (int first = 0, end; first < sorted.Length; first = end)
        {
            end = first + 1;
            while (end < sorted.Length && sorted[end] == sorted[first])
            {
                end++;
            }

            doubled[sorted[first]] = first + 1 + end;
        }

        return [.. values.Select(v => doubled[v])];
    }

    /// <summary>Values less their block's mean, times the least common multiple of the block sizes.</summary>
    private static BigInteger[] WithinBlocks(BigInteger[] values, ArrangedDesign design)
    {
        int[] sizes = [.. design.Cells.Select(cell => cell.Sum())];
        BigInteger multiple = sizes.Aggregate(BigInteger.One, ShareForm.LeastCommonMultiple);
        var sums = new BigInteger[sizes.Length];
        for (int i = 0; i < values.Length; i++)
        {
            sums[design.Blocks[i]] += values[i];
        }

        var within = new BigInteger[values.Length];
        for (int i = 0; i < values.Length; i++)
        {
            int block = design.Blocks[i];
            within[i] = (values[i] * multiple) - (sums[block] * (multiple / sizes[block]));
        }

        return within;
    }

    /// <summary>Values about the middle of their range, over the greatest common divisor of their differences.</summary>
    private static BigInteger[] AboutTheMiddle(BigInteger[] values)
    {
        BigInteger lowest = values.Min();
        BigInteger[] above = OverDivisor([.. values.Select(v => v - lowest)]);
        BigInteger middle = above.Max() / 2;
        return [.. above.Select(v => v - middle)];
    }

    private static BigInteger[] OverDivisor(BigInteger[] values)
    {
        BigInteger divisor = values.Aggregate(BigInteger.Zero, BigInteger.GreatestCommonDivisor);
        return divisor > 1 ? [.. values.Select(v => v / divisor)] : values;
    }
}
