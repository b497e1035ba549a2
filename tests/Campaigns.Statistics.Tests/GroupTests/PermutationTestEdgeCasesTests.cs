using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class PermutationTestEdgeCasesTests
{
    private static readonly PermutationTest Permutation = new();
    private static readonly RandomDraws Draws = new(12, 2500);

    /// <summary>Enumerated, drawn as sets of bits, shuffled.</summary>
    public static TheoryData<int[]> Designs => new([3, 3, 4], [6, 6, 6, 6], [1, 30, 33], [25, 30, 45]);

    [Theory]
    [MemberData(nameof(Designs))]
    public void Order_names_shift_and_scale_change_no_count(int[] sizes)
    {
        TypedSample sample = Random(sizes, 1, 200);
        Resampling? expected = Of(sample);
        Assert.Equal(expected, Of(sample.Shuffled(5)));
        Assert.Equal(expected, Of(Random(sizes, 1, 200, relabel: true)));
        Assert.Equal(expected, Of(sample.Plus(BigInteger.Pow(10, 12))));
        Assert.Equal(expected, Of(sample.Plus(-BigInteger.Pow(10, 30))));
        Assert.Equal(expected, Of(sample.Times(7)));
        Assert.Equal(expected, Of(sample.Times(BigInteger.Pow(10, 300))));
        Assert.Equal(expected, Of(sample.WithDecimals(-300)));
        Assert.Equal(expected, Of(sample.WithDecimals(300)));
        Assert.Equal(expected, Assert.IsType<Tested>(sample.TestAsWide(new WithDraws())).Resampling);
    }

    [Theory]
    [MemberData(nameof(Designs))]
    public void Values_of_1e300_and_1e_minus_300_together_are_compared_exactly(int[] sizes)
    {
        // One value towers over all: S is that of the others, far below the last digit of a double. The same ranks result from a tower of any height that is high enough.
        var random = new Random(6);
        ushort[] groups = Labels(sizes);
        BigInteger[] small = [.. groups.Select(g => (BigInteger)random.Next(100) + (10 * g))];
        Resampling? high = Of(new TypedSample([.. small[..^1], BigInteger.Pow(10, 600)], 300, groups, sizes.Length));
        Resampling? lower = Of(new TypedSample([.. small[..^1], BigInteger.Pow(10, 30)], 300, groups, sizes.Length));
        Assert.Equal(lower, high);
        Assert.InRange(high!.AsExtreme, 1, high.Arrangements - 1);
    }

    [Fact]
    public void Ties_count_in_every_arrangement()
    {
        // A single value differs: F takes one value per size of the group that holds it, so with equal sizes every arrangement ties.
        foreach (int n in new[] { 3, 6, 25 })
        {
            long[] values = new long[4 * n];
            values[5] = 123_456_789_012_345;
            TestOutcome outcome = Permutation.Test(new GroupedSample(values, 0, [.. Enumerable.Range(0, 4 * n).Select(i => (ushort)(i / n))], 4), Draws);
            Tested tested = Assert.IsType<Tested>(outcome);
            Assert.Equal(1, tested.P.Value);
            Assert.Equal(tested.Resampling!.Arrangements, tested.Resampling.AsExtreme);
        }
    }

    [Fact]
    public void Equal_group_means_give_p_1()
    {
        Tested tested = Assert.IsType<Tested>(Permutation.Test(new GroupedSample([1L, 3, 2, 2, 0, 4], 3, [0, 0, 1, 1, 2, 2], 3)));
        Assert.Equal(0, tested.Statistic);
        Assert.Equal(1, tested.P.Value);
    }

    [Fact]
    public void Constant_groups_that_differ_are_tested_and_F_is_the_largest_double()
    {
        Tested tested = Assert.IsType<Tested>(Permutation.Test(new GroupedSample([1L, 1, 2, 2, 3, 3], 0, [0, 0, 1, 1, 2, 2], 3)));
        Assert.Equal(double.MaxValue, tested.Statistic);
        Assert.Null(tested.Variation);
        Assert.Equal(new Resampling(90, 6, null), tested.Resampling);
        Assert.Equal(6.0 / 90, tested.P.Value);
    }

    [Fact]
    public void What_cannot_be_tested_is_told_as_for_the_F_test()
    {
        Assert.Equal(NotTestableReason.TooFewGroups, Reason([5, 5, 5], [0, 0, 0], 2));
        Assert.Equal(NotTestableReason.NoReplication, Reason([5, 6], [0, 1], 2));
        Assert.Equal(NotTestableReason.ConstantResponse, Reason([5, 5, 5], [0, 1, 1], 2));
    }

    [Fact]
    public void Groups_without_values_are_left_out()
    {
        long[] values = [1, 2, 3, 2, 4, 6];
        Assert.Equal(Permutation.Test(new GroupedSample(values, 0, [0, 0, 0, 1, 1, 1], 2)), Permutation.Test(new GroupedSample(values, 0, [1, 1, 1, 3, 3, 3], 5)));
    }

    [Fact]
    public void A_group_of_one_has_as_many_arrangements_as_values()
    {
        // The largest of 1,000 values alone in its group, and its mirror image about the mean as extreme: 2 of 1,000.
        long[] values = [.. Enumerable.Range(0, 1000).Select(i => (long)i)];
        Tested tested = Assert.IsType<Tested>(Permutation.Test(new GroupedSample(values, 0, [.. values.Select(v => (ushort)(v == 999 ? 1 : 0))], 2)));
        Assert.Equal(new Resampling(1000, 2, null), tested.Resampling);
    }

    [Fact]
    public void Sixty_groups_are_tested()
    {
        // Sizes 1 to 60: their least common multiple has 26 digits. The group means rise strongly, then not at all.
        ushort[] groups = Labels([.. Enumerable.Range(1, 60)]);
        var random = new Random(3);
        long[] rising = [.. groups.Select(g => (100L * g) + random.Next(100))];
        long[] flat = [.. groups.Select(_ => (long)random.Next(100))];
        Assert.Equal(1.0 / 2501, Assert.IsType<Tested>(Permutation.Test(new GroupedSample(rising, 1, groups, 60), Draws)).P.Value);
        double p = Assert.IsType<Tested>(Permutation.Test(new GroupedSample(flat, 1, groups, 60), Draws)).P.Value;
        double f = Assert.IsType<Tested>(new FTest().Test(new GroupedSample(flat, 1, groups, 60))).P.Value;
        Assert.InRange(p, f - 0.05, f + 0.05);
    }

    [Fact]
    public void A_hundred_thousand_values_in_a_group_are_tested()
    {
        var random = new Random(9);
        ushort[] groups = Labels([100_000, 300]);
        long[] values = [.. groups.Select(g => random.Next(1000) + (40L * g))];
        Tested tested = Assert.IsType<Tested>(Permutation.Test(new GroupedSample(values, 1, groups, 2), new RandomDraws(1, 2000)));
        double f = Assert.IsType<Tested>(new FTest().Test(new GroupedSample(values, 1, groups, 2))).P.Value;
        Assert.InRange(tested.P.Value, f - (4 * Math.Sqrt(f / 2000)), f + (4 * Math.Sqrt(f / 2000)) + 0.0005);
    }

    [Fact]
    public void The_widest_64_bit_values_do_not_overflow()
    {
        TypedSample sample = new([long.MinValue, long.MaxValue, long.MinValue, long.MaxValue, long.MaxValue, 0], 0, [0, 1, 0, 1, 1, 0], 2);
        Assert.Equal(new Resampling(20, 2, null), Of(sample));
    }

    [Fact]
    public void The_same_seed_gives_the_same_outcome_on_any_number_of_threads()
    {
        foreach (int n in new[] { 6, 30 })
        {
            var random = new Random(n);
            long[] values = [.. Enumerable.Range(0, 4 * n).Select(_ => (long)random.Next(500))];
            ushort[] groups = [.. Enumerable.Range(0, 4 * n).Select(i => (ushort)(i % 4))];
            TestOutcome once = new PermutationTest().Test(new GroupedSample(values, 2, groups, 4), Draws);
            Assert.Equal(once, Permutation.Test(new GroupedSample(values, 2, groups, 4), Draws));
            Assert.Equal(once, Permutation.Test(new GroupedSample(values, 2, groups, 4), Draws, 2, TestContext.Current.CancellationToken));
            Assert.NotEqual(once, Permutation.Test(new GroupedSample(values, 2, groups, 4), Draws with { Seed = 13 }));
        }
    }

    private static Resampling? Of(TypedSample sample) => Assert.IsType<Tested>(sample.Test(new WithDraws())).Resampling;

    private static NotTestableReason Reason(long[] values, ushort[] groups, int groupCount) =>
        Assert.IsType<NotTestable>(Permutation.Test(new GroupedSample(values, 0, groups, groupCount))).Reason;

    private static ushort[] Labels(int[] sizes) => [.. sizes.SelectMany((n, g) => Enumerable.Repeat((ushort)g, n))];

    private static TypedSample Random(int[] sizes, int seed, int spread, bool relabel = false)
    {
        var random = new Random(seed);
        ushort[] groups = Labels(sizes);
        return new(
            [.. groups.Select(g => (BigInteger)(random.Next(spread) + g))],
            2,
            relabel ? [.. groups.Select(g => (ushort)(sizes.Length - 1 - g))] : groups,
            sizes.Length);
    }

    /// <summary>The test with few draws, so that samples of any kind can be put to it.</summary>
    private sealed class WithDraws : GroupTest
    {
        public override string Key => Permutation.Key;

        public override string Name => Permutation.Name;

        public override string Hypothesis => Permutation.Hypothesis;

        public override string Assumes => Permutation.Assumes;

        public override string Source => Permutation.Source;

        public override TestOutcome Test(GroupedSample sample, RandomDraws draws) => Permutation.Test(sample, Draws);
    }
}
