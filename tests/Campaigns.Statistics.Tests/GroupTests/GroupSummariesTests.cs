using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class GroupSummariesTests
{
    [Fact]
    public void A_group_of_none_one_or_several_values_gets_what_it_can()
    {
        GroupSummary[] groups = GroupSummaries.Of(new GroupedSample([125L, 1, 3, 8], 1, [0, 2, 2, 2], 3), 0.95);
        Assert.Equal(new GroupSummary(1, 12.5, null, null, null, null), groups[0]);
        Assert.Equal(new GroupSummary(0, null, null, null, null, null), groups[1]);

        // 0.1, 0.3, 0.8: mean 0.4, variance (0.09 + 0.01 + 0.16)/2 = 0.13; t(0.975; 2) = 4.302652729749464 (Abramowitz and Stegun, table 26.10: 4.303).
        GroupSummary three = groups[2];
        Assert.Equal(3, three.Count);
        Assert.Equal(0.4, three.Mean);
        Assert.Equal(Math.Sqrt(0.13), three.StandardDeviation!.Value, 1e-16);
        Assert.Equal(Math.Sqrt(0.13 / 3), three.StandardError!.Value, 1e-16);
        Assert.Equal(0.4 - (4.302652729749464 * Math.Sqrt(0.13 / 3)), three.Lower!.Value, 1e-14);
        Assert.Equal(0.4 + (4.302652729749464 * Math.Sqrt(0.13 / 3)), three.Upper!.Value, 1e-14);
    }

    [Fact]
    public void A_constant_group_has_spread_zero_and_no_interval()
    {
        GroupSummary constant = GroupSummaries.Of(new GroupedSample([1L, 1, 1], 1, [0, 0, 0], 1), 0.99)[0];
        Assert.Equal(new GroupSummary(3, 0.1, 0, 0, null, null), constant);
    }

    [Fact]
    public void Spread_survives_any_offset()
    {
        GroupSummary low = GroupSummaries.Of(new GroupedSample([1L, 2, 4], 3, [0, 0, 0], 1), 0.95)[0];
        GroupSummary high = GroupSummaries.Of(new GroupedSample([9_000_000_000_000_000_001L, 9_000_000_000_000_000_002, 9_000_000_000_000_000_004], 3, [0, 0, 0], 1), 0.95)[0];
        Assert.Equal(low.StandardDeviation, high.StandardDeviation);
        Assert.Equal(low.StandardError, high.StandardError);
        Assert.Equal(9_000_000_000_000_000.002, high.Mean);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(double.NaN)]
    public void A_confidence_outside_0_to_1_is_refused(double confidence) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => GroupSummaries.Of(new GroupedSample([1L], 0, [0], 1), confidence));
}
