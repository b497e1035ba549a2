using System.Globalization;
using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Planning;

public sealed class OneWayPowerTests
{
    private static readonly SignificanceLevel Usual = new(0.05);

    /// <remarks>power.csv: 40-digit arithmetic.</remarks>
    [Fact]
    public void Power_equals_the_reference()
    {
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/power.csv").Rows;
        Assert.Equal(360, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            string what = $"k = {row.Text("k")}, n = {row.Text("n_per_group")}, f = {row.Text("cohen_f")}, {row.Text("alpha")}";
            var design = OneWayDesign.Balanced(row.Integer("k"), row.Integer("n_per_group"));
            var level = new SignificanceLevel(row.Number("alpha"));
            double lambda = OneWayPower.Noncentrality(design, row.Number("cohen_f"));
            Relative.AssertNear(row.Number("ncp"), lambda, 1e-15, what + " lambda");
            Relative.AssertNear(row.Number("f_crit"), OneWayPower.CriticalValue(design, level), 1e-12, what + " critical value");
            Relative.AssertNear(row.Number("power"), OneWayPower.Power(design, level, lambda), 1e-12, what);
        }
    }

    /// <remarks>sample_size.csv: doubling and halving in 40-digit arithmetic.</remarks>
    [Fact]
    public void Least_replicates_equal_the_reference()
    {
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/sample_size.csv").Rows;
        Assert.Equal(120, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            int? n = OneWayPower.SmallestReplicates(row.Integer("k"), row.Number("cohen_f"), new SignificanceLevel(row.Number("alpha")), row.Number("target_power"));
            Assert.Equal(row.Integer("n_per_group"), n);
        }
    }

    /// <remarks>smallest_effect.csv: root finding in 40-digit arithmetic.</remarks>
    [Fact]
    public void Smallest_effects_equal_the_reference()
    {
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/smallest_effect.csv").Rows;
        Assert.Equal(80, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            var design = OneWayDesign.Balanced(row.Integer("k"), row.Integer("n_per_group"));
            double lambda = OneWayPower.SmallestNoncentrality(design, new SignificanceLevel(row.Number("alpha")), row.Number("target_power"));
            Relative.AssertNear(row.Number("ncp"), lambda, 1e-12, "lambda");
            Relative.AssertNear(row.Number("smallest_cohen_f"), OneWayPower.CohenF(design, lambda), 1e-12, "Cohen's f");
        }
    }

    /// <remarks>The example of R's power.anova.test: 4 groups, variance of the means (divisor k - 1) 1, within 3; R prints 0.3535594 for n = 5 and n = 11.92613 for power 0.8.</remarks>
    [Fact]
    public void The_example_of_R_is_met()
    {
        double f = Math.Sqrt(1.0 * 3 / (4 * 3.0));
        var design = OneWayDesign.Balanced(4, 5);
        Assert.Equal(0.35355942372299339, OneWayPower.Power(design, Usual, OneWayPower.Noncentrality(design, f)), 1e-14);
        Assert.Equal(12, OneWayPower.SmallestReplicates(4, f, Usual, 0.8));
    }

