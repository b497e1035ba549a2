using Campaigns.Statistics.ClosedTesting;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.Corrections;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.ClosedTesting;

public sealed class SimesClosedTestingTests
{
    private const int Seed = 20261205;
    private static readonly Dictionary<string, double[]> Vectors =
        ReferenceTable.Read("campaign/pvectors.csv").Rows.GroupBy(r => r.Text("set")).ToDictionary(g => g.Key, g => g.Select(r => r.Number("p")).ToArray());

    [Fact]
    public void Bounds_of_stated_sets_are_the_exact_ones()
    {
        int rows = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/closed_testing.csv").Rows)
        {
            double[] p = Vectors[row.Text("set")];
            SimesClosedTesting testing = Of(p, row.Number("alpha"));
            int[] members = Members(row.Text("subset"), p);
            Assert.Equal(row.Integer("h"), testing.LargestUnrejected);
            Assert.Equal(row.Integer("size"), members.Length);
            Assert.Equal(row.Integer("d_lower_true_discoveries"), testing.RealAtLeast(members));
            Assert.Equal(row.Integer("t_upper_false_discoveries"), testing.FalseAtMost(members));
            rows++;
        }

        Assert.Equal(504, rows);
    }

    [Fact]
    public void The_curve_of_the_smallest_p_values_is_the_exact_one()
    {
        foreach (IGrouping<(string, double), ReferenceRow> curve in ReferenceTable.Read("campaign/closed_testing_curve.csv").Rows.GroupBy(r => (r.Text("set"), r.Number("alpha"))))
        {
            SimesClosedTesting testing = Of(Vectors[curve.Key.Item1], curve.Key.Item2);
            Assert.Equal(curve.Select(r => r.Integer("d_lower_true_discoveries")), testing.Curve());
        }
    }

    [Fact]
    public void The_largest_unrejected_size_counts_the_tails_whose_Simes_p_value_exceeds_the_level()
    {
        foreach (IGrouping<string, ReferenceRow> set in ReferenceTable.Read("campaign/closed_testing_tail_simes.csv").Rows.GroupBy(r => r.Text("set")))
        {
            double[] p = Vectors[set.Key];
            foreach (ReferenceRow row in set.Where(r => r.Number("a_i") is > 1e-280 and < 0.999))
            {
                // Just below the Simes p-value of the i largest they are not rejected, just above it they are.
                double tail = row.Number("a_i");
                Assert.True(Of(p, tail * (1 - 1e-12)).LargestUnrejected >= row.Integer("i"));
                Assert.True(Of(p, tail * (1 + 1e-12)).LargestUnrejected < row.Integer("i"));
            }
        }
    }

    [Fact]
    public void Bounds_of_any_two_sets_agree_with_each_other()
    {
        // Goeman and Solari (2011): a bound never falls as a set grows, and rises by no more than what was added; that of the whole family is what the largest unrejected set leaves.
        var random = new Random(Seed);
        for (int trial = 0; trial < 400; trial++)
        {
            double[] p = Families.Draw(random, random.Next(1, 60));
            int familySize = p.Length + random.Next(0, 4);
            var testing = SimesClosedTesting.Of(RankedFamily.Of(p, familySize), new SignificanceLevel(0.05), trial % 2 == 1);
            int[] all = [.. Enumerable.Range(0, familySize)];
            random.Shuffle(all);
            Assert.Equal(familySize - testing.LargestUnrejected, testing.RealAtLeast(all));
            int small = random.Next(familySize + 1);
            int large = random.Next(small, familySize + 1);
            int d = testing.RealAtLeast(all.AsSpan(0, small));
            Assert.InRange(testing.RealAtLeast(all.AsSpan(0, large)), d, d + large - small);
        }
    }

    [Fact]
    public void Single_hypotheses_are_the_rejections_of_Hommel_and_none_at_all_those_of_Benjamini_and_Hochberg()
    {
        var random = new Random(Seed + 1);
        for (int trial = 0; trial < 400; trial++)
        {
            double[] p = Families.Draw(random, random.Next(1, 40));
            var level = new SignificanceLevel(trial % 3 == 0 ? 0.2 : 0.05);
            SimesClosedTesting testing = Of(p, level.Value);
            double[] hommel = Families.Adjust("hommel", p, p.Length);
            Assert.All(Enumerable.Range(0, p.Length), i => Assert.Equal(hommel[i] <= level.Value, testing.RealAtLeast([i]) == 1));
            Assert.Equal(Families.Adjust("bh", p, p.Length).Any(a => a <= level.Value), testing.LargestUnrejected < p.Length);
        }
    }

