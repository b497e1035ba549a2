using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Online;

public sealed class OnlineLevelTests
{
    [Fact]
    public void The_adjusted_p_value_is_at_most_the_level_just_where_the_p_value_is_at_most_the_level_given()
    {
        var random = new Random(20261201);
        for (int i = 0; i < 200_000; i++)
        {
            var level = new SignificanceLevel(i % 3 == 0 ? 0.05 : random.NextDouble() * 0.9 + 0.01);
            var given = new OnlineLevel(1, Math.Pow(random.NextDouble(), 1 + (i % 40)) * 0.99);
            double p = (i % 4) switch { 0 => given.Level, 1 => Math.BitIncrement(given.Level), 2 => Math.Max(0, Math.BitDecrement(given.Level)), _ => random.NextDouble() };
            PValue adjusted = given.Adjusted(PValue.FromValue(p), level);
            Assert.True(given.Rejects(PValue.FromValue(p)) == level.Rejects(adjusted), FormattableString.Invariant($"p {p:R} at {given.Level:R} of {level}: {adjusted}"));
        }
    }

    [Fact]
    public void It_is_p_times_the_level_over_the_level_given_and_at_most_1()
    {
        var level = new SignificanceLevel(0.05);
        Assert.Equal(0.004 * 0.05 / 0.0025, new OnlineLevel(1, 0.0025).Adjusted(PValue.FromValue(0.004), level).Value, 1e-17);
        Assert.Equal(PValue.One, new OnlineLevel(1, 0.0025).Adjusted(PValue.FromValue(0.9), level));
        Assert.Equal(PValue.One, new OnlineLevel(1, 0).Adjusted(PValue.FromValue(1e-300), level));
        Assert.Equal(0, new OnlineLevel(1, 0.0025).Adjusted(PValue.FromValue(0), level).Value);
    }

    [Fact]
    public void Far_tails_keep_their_logarithm()
    {
        PValue adjusted = new OnlineLevel(1, 0.0025).Adjusted(PValue.FromLog(-5000), new SignificanceLevel(0.05));
        Assert.True(adjusted.IsBelowDoubleRange);
        Assert.Equal(-5000 + Math.Log(20), adjusted.Log, 1e-12);
        Assert.Equal(-700 + Math.Log(20), new OnlineLevel(1, 0.0025).Adjusted(PValue.FromLog(-700), new SignificanceLevel(0.05)).Log, 1e-12);
    }
}
