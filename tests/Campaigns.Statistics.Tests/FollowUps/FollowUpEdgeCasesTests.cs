using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.FollowUps;

/// <summary>Layouts at the edge of what can be compared: no p = 0, no NaN, no exception.</summary>
public sealed class FollowUpEdgeCasesTests
{
    private static readonly string[] Pooled = ["tukey-kramer", "scheffe", "dunnett", "holm-pairs"];

    [Fact]
    public void With_two_groups_every_pooled_procedure_gives_the_p_of_the_F_test()
    {
        var random = new Random(20261204);
        for (int i = 0; i < 200; i++)
        {
            TypedSample sample = Sample(random, 2, () => random.Next(1, 12), random.NextDouble() * random.Next(1, 40));
            if (sample.Test(new FTest()) is not Tested f)
            {
                continue;
            }

            foreach (string key in Pooled)
            {
                GroupComparison line = Assert.Single(Compare(sample, key));
                Assert.Equal(f.P.Log, line.P!.Value.Log, 2e-13 * (1 + Math.Abs(f.P.Log)));
                Assert.Equal(f.Df2, line.DegreesOfFreedom);
            }
        }
    }

    /// <summary>R's data set sleep: t.test(extra ~ group) prints p = 0.07939.</summary>
    [Fact]
    public void With_two_groups_Games_Howell_is_Welchs_t_test()
    {
        GroupComparison line = Assert.Single(Compare(TypedSample.OfText(FollowUpReferenceTests.Values("worked_examples_data.csv")["sleep"]), "games-howell"));
        Assert.Equal(0.0793941402, line.P!.Value.Value, 1e-10);
        Assert.Equal(17.77647352, line.DegreesOfFreedom!.Value, 1e-8);
    }

    [Fact]
    public void A_group_with_one_value_is_compared_by_the_pooled_procedures_alone()
    {
        TypedSample sample = Of("a 1 a 2 a 4 b 7 c 3 c 5");
        foreach (string key in Pooled)
        {
            Assert.All(Compare(sample, key), AssertPlain);
        }

        IReadOnlyList<GroupComparison> games = Compare(sample, "games-howell");
        Assert.Equal(["a group with one value has no variance of its own", null, "a group with one value has no variance of its own"], games.Select(l => l.Obstacle));
        Assert.All(games, l => Assert.Equal(l.Obstacle is null, l.P is not null));
        AssertPlain(games[1]);
    }

    [Fact]
    public void Groups_that_do_not_vary_at_all_give_no_p_unless_they_are_equal()
    {
        TypedSample sample = Of("a 0.1 a 0.1 a 0.1 b 0.3 b 0.3 c 0.1 c 0.1");
        foreach (string key in Pooled)
        {
            IReadOnlyList<GroupComparison> lines = Compare(sample, key);
            Assert.All(lines, l =>
            {
                bool equal = (l.GroupA, l.GroupB) is (0, 2);
                Assert.Equal(equal ? 1 : null, l.P?.Value);
                Assert.Equal(equal ? null : "the residual variation is zero, so that there is no measure of chance", l.Obstacle);
                Assert.Null(l.Lower);
            });
        }

        Assert.All(Compare(sample, "games-howell"), l => Assert.Equal("neither group varies, so that there is no measure of chance", l.Obstacle));
    }

    [Fact]
    public void One_constant_group_does_not_hinder_Games_Howell()
    {
        GroupComparison line = Compare(Of("a 1 a 1 a 1 b 2 b 2.5 b 2.75 b 2"), "games-howell").Single();
        AssertPlain(line);
        Assert.Equal(3, line.DegreesOfFreedom!.Value, 1e-15);
    }

    [Fact]
    public void Equal_means_have_p_exactly_one_whatever_their_digits()
    {
        // Means 1/3 from 3 and from 6 values, behind an offset.
        foreach (string key in FollowUpRegistry.All.Select(f => f.Key))
        {
            TypedSample sample = Of("a 0 a 0 a 1 b 0 b 0 b 0 b 0 b 1 b 1 c 5 c 6").Plus(BigInteger.Pow(10, 15) + 7);
            GroupComparison line = Compare(sample, key).Single(l => (l.GroupA, l.GroupB) is (0, 1));
            Assert.Equal(0, line.Difference);
            Assert.Equal(0, line.Statistic);
            Assert.Equal(1, line.P!.Value.Value);
            Assert.Equal(0, line.P!.Value.Log);
        }
    }