    [Fact]
    public void Power_agrees_with_R_in_the_same_run()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(20_261_207);
        (int Groups, int Replicates, double F, double Level)[] cases =
            [.. Enumerable.Range(0, 200).Select(_ => (random.Next(2, 13), random.Next(2, 60), 0.05 + random.NextDouble(), Math.Pow(10, -1 - (4 * random.NextDouble()))))];
        string input = string.Concat(cases.Select(c => FormattableString.Invariant($"{c.Groups} {c.Replicates} {c.F:R} {c.Level:R}\n")));
        string[] answers = RProgram.Run(
            """
            d <- read.table(file('stdin'))
            for (i in seq_len(nrow(d))) cat(sprintf('%.17g\n', with(d[i, ], power.anova.test(groups = V1, n = V2, between.var = V3^2 * V1 / (V1 - 1), within.var = 1, sig.level = V4)$power)))
            """,
            input).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(cases.Length, answers.Length);
        foreach (((int groups, int replicates, double f, double level), string answer) in cases.Zip(answers))
        {
            var design = OneWayDesign.Balanced(groups, replicates);
            Assert.Equal(double.Parse(answer, CultureInfo.InvariantCulture), OneWayPower.Power(design, new SignificanceLevel(level), OneWayPower.Noncentrality(design, f)), 1e-9);
        }
    }

    /// <remarks>By simulation in R, seed fixed: with 100,000 draws the standard error of a power of one half is 0.0016.</remarks>
    [Fact]
    public void Power_of_unequal_groups_is_what_a_simulation_finds()
    {
        RProgram.SkipIfAbsent();
        int[] sizes = [3, 9, 5];
        double f = OneWayPower.CohenFOfMeans([10, 11.2, 12], sizes, 1.5);
        var design = OneWayDesign.Of(sizes);
        string answer = RProgram.Run(
            """
            set.seed(20261207)
            g <- rep(1:3, c(3, 9, 5)); mu <- c(10, 11.2, 12)[g]; B <- 100000
            x <- matrix(rnorm(17 * B, mu, 1.5), 17)
            m <- rowsum(x, g) / c(3, 9, 5)
            ssb <- colSums(c(3, 9, 5) * sweep(m, 2, colMeans(x))^2); ssw <- colSums((x - m[g, ])^2)
            cat(mean(ssb / 2 / (ssw / 14) > qf(0.95, 2, 14)))
            """,
            "");
        Assert.Equal(double.Parse(answer, CultureInfo.InvariantCulture), OneWayPower.Power(design, Usual, OneWayPower.Noncentrality(design, f)), 5 * 0.0016);
    }

    [Fact]
    public void A_balanced_design_is_one_of_equal_sizes()
    {
        Assert.Equal(OneWayDesign.Balanced(4, 7), OneWayDesign.Of([7, 7, 0, 7, 7]));
        Assert.Equal(12.0 / 7, OneWayDesign.Of([9, 4, 3]).LeastPairWeight, 1e-15);
        Assert.Equal(12.0 / 7, OneWayDesign.Of([3, 9, 4]).LeastPairWeight, 1e-15);
        Assert.Throws<ArgumentException>(() => OneWayDesign.Balanced(1, 5));
        Assert.Throws<ArgumentException>(() => OneWayDesign.Balanced(5, 1));
        Assert.Throws<ArgumentException>(() => OneWayDesign.Balanced(5, 0));
    }

    [Fact]
    public void Without_an_effect_power_is_the_level() =>
        Assert.Equal(0.001, OneWayPower.Power(OneWayDesign.Balanced(3, 10), new SignificanceLevel(0.001), 0), 1e-15);

    /// <summary>f of two means is half their gap over sigma; an offset of 1e12 takes nothing away where the means themselves are exact.</summary>
    [Theory]
    [InlineData(0, 1)]
    [InlineData(1e12, 1)]
    [InlineData(0, 1e-300)]
    [InlineData(0, 1e300)]
    public void Cohens_f_of_means_keeps_its_digits(double offset, double unit)
    {
        Relative.AssertNear(0.25, OneWayPower.CohenFOfMeans([offset, offset + unit], [4, 4], 2 * unit), 1e-15, "two groups");

        // Means 0, 1, 5 with weights 1, 2, 3: mean 17/6, variance 29/6 + ... = (1*0 + 2*1 + 3*25)/6 - (17/6)^2.
        Relative.AssertNear(Math.Sqrt((77.0 / 6) - (17.0 / 6 * (17.0 / 6))), OneWayPower.CohenFOfMeans([offset, offset + unit, offset + (5 * unit)], [1, 2, 3], unit), 1e-14, "three groups");
    }

    [Fact]
    public void Differences_and_noncentralities_are_each_others_inverse()
    {
        var design = OneWayDesign.Of([5, 8, 13]);
        double lambda = OneWayPower.NoncentralityOfDifference(design, 3, 2);
        Assert.Equal(9.0 / 4 * (40.0 / 13), lambda, 1e-14);
        Assert.Equal(3, OneWayPower.LargestDifference(design, lambda, 2), 1e-14);
    }

    [Fact]
    public void An_effect_beyond_the_reach_of_ten_million_replicates_is_told_as_such()
    {
        Assert.Null(OneWayPower.SmallestReplicates(3, 1e-5, Usual, 0.8));
        Assert.Equal(2, OneWayPower.SmallestReplicates(3, 1e200, Usual, 0.8));
        int? many = OneWayPower.SmallestReplicates(3, 0.001, Usual, 0.9);
        Assert.InRange(many!.Value, 4_000_000, 5_000_000);
        Assert.Throws<ArgumentOutOfRangeException>(() => OneWayPower.SmallestReplicates(3, 0, Usual, 0.8));
        Assert.Throws<ArgumentOutOfRangeException>(() => OneWayPower.SmallestReplicates(3, 0.5, Usual, 0.05));
        Assert.Throws<ArgumentOutOfRangeException>(() => OneWayPower.SmallestReplicates(3, 0.5, Usual, 1));
    }
}
