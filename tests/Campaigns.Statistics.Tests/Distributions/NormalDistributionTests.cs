using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

/// <summary>Tails of the normal law against 60-digit arithmetic (normal_tail.csv).</summary>
public sealed class NormalDistributionTests(ITestOutputHelper output)
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
                Relative.AssertNear(truth, NormalDistribution.UpperTail(z), 1e-15, FormattableString.Invariant($"upper tail at {z:R}"));
                Relative.AssertNear(truth, NormalDistribution.LowerTail(-z), 1e-15, FormattableString.Invariant($"lower tail at {-z:R}"));
                worst = Math.Max(worst, Relative.Error(NormalDistribution.UpperTail(z), truth));
            }

            Relative.AssertNear(row.Number("log_upper"), NormalDistribution.LogUpperTail(z), 1e-15, FormattableString.Invariant($"ln upper tail at {z:R}"));
            worstLog = Math.Max(worstLog, Relative.Error(NormalDistribution.LogUpperTail(z), row.Number("log_upper")));
        }

        output.WriteLine(FormattableString.Invariant($"largest relative error: tail {worst:E1}, logarithm {worstLog:E1}"));
    }

    [Fact]
    public void The_ends_of_the_range_are_answered()
    {
        Assert.Equal(0.5, NormalDistribution.UpperTail(0));
        Assert.Equal(0, NormalDistribution.UpperTail(double.PositiveInfinity));
        Assert.Equal(1, NormalDistribution.UpperTail(double.NegativeInfinity));
        Assert.Equal(0, NormalDistribution.LogUpperTail(double.NegativeInfinity));
        Assert.Equal(double.NegativeInfinity, NormalDistribution.LogUpperTail(double.PositiveInfinity));
        Assert.Equal(-5e299, NormalDistribution.LogUpperTail(1e150), 1e285);
        Assert.True(double.IsNaN(NormalDistribution.UpperTail(double.NaN)));
        Assert.True(double.IsNaN(NormalDistribution.LogUpperTail(double.NaN)));
    }
}