    [Fact]
    public void Offsets_and_units_change_no_p()
    {
        TypedSample sample = Of("a 1.25 a 2 a 2.5 b 3 b 4.25 b 4 c 9 c 8.75 c 7");
        foreach (string key in FollowUpRegistry.All.Select(f => f.Key))
        {
            IReadOnlyList<GroupComparison> plain = Compare(sample, key);
            foreach (TypedSample changed in new[] { sample.Plus(BigInteger.Pow(10, 14)), sample.WithDecimals(302), sample.WithDecimals(-298), sample.Times(BigInteger.Pow(10, 25)) })
            {
                foreach ((GroupComparison one, GroupComparison other) in plain.Zip(Compare(changed, key)))
                {
                    AssertPlain(other);
                    Relative.AssertNear(one.P!.Value.Value, other.P!.Value.Value, 1e-12, key);
                    Relative.AssertNear(one.Statistic!.Value, other.Statistic!.Value, 1e-14, key);
                }
            }
        }
    }

    [Fact]
    public void The_order_of_the_rows_changes_no_bit()
    {
        TypedSample sample = Sample(new Random(20261205), 5, () => 7, 1);
        foreach (string key in FollowUpRegistry.All.Select(f => f.Key))
        {
            Assert.Equal(Compare(sample, key), Compare(sample.Shuffled(3), key));
        }
    }

    [Fact]
    public void Sixty_groups_are_compared()
    {
        TypedSample sample = Sample(new Random(20261206), 60, () => 4, 3);
        foreach (FollowUp followUp in FollowUpRegistry.All)
        {
            IReadOnlyList<GroupComparison> lines = Compare(sample, followUp.Key);
            Assert.Equal(followUp.NeedsControl ? 59 : 1770, lines.Count);
            Assert.All(lines, AssertPlain);
        }
    }

    [Fact]
    public void A_hundred_thousand_values_in_a_group_beside_two_are_compared()
    {
        var random = new Random(20261207);
        int next = 0;
        int[] sizes = [2, 100_000, 3, 50_000];
        TypedSample sample = Sample(random, 4, () => sizes[next++], 1);
        foreach (string key in FollowUpRegistry.All.Select(f => f.Key))
        {
            Assert.All(Compare(sample, key), AssertPlain);
        }

        // Against a control of two the large groups move together: the adjusted p of a pair is close to its own.
        IReadOnlyList<GroupComparison> dunnett = Compare(sample, "dunnett");
        Assert.Equal(3, dunnett.Count);
    }

    [Fact]
    public void One_degree_of_freedom_is_enough()
    {
        TypedSample sample = Of("a 1 a 1.5 b 7 c 3");
        foreach (string key in Pooled)
        {
            Assert.All(Compare(sample, key), l =>
            {
                AssertPlain(l);
                Assert.Equal(1, l.DegreesOfFreedom);
            });
        }
    }

    [Fact]
    public void Enormous_statistics_have_a_logarithm()
    {
        var estimates = new GroupEstimates([WideReal.Zero, WideReal.From(1e200), WideReal.From(3e200)], [2, 2, 2], [1e-100, 1e-100, 1e-100], new double[,] { { 0.5, 0, 0 }, { 0, 0.5, 0 }, { 0, 0, 0.5 } }, 1e-105, 3, withinBlocks: false);
        foreach (FollowUp followUp in FollowUpRegistry.All)
        {
            Assert.All(followUp.Compare(estimates, 0, 0.95), l =>
            {
                Assert.True(double.IsFinite(l.Statistic!.Value));
                Assert.InRange(l.P!.Value.Log, -3000, -600);
            });
        }
    }

