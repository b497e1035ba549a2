using System.Numerics;
using Campaigns.Statistics.Blocks;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;
using FsCheck.Xunit;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Identities of the F test within blocks on random designs; the seeds are fixed, a failure prints the design's own seed.</summary>
[Properties(Replay = "(20261201,7919)", MaxTest = 200)]
public sealed class BlockFTestPropertiesTests
{
    [Property]
    public void With_one_block_it_is_the_one_way_F_test_to_the_bit(int seed)
    {
        var random = new Random(seed);
        DesignedSample sample = RandomDesigns.Draw(random, random.Next(2, 8), 1, (_, _) => random.Next(1, 6));
        TestOutcome oneWay = new FTest().Test(sample.Sample);
        TestOutcome blocked = new BlockFTest().Test(sample.Sample);
        if (oneWay is Tested tested)
        {
            VariationTable table = tested.Variation!;
            Assert.Equal(tested with { Variation = table with { Blocks = new VariationLine(0, 0, 0), OmegaSquared = 0 } }, ((Tested)blocked) with { Variation = ((Tested)blocked).Variation! with { OmegaSquared = 0 } });
            Relative.AssertNear(table.OmegaSquared, ((Tested)blocked).Variation!.OmegaSquared, 1e-15, "omega squared");
            Assert.All(FittedLayout.OneWay(sample.Sample)!.Residuals.Zip(FittedLayout.InBlocks(sample.Sample)!.Residuals), pair => Assert.InRange(Math.Abs(pair.First - pair.Second), 0, (1e-16 * Math.Abs(pair.First)) + 1e-28));
            Assert.All(FittedLayout.OneWay(sample.Sample)!.Leverages.Zip(FittedLayout.InBlocks(sample.Sample)!.Leverages), pair => Relative.AssertNear(pair.First, pair.Second, 4e-15, "leverage"));
            GroupEstimates plain = GroupEstimates.OneWay(sample.Sample)!;
            GroupEstimates within = GroupEstimates.InBlocks(sample.Sample)!;
            Assert.Equal(plain.Difference(0, 1), within.Difference(0, 1));
            Relative.AssertNear(plain.StandardErrorOfDifference(0, 1), within.StandardErrorOfDifference(0, 1), 1e-15, "standard error");
        }
        else
        {
            Assert.Equal(oneWay, blocked);
        }
    }

    /// <summary>In complete blocks nothing needs adjusting: SSG = sum T_i^2/(b r) - T^2/N, SSB = sum B_j^2/(k r) - T^2/N, here in integers over N.</summary>
    [Property]
    public void In_complete_blocks_the_sums_of_squares_are_those_of_plain_totals(int seed)
    {
        var random = new Random(seed);
        CheckComplete(random, random.Next(2, 9), random.Next(2, 12), random.Next(1, 4));
    }

    [Theory]
    [InlineData(2, 3, 50_000)]
    [InlineData(60, 50, 2)]
    [InlineData(3, 20_000, 1)]
    public void Large_complete_designs_too(int groups, int blocks, int repeats) => CheckComplete(new Random(11), groups, blocks, repeats);

    /// <summary>What a least-squares fit is, whatever computed it: residuals that add up to nothing in every group and every block, leverages that add up to the parameters, squares that add up to the residual line.</summary>
    [Property]
    public void Residuals_are_orthogonal_to_groups_and_blocks(int seed) => CheckFit(RandomDesigns.Draw(new Random(seed)));

    [Theory]
    [InlineData(60, 2000, 1)]
    [InlineData(60, 300, 2)]
    [InlineData(2, 5000, 3)]
    [InlineData(40, 40, 4)]
    public void Large_designs_are_fitted_too(int groups, int blocks, int seed)
    {
        // Blocks of many different sizes, most of them with a fraction of the groups only.
        var random = new Random(seed);
        CheckFit(RandomDesigns.Draw(random, groups, blocks, (i, j) => (i + (j * 7)) % groups <= 1 + (j % 5) ? 1 + random.Next(1 + (j % 3)) : 0));
    }

    /// <summary>Links that hang by a thread: each group meets the next in one block only, with one value against hundreds.</summary>
    [Theory]
    [InlineData(40, 1, 400)]
    [InlineData(40, 400, 1)]
    [InlineData(10, 2, 5000)]
    public void A_chain_of_very_unequal_blocks_is_fitted_too(int groups, int few, int many) =>
        CheckFit(RandomDesigns.Draw(new Random(5), groups, groups, (i, j) => i == j ? few : i == (j + 1) % groups ? (i % 3 == 0 ? 1 : many) : 0));

    [Property]
    public void A_block_with_a_single_value_changes_nothing_but_the_count(int seed)
    {
        DesignedSample sample = RandomDesigns.Draw(new Random(seed));
        if (new BlockFTest().Test(sample.Sample) is Tested plain)
        {
            Tested more = Assert.IsType<Tested>(new BlockFTest().Test(new DesignedSample([.. sample.Rows, new DesignedRow(sample.Rows[0].Group, "alone", "", "123456.7")]).Sample));
            Assert.Equal(plain.ObservationCount + 1, more.ObservationCount);
            Assert.Equal((plain.Statistic, plain.P, plain.Df1, plain.Df2), (more.Statistic, more.P, more.Df1, more.Df2));
            Assert.Equal(plain.Variation!.Between, more.Variation!.Between);
            Assert.Equal(plain.Variation.Within, more.Variation.Within);
        }
    }

