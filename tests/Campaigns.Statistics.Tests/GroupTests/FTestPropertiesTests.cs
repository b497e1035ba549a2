using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;
using FsCheck.Xunit;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Identities of the F test on random layouts; the seeds are fixed, a failure prints the layout's own seed.</summary>
[Properties(Replay = "(20261201,7919)", MaxTest = 300)]
public sealed class FTestPropertiesTests
{
    [Property]
    public void Row_order_does_not_change_a_bit(int seed)
    {
        TypedSample sample = Layout(seed);
        Assert.Equal(sample.Test(new FTest()), sample.Shuffled(seed).Test(new FTest()));
        Assert.Equal(sample.Summaries(0.95), sample.Shuffled(seed).Summaries(0.95));
    }

    [Property]
    public void A_constant_added_to_every_value_does_not_change_a_bit(int seed, long constant)
    {
        TypedSample sample = Layout(seed);
        Assert.Equal(sample.Test(new FTest()), sample.Plus(constant).Test(new FTest()));
        Assert.Equal(sample.Test(new FTest()), sample.Plus(BigInteger.Pow(10, 40) + constant).Test(new FTest()));
    }

    [Property]
    public void A_power_of_ten_changes_neither_F_nor_p_nor_the_shares(int seed, byte power)
    {
        TypedSample sample = Layout(seed);
        Tested plain = Assert.IsType<Tested>(sample.Test(new FTest()));
        foreach (TypedSample scaled in new[] { sample.WithDecimals(power), sample.WithDecimals(-power), sample.Times(BigInteger.Pow(10, power % 60)) })
        {
            Tested other = Assert.IsType<Tested>(scaled.Test(new FTest()));
            Assert.Equal(plain.Statistic, other.Statistic);
            Assert.Equal(plain.P, other.P);
            Assert.Equal(plain.Variation!.EtaSquared, other.Variation!.EtaSquared);
            Assert.Equal(plain.Variation!.OmegaSquared, other.Variation.OmegaSquared);
        }
    }

    [Property]
    public void Integers_of_64_bits_and_of_any_size_give_the_same_bits(int seed)
    {
        TypedSample sample = Layout(seed);
        Assert.Equal(sample.TestAsWide(new FTest()), sample.Test(new FTest()));
    }

    [Property]
    public void The_origin_of_the_sums_does_not_change_a_bit(int seed, int origin)
    {
        var random = new Random(seed);
        long[] mantissas = [.. Enumerable.Range(0, 12).Select(_ => random.NextInt64(-1_000_000, 1_000_000))];
        ushort[] groups = [0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2, 2];
        VariationTable expected = OneWayLayout.Of(new GroupedSample(mantissas, 2, groups, 3)).Table();
        var sample = new GroupedSample(mantissas, 2, groups, 3);
        Assert.Equal(expected, OneWayLayout.Of(ExactMoments.About(sample, (long)origin, new GroupSums[3]), sample.Unit).Table());
        Assert.Equal(expected, OneWayLayout.Of(ExactMoments.About(sample, (BigInteger)origin, new GroupSums[3]), sample.Unit).Table());
    }

    [Property]
    public void With_two_groups_F_is_t_squared(int seed)
    {
        var random = new Random(seed);
        BigInteger[] first = [.. Enumerable.Range(0, random.Next(2, 20)).Select(_ => (BigInteger)random.NextInt64(-1_000_000_000, 1_000_000_000))];
        BigInteger[] second = [.. Enumerable.Range(0, random.Next(1, 20)).Select(_ => (BigInteger)random.NextInt64(-1_000_000_000, 1_000_000_000))];
        TypedSample sample = new([.. first, .. second], 3, [.. first.Select(_ => (ushort)0), .. second.Select(_ => (ushort)1)], 2);
        Tested tested = Assert.IsType<Tested>(sample.Test(new FTest()));
        Relative.AssertNear(SquaredT(first, second), tested.Statistic, 1e-15, "F");
    }

    /// <summary>t squared = (difference of means)^2 / (pooled variance (1/n + 1/m)), in exact fractions from the deviations themselves; one division of integers scaled up to 80 bits at the end.</summary>
    private static double SquaredT(BigInteger[] first, BigInteger[] second)
    {
        BigInteger n = first.Length;
        BigInteger m = second.Length;
        BigInteger sumFirst = first.Aggregate(BigInteger.Add);
        BigInteger sumSecond = second.Aggregate(BigInteger.Add);
        BigInteger difference = (sumFirst * m) - (sumSecond * n);
        BigInteger squaresFirst = first.Aggregate(BigInteger.Zero, (s, x) => s + (((n * x) - sumFirst) * ((n * x) - sumFirst)));
        BigInteger squaresSecond = second.Aggregate(BigInteger.Zero, (s, x) => s + (((m * x) - sumSecond) * ((m * x) - sumSecond)));

        // difference^2/(n m)^2 over ((squaresFirst/n^2 + squaresSecond/m^2)/(n + m - 2)) (n + m)/(n m)
        BigInteger above = difference * difference * n * m * (n + m - 2);
        BigInteger below = ((squaresFirst * m * m) + (squaresSecond * n * n)) * (n + m);
        return Math.ScaleB((double)((above << 200) / below), -200);
    }

    /// <summary>2 to 6 groups of 1 to 12 values, the first of at least 2 that differ; 1 to 18 digits.</summary>
    private static TypedSample Layout(int seed)
    {
        var random = new Random(seed);
        int groupCount = random.Next(2, 7);
        long width = (long)Math.Pow(10, random.Next(1, 18));
        List<BigInteger> values = [0, width];
        List<ushort> groups = [0, 0];
        for (ushort g = 0; g < groupCount; g++)
        {
            for (int i = random.Next(1, 13); i > 0; i--)
            {
                values.Add(random.NextInt64(-width, width));
                groups.Add(g);
            }
        }

        return new([.. values], random.Next(-5, 12), [.. groups], groupCount);
    }
}