    [Fact]
    public void The_control_may_be_any_group_and_empty_groups_are_left_out()
    {
        var estimates = new GroupEstimates([WideReal.From(1.0), WideReal.Zero, WideReal.From(2.0), WideReal.From(4.0)], [3, 0, 3, 3], [0.5, double.NaN, 0.5, 0.5], new double[,] { { 1 / 3.0, 0, 0, 0 }, { 0, 0, 0, 0 }, { 0, 0, 1 / 3.0, 0 }, { 0, 0, 0, 1 / 3.0 } }, 0.9, 6, withinBlocks: false);
        Assert.Equal([(2, 0), (2, 3)], FollowUpRegistry.Find("dunnett")!.Compare(estimates, 2, 0.9).Select(l => (l.GroupA, l.GroupB)));
        Assert.Empty(FollowUpRegistry.Find("dunnett")!.Compare(estimates, 1, 0.9));
        Assert.Equal([(0, 2), (0, 3), (2, 3)], FollowUpRegistry.Find("scheffe")!.Compare(estimates, null, 0.9).Select(l => (l.GroupA, l.GroupB)));
    }

    /// <summary>Within blocks: product correlations give the same as plain groups of those sizes; where there are none the bound of independent numerators holds.</summary>
    [Fact]
    public void Within_blocks_Dunnett_finds_product_correlations_or_takes_Sidaks_bound()
    {
        WideReal[] means = [WideReal.Zero, WideReal.From(1.0), WideReal.From(2.5), WideReal.From(0.5)];
        int[] counts = [4, 3, 5, 2];
        double[] none = [double.NaN, double.NaN, double.NaN, double.NaN];
        double[,] plain = { { 1 / 4.0, 0, 0, 0 }, { 0, 1 / 3.0, 0, 0 }, { 0, 0, 1 / 5.0, 0 }, { 0, 0, 0, 1 / 2.0 } };
        IReadOnlyList<GroupComparison> groups = new Dunnett().Compare(new GroupEstimates(means, counts, none, plain, 1, 10, withinBlocks: false), 0, 0.95);
        IReadOnlyList<GroupComparison> blocks = new Dunnett().Compare(new GroupEstimates(means, counts, none, plain, 1, 10, withinBlocks: true), 0, 0.95);
        Assert.All(groups.Zip(blocks), pair => Relative.AssertNear(pair.First.P!.Value.Value, pair.Second.P!.Value.Value, 1e-13, "p"));

        double[,] crossed = { { 0.25, 0, 0, 0 }, { 0, 0.3, 0.2, 0 }, { 0, 0.2, 0.4, -0.1 }, { 0, 0, -0.1, 0.5 } };
        var unbalanced = new GroupEstimates(means, counts, none, crossed, 1, 10, withinBlocks: true);
        Assert.All(new Dunnett().Compare(unbalanced, 0, 0.95), l =>
        {
            AssertPlain(l);

            // Between one comparison's own p and Bonferroni's.
            double own = Math.Exp(Campaigns.Statistics.Distributions.StudentT.LogTwoSidedTail(l.Statistic!.Value, 10));
            Assert.InRange(l.P!.Value.Value, own, 3 * own);
        });
        Assert.All(new GamesHowell().Compare(unbalanced, null, 0.95), l => Assert.Equal("groups compared within blocks have no variance of their own", l.Obstacle));
        Assert.All(new TukeyKramer().Compare(unbalanced, null, 0.95), AssertPlain);
    }

    private static void AssertPlain(GroupComparison line)
    {
        Assert.Null(line.Obstacle);
        Assert.True(double.IsFinite(line.Difference) && double.IsFinite(line.Statistic!.Value) && double.IsFinite(line.DegreesOfFreedom!.Value));
        Assert.True(double.IsFinite(line.P!.Value.Log));
        Assert.True(line.Lower <= line.Difference && line.Difference <= line.Upper);
    }

    private static IReadOnlyList<GroupComparison> Compare(TypedSample sample, string key) => FollowUpRegistry.Find(key)!.Compare(sample.Estimates()!, 0, 0.95);

    private static TypedSample Of(string words)
    {
        string[] parts = words.Split(' ');
        return TypedSample.OfText(parts.Chunk(2).Select(pair => (pair[0], pair[1])));
    }

    private static TypedSample Sample(Random random, int groups, Func<int> size, double effect) =>
        TypedSample.OfText(Enumerable.Range(0, groups).SelectMany(g => Enumerable.Range(0, size()).Select(_ =>
            ($"g{g}", ((effect * g / groups) + random.NextDouble() + random.NextDouble()).ToString("F6", CultureInfo.InvariantCulture)))));
}