    [Property]
    public void What_is_added_to_a_whole_block_does_not_change_a_bit(int seed, long constant)
    {
        DesignedSample sample = RandomDesigns.Draw(new Random(seed));
        string block = sample.Rows[^1].Block;
        DesignedSample moved = new(sample.Rows.Select(r => r.Block == block ? r with { Value = Plus(r.Value, constant) } : r));
        TestOutcome plain = new BlockFTest().Test(sample.Sample);
        TestOutcome other = new BlockFTest().Test(moved.Sample);
        if (plain is Tested tested)
        {
            Tested after = Assert.IsType<Tested>(other);
            Assert.Equal((tested.Statistic, tested.P), (after.Statistic, after.P));
            Assert.Equal(tested.Variation!.Between, after.Variation!.Between);
            Assert.Equal(tested.Variation.Within, after.Variation.Within);
        }
        else
        {
            Assert.Equal(plain, other);
        }
    }

    private static void CheckComplete(Random random, int k, int b, int r)
    {
        long[] values = [.. Enumerable.Range(0, k * b * r).Select(_ => random.NextInt64(-1_000_000_000_000, 1_000_000_000_000))];
        ushort[] groups = [.. values.Select((_, i) => (ushort)(i % k))];
        int[] blocks = [.. values.Select((_, i) => i / k % b)];
        BigInteger n = values.Length;
        BigInteger total = Total(values.Select(v => (BigInteger)v));
        BigInteger squares = Total(values.Select(v => (BigInteger)v * v));
        BigInteger correction = total * total;
        BigInteger ofGroups = (k * Total(values.Select((v, i) => (v, groups[i])).GroupBy(p => p.Item2).Select(g => Square(g.Aggregate((Int128)0, (sum, p) => sum + p.v))))) - correction;
        BigInteger ofBlocks = (b * Total(values.Select((v, i) => (v, blocks[i])).GroupBy(p => p.Item2).Select(g => Square(g.Aggregate((Int128)0, (sum, p) => sum + p.v))))) - correction;
        BigInteger rest = (n * squares) - correction - ofGroups - ofBlocks;
        Tested tested = Assert.IsType<Tested>(new BlockFTest().Test(new GroupedSample(values, 0, groups, k) { Blocks = blocks }));
        Relative.AssertNear((double)ofGroups / (double)n, tested.Variation!.Between.SumOfSquares, 1e-15, "groups");
        Relative.AssertNear((double)ofBlocks / (double)n, tested.Variation.Blocks!.Value.SumOfSquares, 1e-15, "blocks");
        Relative.AssertNear((double)rest / (double)n, tested.Variation.Within.SumOfSquares, 1e-15, "residual");
        Relative.AssertNear((double)ofGroups / (k - 1) / ((double)rest / (values.Length - k - b + 1)), tested.Statistic, 2e-15, "F");
    }

    private static void CheckFit(DesignedSample sample)
    {
        FittedLayout? fit = FittedLayout.InBlocks(sample.Sample);
        var layout = BlockLayout.Of(sample.Sample);
        Assert.Equal(layout.IsFitted, fit is not null);
        if (fit is null || layout.Obstacle is not null)
        {
            return;
        }

        Assert.Equal(layout.ResidualDegreesOfFreedom, fit.DegreesOfFreedom);
        foreach (IGrouping<string, int> set in Enumerable.Range(0, sample.Rows.Length).GroupBy(i => "group " + sample.Rows[i].Group).Concat(Enumerable.Range(0, sample.Rows.Length).GroupBy(i => "block " + sample.Rows[i].Block)))
        {
            // Rounding alone: half a unit in the last place of numbers below 2, each, and the additions.
            Assert.InRange(Math.Abs(set.Sum(i => fit.Residuals[i])), 0, 3e-16 * set.Count() * Math.Max(1, set.Sum(i => Math.Abs(fit.Residuals[i]))));
        }

        Relative.AssertNear(layout.GroupCount + layout.BlockCount - 1, fit.Leverages.Sum(), 1e-12, "sum of leverages");
        double scale = fit.Scale.ToDouble();
        Relative.AssertNear(layout.Table().Within.SumOfSquares, fit.Residuals.Sum(r => r * r) * scale * scale, 1e-13, "residual sum of squares");
    }

    private static string Plus(string value, long constant)
    {
        (BigInteger mantissa, int exponent) = TypedSample.ExactDecimal(value);
        return $"{mantissa + (constant * BigInteger.Pow(10, -exponent))}e{exponent}";
    }

    private static BigInteger Total(IEnumerable<BigInteger> values) => values.Aggregate(BigInteger.Zero, (sum, v) => sum + v);

    private static BigInteger Square(Int128 value) => (BigInteger)value * value;
}
