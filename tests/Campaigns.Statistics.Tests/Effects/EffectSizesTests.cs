using Campaigns.Statistics.Effects;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Effects;

public sealed class EffectSizesTests
{
    private static readonly SignificanceLevel Usual = new(0.05);

    /// <remarks>ncp_ci.csv: root finding in 40-digit arithmetic.</remarks>
    [Fact]
    public void Intervals_equal_the_reference()
    {
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/ncp_ci.csv").Rows;
        Assert.Equal(24, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            // (1 - 0.9)/2 as a double is a little off 0.05, which a bound near 0 shows.
            double level = row.Text("confidence") switch { "0.9" => 0.05, "0.95" => 0.025, _ => 0.005 };
            var sizes = EffectSizes.Of(row.Number("f_obs"), row.Number("df1"), row.Number("df2"), new SignificanceLevel(level));
            string what = $"F = {row.Text("f_obs")}, {row.Text("confidence")}";
            Assert.Equal(row.Number("confidence"), sizes.Confidence, 1e-15);
            foreach ((string column, Interval interval) in new[] { ("ncp", sizes.NoncentralityInterval), ("cohen_f", sizes.CohenFInterval), ("eta2pop", sizes.EtaSquaredInterval) })
            {
                Relative.AssertNear(row.Number(column + "_low"), interval.Lower, 1e-12, $"{what} {column} lower");
                Relative.AssertNear(row.Number(column + "_high"), interval.Upper, 1e-12, $"{what} {column} upper");
            }
        }
    }

    [Fact]
    public void An_F_smaller_than_chance_lets_expect_gives_bounds_of_zero()
    {
        var sizes = EffectSizes.Of(0.01, 3, 40, Usual);
        Assert.Equal(default, sizes.NoncentralityInterval);
        Assert.Equal(default, sizes.CohenFInterval);
        Assert.Equal(default, sizes.EtaSquaredInterval);
        Assert.True(sizes.EpsilonSquared < 0 && sizes.OmegaSquared < 0 && sizes.EtaSquared > 0);
        Assert.Equal((0, 0), (EffectSizes.Of(0, 3, 40, Usual).EtaSquared, EffectSizes.Of(0, 3, 40, Usual).CohenF));
    }

    /// <summary>The reason for 90 % beside a test at 5 %.</summary>
    [Theory]
    [InlineData(3.0983, false)]
    [InlineData(3.0984, true)]
    public void The_interval_leaves_zero_out_exactly_where_the_test_rejects(double f, bool rejects) =>
        Assert.Equal(rejects, EffectSizes.Of(f, 3, 20, Usual).NoncentralityInterval.Lower > 0);

