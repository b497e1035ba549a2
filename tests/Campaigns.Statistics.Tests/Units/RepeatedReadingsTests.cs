using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.Units;

public sealed class RepeatedReadingsTests
{
    [Theory]
    [InlineData(true, 3, 6, 6, 9)]
    [InlineData(true, 3, 6, 0, 7)]
    [InlineData(false, 3, 6, 5, 9)]
    [InlineData(false, 3, 3, 3, 3)]
    [InlineData(false, 0, 6, 6, 6)]
    [InlineData(false, 3, 0, 0, 0)]
    [InlineData(false, int.MaxValue, 6, 6, 6)]
    public void Every_group_with_at_least_twice_its_replicates_looks_like_repeated_readings(bool likely, int planned, int a, int b, int c) =>
        Assert.Equal(likely, RepeatedReadings.AreLikely([a, b, c], planned));
}
