using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

/// <summary>Dunnett's two-sided maximum against tables (dunnett_quantile.csv, dunnett.csv), identities and simple bounds.</summary>
public sealed class DunnettLawTests(ITestOutputHelper output)
{
    private static readonly double Half = Math.Sqrt(0.5);

    [Fact]
    public void Critical_values_for_equal_groups_agree_with_the_reference()
    {
        double worst = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/dunnett_quantile.csv").Rows.Where(r => r.Integer("sided") == 2))
        {
            double df = row.Text("df") == "inf" ? double.PositiveInfinity : row.Number("df");
            double critical = Law(Half, row.Integer("treatments"), df).UpperQuantile(row.Number("alpha"));
            Relative.AssertNear(row.Number("crit"), critical, 2e-14, $"{row.Text("treatments")} treatments, df {row.Text("df")}");
            worst = Math.Max(worst, Relative.Error(critical, row.Number("crit")));
        }

        output.WriteLine(FormattableString.Invariant($"largest relative difference: {worst:E1}"));
    }

    /// <summary>Dunnett (1964), Biometrics 20:482, two-sided 5 % points for 20 degrees of freedom, 1 to 5 treatments (from memory).</summary>
    [Theory]
    [InlineData(1, 2.09)]
    [InlineData(2, 2.38)]
    [InlineData(3, 2.54)]
    [InlineData(4, 2.65)]
    [InlineData(5, 2.73)]
    public void Published_points_come_out(int treatments, double published) =>
        Assert.Equal(published, Law(Half, treatments, 20).UpperQuantile(0.05), 0.006);

    /// <summary>Unequal sizes: the p-values and critical values of dunnett.csv.</summary>
    [Fact]
    public void Tails_and_critical_values_for_unequal_groups_agree_with_the_reference()
    {
        double worst = 0;
        double worstCritical = 0;
        foreach (IGrouping<string, ReferenceRow> experiment in ReferenceTable.Read("experiment/dunnett.csv").Rows.GroupBy(r => r.Text("experiment")))
        {
            double[] lambdas = [.. experiment.Select(r => Math.Sqrt(r.Number("n_group") / (r.Number("n_group") + r.Number("n_control"))))];
            DunnettLaw law = DunnettLaw.For(lambdas, experiment.First().Number("df"));
            Relative.AssertNear(experiment.First().Number("crit95"), law.UpperQuantile(0.05), 1e-13, experiment.Key);
            worstCritical = Math.Max(worstCritical, Relative.Error(law.UpperQuantile(0.05), experiment.First().Number("crit95")));
            foreach (ReferenceRow row in experiment.Where(r => r.Number("t") != 0))
            {
                double truth = row.Number("dunnett_p");
                double p = law.UpperTail(Math.Abs(row.Number("t")));
                Relative.AssertNear(truth, p, 1e-11, $"{experiment.Key} {row.Text("group")}");
                worst = Math.Max(worst, Relative.Error(p, truth));
            }
        }

        output.WriteLine(FormattableString.Invariant($"largest relative difference: p {worst:E1}, critical value {worstCritical:E1}"));
    }

    [Fact]
    public void One_treatment_is_Students_t_whatever_its_lambda()
    {
        foreach (double lambda in new[] { 0, 0.3, -0.7, 0.9, 0.99999 })
        {
            foreach (double df in new[] { 1, 2.5, 20, 300 })
            {
                foreach (double t in new[] { 0.01, 0.5, 2, 7, 40, 900 })
                {
                    double truth = StudentT.LogTwoSidedTail(t, df);
                    Assert.Equal(truth, DunnettLaw.For([lambda], df).LogUpperTail(t), 1e-13 + (1e-15 * Math.Abs(truth)));
                }
            }
        }
    }

    /// <summary>The more the variables hang together, the smaller their maximum (Sidak 1967); it never falls below one of them nor above the sum of all (Bonferroni).</summary>
    [Fact]
    public void Correlation_lowers_the_tail_between_its_bounds()
    {
        foreach (int treatments in new[] { 2, 5, 59 })
        {
            foreach (double df in new[] { 1, 12, 1e5 })
            {
                foreach (double t in new[] { 0.001, 0.7, 2.5, 6, 30 })
                {
                    double single = StudentT.LogTwoSidedTail(t, df);
                    double before = 1;
                    foreach (double lambda in new[] { 0, 0.3, Half, 0.95, 0.9999 })
                    {
                        double log = Law(lambda, treatments, df).LogUpperTail(t);
                        Assert.True(log >= single - 1e-12 - (1e-14 * Math.Abs(single)), FormattableString.Invariant($"{treatments} treatments, df {df}, t {t}, lambda {lambda}: {log:R} below {single:R}"));
                        Assert.True(log <= single + Math.Log(treatments) + 1e-12 - (1e-14 * single));
                        Assert.True(before > 0 || log <= before + 1e-12 - (1e-14 * single), FormattableString.Invariant($"{treatments} treatments, df {df}, t {t}, lambda {lambda}: {log:R} above {before:R}"));
                        before = log;
                    }
                }
            }
        }
    }

    [Fact]
    public void Signs_and_order_of_the_lambdas_do_not_matter()
    {
        double one = DunnettLaw.For([0.3, 0.5, 0.8], 11).LogUpperTail(2.2);
        Assert.Equal(one, DunnettLaw.For([-0.8, 0.3, -0.5], 11).LogUpperTail(2.2));
    }

    [Fact]
    public void Far_tails_stay_finite_in_the_logarithm()
    {
        DunnettLaw law = DunnettLaw.For([0.6, 0.7, 0.7, 0.9], 5000);
        foreach (double t in new[] { 30, 50, 66, 90, 1e3, 1e100, 1e300 })
        {
            double single = StudentT.LogTwoSidedTail(t, 5000);
            Assert.InRange(law.LogUpperTail(t) - single, 1 - (1e-13 * Math.Abs(single)), Math.Log(4) + (1e-13 * Math.Abs(single)));
        }

        Assert.Throws<ArgumentException>(() => DunnettLaw.For([], 5));
        Assert.Throws<ArgumentException>(() => DunnettLaw.For([1.0], 5));
        Assert.Throws<ArgumentOutOfRangeException>(() => DunnettLaw.For([0.5], 0));
    }

    private static DunnettLaw Law(double lambda, int treatments, double df) => DunnettLaw.For([.. Enumerable.Repeat(lambda, treatments)], df);
}
