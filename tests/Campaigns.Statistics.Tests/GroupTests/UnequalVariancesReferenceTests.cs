using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Welch's and Brown-Forsythe's tests against exact rational arithmetic, tails in 40-digit arithmetic (experiments_exact.csv, worked_examples_exact.csv), and published figures.</summary>
public sealed class UnequalVariancesReferenceTests(ITestOutputHelper output)
{
    /// <summary>Half a unit in the last place of ours, as much again of the 17 printed digits.</summary>
    private const double RoundedOnce = 2.3e-16;

    [Fact]
    public void Random_experiments_get_the_exact_statistics_of_Welch_rounded_once()
    {
        int tested = 0;
        double worst = 0;
        foreach ((ReferenceRow truth, TypedSample sample) in ReferenceExperiments.Random())
        {
            TestOutcome outcome = sample.Test(new WelchTest());
            Assert.Equal(truth.Has("welch_f"), outcome is Tested);
            if (outcome is Tested welch)
            {
                tested++;
                string name = truth.Text("experiment");
                Relative.AssertNear(truth.Number("welch_f"), welch.Statistic, RoundedOnce, $"{name} F");
                Assert.Equal(truth.Integer("df_between"), welch.Df1);
                Relative.AssertNear(truth.Number("welch_df2"), welch.Df2!.Value, RoundedOnce, $"{name} df2");
                worst = Math.Max(worst, AssertLog(truth, "welch_p", welch, name));
            }
        }

        output.WriteLine(FormattableString.Invariant($"{tested} experiments, largest relative error of ln p or p: {worst:E1}"));
        Assert.True(tested >= 190);
    }

    [Fact]
    public void Random_experiments_get_the_exact_statistics_of_Brown_and_Forsythe_rounded_once()
    {
        int tested = 0;
        double worst = 0;
        foreach ((ReferenceRow truth, TypedSample sample) in ReferenceExperiments.Random())
        {
            TestOutcome outcome = sample.Test(new BrownForsytheTest());
            Assert.Equal(truth.Has("bf_fstar"), outcome is Tested);
            if (outcome is Tested star)
            {
                tested++;
                string name = truth.Text("experiment");
                Relative.AssertNear(truth.Number("bf_fstar"), star.Statistic, RoundedOnce, $"{name} F*");
                Relative.AssertNear(truth.Number("bf_df1_mehrotra"), star.Df1!.Value, RoundedOnce, $"{name} df1");
                Relative.AssertNear(truth.Number("bf_df2"), star.Df2!.Value, RoundedOnce, $"{name} df2");
                worst = Math.Max(worst, AssertLog(truth, "bf_p_mehrotra", star, name));

                // What the description tells those who want the classical p-value to do.
                double classical = new FDistribution(star.GroupCount - 1, star.Df2!.Value).LogUpperTail(star.Statistic);
                AssertNearLog(truth.LogarithmOf("bf_p"), classical, $"{name} classical ln p");
            }
        }

        output.WriteLine(FormattableString.Invariant($"{tested} experiments, largest relative error of ln p or p: {worst:E1}"));
        Assert.True(tested >= 190);
    }

    [Fact]
    public void Published_examples_agree_with_exact_rational_arithmetic()
    {
        int compared = 0;
        foreach ((ReferenceRow truth, TypedSample sample) in ReferenceExperiments.Worked())
        {
            string name = truth.Text("experiment");
            if (sample.Test(new WelchTest()) is Tested welch)
            {
                // The reference read the values as doubles; offsets up to a thousand times the spread cost it three digits.
                compared++;
                Relative.AssertNear(truth.Number("welch_f"), welch.Statistic, 1e-12, $"{name} Welch F");
                Relative.AssertNear(truth.Number("welch_df2"), welch.Df2!.Value, 1e-12, $"{name} Welch df2");
                Relative.AssertNear(truth.LogarithmOf("welch_p"), welch.P.Log, 1e-12, $"{name} Welch ln p");
            }

            Tested star = Assert.IsType<Tested>(sample.Test(new BrownForsytheTest()));
            Relative.AssertNear(truth.Number("bf_fstar"), star.Statistic, 1e-12, $"{name} F*");
            Relative.AssertNear(truth.Number("bf_df1_mehrotra"), star.Df1!.Value, 1e-12, $"{name} F* df1");
            Relative.AssertNear(truth.Number("bf_df2"), star.Df2!.Value, 1e-12, $"{name} F* df2");
            Relative.AssertNear(truth.LogarithmOf("bf_p_mehrotra"), star.P.Log, 1e-12, $"{name} F* ln p");
        }

        Assert.Equal(15, compared);
    }

    /// <remarks>The help page of R's oneway.test on Student's sleep data prints F = 3.4626, 17.776 degrees of freedom, p = 0.07939 (from memory). Two groups of equal size: F* is the same.</remarks>
    [Fact]
    public void The_sleep_data_give_the_figures_of_R_s_help_page()
    {
        foreach (GroupTest test in new GroupTest[] { new WelchTest(), new BrownForsytheTest() })
        {
            Tested sleep = ReferenceExperiments.Worked("sleep", test);
            Assert.Equal(3.4626, sleep.Statistic, 0.00005);
            Assert.Equal(1, sleep.Df1);
            Assert.Equal(17.776, sleep.Df2!.Value, 0.0005);
            Assert.Equal(0.07939, sleep.P.Value, 0.000005);
        }
    }

    private static double AssertLog(ReferenceRow truth, string column, Tested tested, string name)
    {
        double log = truth.LogarithmOf(column);
        AssertNearLog(log, tested.P.Log, $"{name} ln p");
        return truth.Number(column) > 1e-300
            ? Math.Max(Relative.Error(tested.P.Log, log), Relative.Error(tested.P.Value, truth.Number(column)) / Math.Max(1, -log))
            : Relative.Error(tested.P.Log, log);
    }

    /// <summary>Near p = 1 the 17 digits of the reference p leave its logarithm 1e-16 absolutely.</summary>
    private static void AssertNearLog(double truth, double computed, string what) =>
        Assert.True(Math.Abs(computed - truth) <= 1e-15 + (1e-13 * Math.Abs(truth)), FormattableString.Invariant($"{what}: {computed:R} instead of {truth:R}."));
}
