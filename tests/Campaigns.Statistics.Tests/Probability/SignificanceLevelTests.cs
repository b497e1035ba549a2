using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Probability;

public sealed class SignificanceLevelTests
{
    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(-0.05)]
    [InlineData(double.NaN)]
    public void A_level_lies_strictly_between_0_and_1(double value) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => new SignificanceLevel(value));

    [Fact]
    public void A_level_that_was_never_given_throws_when_read() =>
        Assert.Throws<InvalidOperationException>(() => default(SignificanceLevel).Rejects(PValue.One));

    [Fact]
    public void An_adjusted_p_value_equal_to_the_level_is_rejected()
    {
        var level = new SignificanceLevel(0.05);
        Assert.True(level.Rejects(PValue.FromValue(0.05)));
        Assert.False(level.Rejects(PValue.FromValue(Math.BitIncrement(0.05))));
        Assert.True(level.Rejects(PValue.FromLog(-1e6)));
    }
}
