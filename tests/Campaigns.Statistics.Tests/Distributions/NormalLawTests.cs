using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

public sealed class NormalLawTests(ITestOutputHelper output)
{
    [Fact]
    public void Both_tails_and_their_logarithms_are_right_to_the_last_digits()
    {
        double worst = 0;
        double worstLog = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/normal_tail.csv").Rows)
        {
            double z = row.Number("z");
            double truth = row.Number("upper");
            if (truth > 1e-307)
            {
                Relative.AssertNear(truth, NormalLaw.UpperTail(z), 1e-15, FormattableString.Invariant($"upper tail at {z:R}"));
                Relative.AssertNear(truth, NormalLaw.LowerTail(-z), 1e-15, FormattableString.Invariant($"lower tail at {-z:R}"));
                worst = Math.Max(worst, Relative.Error(NormalLaw.UpperTail(z), truth));
            }

            Relative.AssertNear(row.Number("log_upper"), NormalLaw.LogUpperTail(z), 1e-15, FormattableString.Invariant($"ln upper tail at {z:R}"));
            worstLog = Math.Max(worstLog, Relative.Error(NormalLaw.LogUpperTail(z), row.Number("log_upper")));
        }

        output.WriteLine(FormattableString.Invariant($"largest relative error: tail {worst:E1}, logarithm {worstLog:E1}"));
    }

    [Fact]
    public void Tails_and_quantiles_agree_with_forty_digit_arithmetic()
    {
        double quantile = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/normal_law.csv").Rows)
        {
            double tail = Relative.Error(NormalLaw.UpperTail(row.Number("z")), row.Number("upper"));
            Assert.True(tail <= 1e-15 + (2e-16 * -Math.Log(row.Number("upper"))), FormattableString.Invariant($"{row.Text("z")}: {tail:E1}"));
            quantile = Math.Max(quantile, Relative.Error(NormalLaw.Quantile(row.Number("probability")), row.Number("quantile")));
        }

        output.WriteLine(FormattableString.Invariant($"quantile off by at most {quantile:E1}"));
        Assert.True(quantile < 1e-14);
    }

    [Fact]
    public void Ends_are_what_they_must_be()
    {
        Assert.Equal(0.5, NormalLaw.UpperTail(0));
        Assert.Equal(1, NormalLaw.UpperTail(double.NegativeInfinity));
        Assert.Equal(0, NormalLaw.UpperTail(double.PositiveInfinity));
        Assert.Equal(0, NormalLaw.LogUpperTail(double.NegativeInfinity));
        Assert.Equal(double.NegativeInfinity, NormalLaw.LogUpperTail(double.PositiveInfinity));
        Assert.Equal(-5e299, NormalLaw.LogUpperTail(1e150), 1e285);
        Assert.True(double.IsNaN(NormalLaw.UpperTail(double.NaN)));
        Assert.True(double.IsNaN(NormalLaw.LogUpperTail(double.NaN)));
        Assert.Equal(double.NegativeInfinity, NormalLaw.Quantile(0));
        Assert.Equal(double.PositiveInfinity, NormalLaw.Quantile(1));
        Assert.Throws<ArgumentOutOfRangeException>(() => NormalLaw.Quantile(-0.1));
        Assert.Throws<ArgumentOutOfRangeException>(() => NormalLaw.Quantile(double.NaN));
    }
}
