using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>The Kruskal-Wallis test against exact rational arithmetic, tails in 40-digit arithmetic (experiments_exact.csv, worked_examples_exact.csv), and published figures.</summary>
public sealed class KruskalWallisReferenceTests(ITestOutputHelper output)
{
    [Fact]
    public void Random_experiments_get_the_exact_statistic_rounded_once()
    {
        int tied = 0;
        double worst = 0;
        foreach ((ReferenceRow truth, TypedSample sample) in ReferenceExperiments.Random().Concat(ReferenceExperiments.Worked()))
        {
            string name = truth.Text("experiment");
            Tested tested = Assert.IsType<Tested>(sample.Test(new KruskalWallisTest()));
            Relative.AssertNear(truth.Number("kw_h"), tested.Statistic, 2.3e-16, $"{name} H");
            Assert.Equal((truth.Integer("df_between"), null), (tested.Df1, tested.Df2));
            double log = truth.LogarithmOf("kw_p");
            worst = Math.Max(worst, Relative.Error(tested.P.Log, log));
            Assert.True(Math.Abs(tested.P.Log - log) <= 1e-15 + (1e-14 * Math.Abs(log)), FormattableString.Invariant($"{name} ln p: {tested.P.Log:R} instead of {log:R}."));
            tied += truth.Integer("tie_groups") > 0 ? 1 : 0;
        }

        output.WriteLine(FormattableString.Invariant($"{tied} experiments with ties; largest relative error of ln p: {worst:E1}"));
        Assert.True(tied >= 30);
    }

    /// <remarks>
    /// R's help page of kruskal.test on the airquality data: H = 29.267 with 4 degrees of freedom, p = 6.901e-6 (from memory).
    /// Mucociliary efficiency, M. Hollander and D. A. Wolfe, Nonparametric Statistical Methods, 1973: H = 0.7714 with 2 degrees of freedom, p = 0.68 (by way of the same help page, from memory).
    /// </remarks>
    [Theory]
    [InlineData("airqualityOzone", 29.267, 0.0005, 4, 6.901e-6, 5e-10)]
    [InlineData("mucociliary", 0.7714, 0.00005, 2, 0.68, 0.0005)]
    public void The_published_figures_come_out(string name, double h, double hRounding, int df, double p, double pRounding)
    {
        Tested tested = ReferenceExperiments.Worked(name, new KruskalWallisTest());
        Assert.Equal(h, tested.Statistic, hRounding);
        Assert.Equal(df, tested.Df1);
        Assert.Equal(p, tested.P.Value, pRounding);
    }
}
