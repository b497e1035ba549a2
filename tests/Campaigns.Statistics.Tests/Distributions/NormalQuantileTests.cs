using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

public sealed class NormalQuantileTests(ITestOutputHelper output)
{
    [Fact]
    public void Quantiles_and_tails_agree_with_forty_digit_arithmetic()
    {
        (double tail, double quantile) = (0, 0);
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/normal_law.csv").Rows)
        {
            tail = Math.Max(tail, Relative.Error(NormalDistribution.UpperTail(row.Number("z")), row.Number("upper")));
            quantile = Math.Max(quantile, Relative.Error(NormalDistribution.LowerQuantile(row.Number("probability")), row.Number("quantile")));
        }

        output.WriteLine(FormattableString.Invariant($"quantile off by at most {quantile:E1}, tail by {tail:E1}"));
        Assert.True(quantile < 2e-15);
        Assert.True(tail < 2e-15);
    }

    [Fact]
    public void Ends_are_infinite_and_no_probability_is_refused()
    {
        Assert.Equal(double.NegativeInfinity, NormalDistribution.LowerQuantile(0));
        Assert.Equal(double.PositiveInfinity, NormalDistribution.LowerQuantile(1));
        Assert.Throws<ArgumentOutOfRangeException>(() => NormalDistribution.LowerQuantile(-0.1));
        Assert.Throws<ArgumentOutOfRangeException>(() => NormalDistribution.LowerQuantile(double.NaN));
    }
}
