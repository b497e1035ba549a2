using Campaigns.Statistics.Blocks;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>The order in which rows come, and the numbers that blocks and specimens get from it, change no bit of anything that is computed.</summary>
public sealed class RowOrderTests
{
    private const int Designs = 200;

    /// <summary>One design in so many is followed up too: the laws of several comparisons take milliseconds each.</summary>
    private const int FollowedUpEvery = 25;

    /// <summary>One row; blocks and specimens are names as yet.</summary>
    private readonly record struct Row(long Value, int Group, int Block, int Specimen, long Order);

    /// <summary>How groups and blocks meet.</summary>
    public enum Plan
    {
        /// <summary>Every group once in every block.</summary>
        Complete,

        /// <summary>Every block lacks one group, each group as often as another.</summary>
        Balanced,

        /// <summary>Any counts.</summary>
        Unequal,
    }

    [Theory]
    [InlineData(Plan.Complete)]
    [InlineData(Plan.Balanced)]
    [InlineData(Plan.Unequal)]
    public void Shuffled_rows_give_the_same_bits_within_blocks(Plan plan)
    {
        var random = new Random(20261201);
        int tested = 0;
        for (int design = 0; design < Designs; design++)
        {
            (Row[] rows, int groups) = Draw(random, plan, specimens: false);
            bool followUps = design % FollowedUpEvery == 0;
            string expected = Said(rows, groups, followUps);
            tested += expected.StartsWith(nameof(Tested), StringComparison.Ordinal) ? 1 : 0;
            for (int time = 0; time < (followUps ? 1 : 3); time++)
            {
                random.Shuffle(rows);
                Assert.Equal(expected, Said(rows, groups, followUps));
            }
        }

        Assert.InRange(tested, Designs / 2, Designs);
    }

    [Theory]
    [InlineData(Plan.Complete)]
    [InlineData(Plan.Unequal)]
    public void Shuffled_readings_of_specimens_give_the_same_bits_too(Plan plan)
    {
        var random = new Random(20261202);
        for (int design = 0; design < Designs; design++)
        {
            (Row[] rows, int groups) = Draw(random, plan, specimens: true);
            bool followUps = design % FollowedUpEvery == 0;
            string expected = Said(rows, groups, followUps);
            random.Shuffle(rows);
            Assert.Equal(expected, Said(rows, groups, followUps));
        }
    }

    /// <summary>In complete and in balanced blocks estimates are equal exactly where adjusted totals are, which are whole numbers.</summary>
    [Theory]
    [InlineData(Plan.Complete)]
    [InlineData(Plan.Balanced)]
    public void Estimates_that_are_equal_differ_by_exactly_nothing(Plan plan)
    {
        var random = new Random(20261203);
        int equal = 0;
        for (int design = 0; design < Designs; design++)
        {
            (Row[] rows, int groups) = Draw(random, plan, specimens: false);
            GroupEstimates estimates = GroupEstimates.InBlocks(Sampled(rows, groups))!;
            int size = rows.Count(r => r.Block == rows[0].Block);
            Int128[] adjusted = new Int128[groups];
            foreach (Row row in rows)
            {
                adjusted[row.Group] += ((Int128)row.Value * size) - rows.Where(r => r.Block == row.Block).Aggregate((Int128)0, (sum, r) => sum + r.Value);
            }

            for (int a = 0; a < groups; a++)
            {
                for (int b = a + 1; b < groups; b++)
                {
                    equal += adjusted[a] == adjusted[b] ? 1 : 0;
                    Assert.Equal(Int128.Sign(adjusted[b] - adjusted[a]), Math.Sign(estimates.Difference(a, b)));
                }
            }
        }

        Assert.InRange(equal, Designs / 10, int.MaxValue);
    }

    /// <summary>Whether a specimen stands in several blocks, or one of its readings in none, does not hang on which reading comes first.</summary>
    [Fact]
    public void The_block_of_a_specimen_hangs_on_all_its_readings_alike()
    {
        int[][] orders = [[0, 1, 2], [0, 2, 1], [1, 0, 2], [1, 2, 0], [2, 0, 1], [2, 1, 0]];
        int[] blocks = [4, -1, 6];
        foreach (int[] order in orders)
        {
            SpecimenMeans means = SpecimenMeans.Of(new GroupedSample([1L, 1, 1, 5], 0, [0, 0, 0, 1], 2) { Specimens = [0, 0, 0, 1], Blocks = [.. order.Select(i => blocks[i]), 4] })!;
            Assert.True(means.InSeveralBlocks);
            Assert.Equal([-1, 4], means.Sample.Blocks.ToArray());
        }
    }