    /// <remarks>worked_examples_exact.csv: effect sizes of published data by exact rational arithmetic.</remarks>
    [Fact]
    public void Effect_sizes_equal_exact_arithmetic()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/worked_examples_exact.csv").Rows.Where(r => r.Has("f")))
        {
            var sizes = EffectSizes.Of(row.Number("f"), row.Number("df_between"), row.Number("df_within"), Usual);
            Relative.AssertNear(row.Number("eta2"), sizes.EtaSquared, 1e-13, "eta squared");
            Relative.AssertNear(row.Number("omega2"), sizes.OmegaSquared, 1e-12, "omega squared");
            Relative.AssertNear(row.Number("epsilon2"), sizes.EpsilonSquared, 1e-12, "epsilon squared");
            Relative.AssertNear(row.Number("cohen_f"), sizes.CohenF, 1e-13, "Cohen's f");
        }
    }

    [Fact]
    public void A_table_within_blocks_gives_partial_effect_sizes()
    {
        // SSB = 30 on 2, SSW = 20 on 8, SS blocks 50 on 4: the share left of 50 is 0.6.
        VariationTable table = new(new(30, 2, 15), new(20, 8, 2.5), new(100, 14, 100.0 / 14), 6, 0.3, 0.24, Math.Sqrt(2.5)) { Blocks = new(50, 4, 12.5) };
        var sizes = EffectSizes.Of(table, Usual);
        Assert.Equal(0.6, sizes.EtaSquared, 1e-15);
        Assert.Equal((30 - (2 * 2.5)) / 50, sizes.EpsilonSquared, 1e-15);
        Assert.Equal((30 - (2 * 2.5)) / 52.5, sizes.OmegaSquared, 1e-15);
        Assert.Equal(Math.Sqrt(1.5), sizes.CohenF, 1e-15);
        Assert.Equal(sizes.NoncentralityInterval.Upper / (sizes.NoncentralityInterval.Upper + 11), sizes.EtaSquaredInterval.Upper, 1e-15);

        var oneWay = EffectSizes.Of(table with { Blocks = null }, Usual);
        Assert.Equal((0.3, 0.24), (oneWay.EtaSquared, oneWay.OmegaSquared));
    }

    [Theory]
    [InlineData(1e-300)]
    [InlineData(1e8)]
    [InlineData(1e20)]
    [InlineData(1e60)]
    [InlineData(1e61)]
    [InlineData(1e300)]
    [InlineData(double.MaxValue)]
    public void Extreme_values_of_F_give_numbers(double f)
    {
        foreach ((double df1, double df2) in new[] { (1.0, 1.0), (2, 27), (59, 99_940), (1, 2e9) })
        {
            var sizes = EffectSizes.Of(f, df1, df2, new SignificanceLevel(1e-6));
            Interval lambda = sizes.NoncentralityInterval;
            double[] all = [sizes.EtaSquared, sizes.EpsilonSquared, sizes.OmegaSquared, sizes.CohenF, lambda.Lower, lambda.Upper, sizes.CohenFInterval.Lower, sizes.CohenFInterval.Upper, sizes.EtaSquaredInterval.Lower, sizes.EtaSquaredInterval.Upper];
            Assert.All(all, v => Assert.True(double.IsFinite(v), $"{f} {df1} {df2}"));
            Assert.True(sizes.EtaSquaredInterval.Lower <= sizes.EtaSquaredInterval.Upper && sizes.EtaSquaredInterval.Upper <= 1);
        }
    }

    [Fact]
    public void Arguments_outside_their_range_are_refused()
    {
        Assert.All([-1, double.NaN, double.PositiveInfinity], f => Assert.Throws<ArgumentOutOfRangeException>(() => EffectSizes.Of(f, 2, 9, Usual)));
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectSizes.Of(1, 2, 9, new SignificanceLevel(0.5)));
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectSizes.Of(1, 0, 9, Usual));
    }

    /// <remarks>smallest_effect.csv: lambda in 40-digit arithmetic; two of k groups of n that are D apart, the others midway, have lambda = D^2 n/(2 sigma^2).</remarks>
    [Fact]
    public void The_detectable_difference_has_the_noncentrality_that_power_needs()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/smallest_effect.csv").Rows)
        {
            int n = row.Integer("n_per_group");
            int[] sizes = [.. Enumerable.Repeat(n, row.Integer("k"))];
            double found = DetectableDifference.Smallest(sizes, 2.5, new SignificanceLevel(row.Number("alpha")), row.Number("target_power"));
            Relative.AssertNear(2.5 * Math.Sqrt(2 * row.Number("ncp") / n), found, 1e-12, $"k = {row.Text("k")}, n = {n}");
        }
    }

    /// <summary>By brute force: over all pairs and many positions of the other means no difference of that size has less power, and one has it.</summary>
    [Fact]
    public void No_pattern_with_a_pair_that_far_apart_has_less_power()
    {
        int[] sizes = [7, 3, 12, 4];
        double difference = DetectableDifference.Smallest(sizes, 1.5, Usual);
        double least = double.PositiveInfinity;
        for (int i = 0; i < 4; i++)
        {
            for (int j = 0; j < 4; j++)
            {
                for (double u = 0; i != j && u <= 1; u += 1.0 / 28)
                {
                    for (double v = 0; v <= 1; v += 1.0 / 28)
                    {
                        double[] means = new double[4];
                        means[j] = difference;
                        int[] others = [.. Enumerable.Range(0, 4).Where(g => g != i && g != j)];
                        (means[others[0]], means[others[1]]) = (u * difference, v * difference);
                        double f = OneWayPower.CohenFOfMeans(means, sizes, 1.5);
                        var design = OneWayDesign.Of(sizes);
                        least = Math.Min(least, OneWayPower.Power(design, Usual, OneWayPower.Noncentrality(design, f)));
                    }
                }
            }
        }

        // The weighted mean of the groups of 3 and 4 lies at 4/7 of the gap, which the grid of 28ths holds.
        Assert.Equal(0.8, least, 1e-12);
    }

    [Theory]
    [InlineData(1e-300)]
    [InlineData(1e300)]
    public void Detectable_differences_scale_with_the_response(double unit) =>
        Relative.AssertNear(DetectableDifference.Smallest([5, 6, 0, 7], 1.5, Usual), DetectableDifference.Smallest([5, 6, 7], 1.5 * unit, Usual) / unit, 1e-14, "scaled");

    [Fact]
    public void Designs_that_cannot_be_tested_are_refused()
    {
        Assert.Throws<ArgumentException>(() => DetectableDifference.Smallest([5], 1, Usual));
        Assert.Throws<ArgumentException>(() => DetectableDifference.Smallest([1, 1, 1], 1, Usual));
        Assert.Throws<ArgumentOutOfRangeException>(() => DetectableDifference.Smallest([5, -1], 1, Usual));
        Assert.Throws<ArgumentOutOfRangeException>(() => DetectableDifference.Smallest([5, 5], 0, Usual));
        Assert.Throws<ArgumentOutOfRangeException>(() => DetectableDifference.Smallest([5, 5], 1, Usual, 0.05));
    }
}