    [Fact]
    public void The_curve_is_the_bound_of_the_sets_that_it_stands_for()
    {
        var random = new Random(Seed + 2);
        for (int trial = 0; trial < 200; trial++)
        {
            double[] p = Families.Draw(random, random.Next(0, 50));
            var family = RankedFamily.Of(p, p.Length + 3);
            var testing = SimesClosedTesting.Of(family, new SignificanceLevel(0.1), trial % 2 == 1);
            int[] curve = testing.Curve();
            Assert.Equal(p.Length + 1, curve.Length);
            for (int k = 0; k <= p.Length; k++)
            {
                Assert.Equal(testing.RealAtLeast(family.Order[..k]), curve[k]);
            }
        }
    }

    [Fact]
    public void P_values_below_the_range_of_doubles_count_as_real()
    {
        PValue[] p = [PValue.FromLog(-5000), PValue.FromLog(-90000), PValue.FromValue(0), PValue.FromValue(0.7)];
        var testing = SimesClosedTesting.Of(RankedFamily.Of(p, 1_000_000), new SignificanceLevel(1e-200), anyDependence: true);
        Assert.Equal(3, testing.RealAtLeast([0, 1, 2, 3]));
        Assert.Equal(1, testing.RealAtLeast([1]));
        Assert.Equal([0, 1, 2, 3, 3], testing.Curve());
    }

    [Fact]
    public void Empty_families_and_sets_and_sets_of_untested_hypotheses_hold_nothing_certain()
    {
        Assert.Equal(0, Of([], 0.05).RealAtLeast([]));
        Assert.Equal([0], Of([], 0.05).Curve());
        var testing = SimesClosedTesting.Of(RankedFamily.Of(new double[] { 0.001 }, 3), new SignificanceLevel(0.05));
        Assert.Equal(0, testing.RealAtLeast([]));
        Assert.Equal(0, testing.RealAtLeast([1, 2]));
        Assert.Equal(1, testing.RealAtLeast([0, 1, 2]));
        Assert.Equal(2, testing.FalseAtMost([0, 1, 2]));
    }

    [Fact]
    public void When_every_p_value_is_zero_every_hypothesis_is_real()
    {
        SimesClosedTesting testing = Of([0, 0, 0], 0.05);
        Assert.Equal(0, testing.LargestUnrejected);
        Assert.Equal(3, testing.RealAtLeast([0, 1, 2]));
    }

    [Fact]
    public void A_p_value_exactly_at_its_boundary_counts()
    {
        // One hypothesis: rejected if and only if p is at most the level.
        Assert.Equal(1, Of([0.05], 0.05).RealAtLeast([0]));
        Assert.Equal(0, Of([Math.BitIncrement(0.05)], 0.05).RealAtLeast([0]));

        // Three equal p-values at the level: each set of them is rejected at its last rank.
        Assert.Equal(3, Of([0.05, 0.05, 0.05], 0.05).RealAtLeast([0, 1, 2]));
    }

    [Fact]
    public void The_fifteen_p_values_of_Benjamini_and_Hochberg_1995_hold_at_least_three_effects()
    {
        SimesClosedTesting testing = Of(Vectors["m15_bh1995"], 0.05);
        Assert.Equal(12, testing.LargestUnrejected);
        Assert.Equal(3, testing.RealAtLeast(Enumerable.Range(0, 15).ToArray()));
    }

    [Fact]
    public void A_member_that_is_not_of_the_family_or_stands_twice_is_refused()
    {
        SimesClosedTesting testing = Of([0.1, 0.2], 0.05);
        Assert.Contains("2 hypotheses", Assert.Throws<ArgumentException>(() => testing.RealAtLeast([2])).Message, StringComparison.Ordinal);
        Assert.Contains("twice", Assert.Throws<ArgumentException>(() => testing.RealAtLeast([1, 1])).Message, StringComparison.Ordinal);
    }

    private static SimesClosedTesting Of(double[] p, double level) => SimesClosedTesting.Of(RankedFamily.Of(p, p.Length), new SignificanceLevel(level));

    private static int[] Members(string subset, double[] p)
    {
        int m = p.Length;
        int[] order = [.. Enumerable.Range(0, m).OrderBy(i => p[i]).ThenBy(i => i)];
        return subset switch
        {
            "all" => [.. Enumerable.Range(0, m)],
            "top_half" => order[..Math.Max(1, m / 2)],
            "bottom_half" => order[(m / 2)..],
            "odd_index" => [.. Enumerable.Range(0, m).Where(i => i % 2 == 0)],
            "p_le_0.05" => [.. Enumerable.Range(0, m).Where(i => p[i] <= 0.05)],
            "p_le_0.2" => [.. Enumerable.Range(0, m).Where(i => p[i] <= 0.2)],
            "first_10" => [.. Enumerable.Range(0, Math.Min(10, m))],
            _ => throw new ArgumentOutOfRangeException(nameof(subset), subset, "No such set."),
        };
    }
}