    /// <summary>Few different values, so that estimates, residuals and ranks are often equal; now and then far from zero, or wide.</summary>
    private static (Row[] Rows, int Groups) Draw(Random random, Plan plan, bool specimens)
    {
        int groups = random.Next(plan == Plan.Balanced ? 3 : 2, 6);
        int blocks = plan == Plan.Balanced ? groups * random.Next(1, 3) : random.Next(3, 9);
        long scale = random.Next(3) switch { 0 => 1, 1 => 10_007, _ => 1_000_000_000_007 };
        long offset = random.Next(2) * 1_000_000L * scale;
        int spread = random.Next(2, 8);
        long[] ofBlocks = [.. Enumerable.Range(0, blocks).Select(_ => random.Next(2) * random.Next(40) * scale)];
        var rows = new List<Row>();
        for (int g = 0; g < groups; g++)
        {
            for (int b = 0; b < blocks; b++)
            {
                int units = plan switch { Plan.Complete => 1, Plan.Balanced => (g + b) % groups == 0 ? 0 : 1, _ => random.Next(3) };
                for (int u = 0; u < units; u++)
                {
                    int specimen = (((g * 16) + b) * 4) + u;
                    int readings = specimens ? random.Next(1, 4) : 1;
                    for (int r = 0; r < readings; r++)
                    {
                        rows.Add(new Row(offset + ofBlocks[b] + (random.Next(spread) * scale), g, b, specimens ? specimen : -1, rows.Count));
                    }
                }
            }
        }

        long[] orders = [.. Enumerable.Range(0, rows.Count).Select(i => (long)i)];
        random.Shuffle(orders);
        return rows.Count == 0 ? Draw(random, plan, specimens) : ([.. rows.Select((r, i) => r with { Order = orders[i] })], groups);
    }

    /// <summary>A sample whose blocks and specimens are numbered as they first come, as they are when they are read from a file.</summary>
    private static GroupedSample Sampled(Row[] rows, int groups) =>
        new(rows.Select(r => r.Value).ToArray(), 2, rows.Select(r => (ushort)r.Group).ToArray(), groups)
        {
            Blocks = Numbered(rows.Select(r => r.Block)),
            Specimens = rows.Any(r => r.Specimen >= 0) ? Numbered(rows.Select(r => r.Specimen)) : [],
            Orders = rows.Select(r => r.Order).ToArray(),
        };

    private static int[] Numbered(IEnumerable<int> names)
    {
        var numbers = new Dictionary<int, int>();
        return [.. names.Select(n => numbers.TryAdd(n, numbers.Count) ? numbers.Count - 1 : numbers[n])];
    }

    /// <summary>Everything that is computed, as text that tells every two doubles apart.</summary>
    private static string Said(Row[] rows, int groups, bool followUps)
    {
        GroupedSample readings = Sampled(rows, groups);
        GroupedSample units = SpecimenMeans.Of(readings) is { } means ? means.Sample : readings;
        string[] labels = [.. Enumerable.Range(0, groups).Select(g => FormattableString.Invariant($"g{g}"))];
        var said = new List<object> { ExperimentalUnits.Test(new BlockFTest(), readings, RandomDraws.Usual), ExperimentalUnits.Test(new FTest(), readings, RandomDraws.Usual) };
        said.AddRange(CheckReport.Of(new CheckSubject { Units = units, Fit = FittedLayout.InBlocks(units), Labels = labels }));
        said.AddRange(CheckReport.Of(new CheckSubject { Units = units, Fit = FittedLayout.OneWay(units), Labels = labels }));
        if (GroupEstimates.InBlocks(units) is { } estimates && BlockLayout.Of(units).Obstacle is null)
        {
            for (int a = 0; a < groups; a++)
            {
                for (int b = 0; b < groups; b++)
                {
                    said.Add((estimates.Difference(a, b), estimates.CountOf(a) * estimates.CountOf(b) == 0 ? 0 : estimates.T(a, b), estimates.StandardErrorOfDifference(a, b), estimates.CorrelationOfDifferences(a, b, groups - 1)));
                }
            }

            foreach (FollowUp followUp in FollowUpRegistry.All.Where(f => followUps && f.Key != "games-howell"))
            {
                said.AddRange(followUp.Compare(estimates, 0, 0.95));
            }
        }

        return string.Join('\n', said);
    }
}
