using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Online;

public sealed class OnlineStreamTests
{
    [Fact]
    public void After_the_horizon_spending_gives_nothing_and_not_even_p_of_0_survives()
    {
        OnlineStream stream = Schedules.Start("alpha-spending", 2);
        Schedules.Levels(stream, [(1, null), (1, 0.5), (2, null), (2, 0.5)]);
        Assert.Equal(new OnlineLevel(3, 0), stream.Register());
        Assert.False(stream.Report(3, PValue.FromValue(0)));
    }

    [Fact]
    public void After_the_horizon_a_rejection_shortly_before_still_pays()
    {
        OnlineStream stream = Schedules.Start("lord", 3);
        Schedules.Levels(stream, [(1, null), (1, 0.5), (2, null), (2, 0.5), (3, null), (3, 1e-9)]);

        // gamma(1) of three positions, (log 2) / (log 2 + log 2 / (2 exp(sqrt(log 2))) + log 3 / (3 exp(sqrt(log 3)))), times 0.025: W0 gamma(4) is 0.
        double first = Math.Log(2);
        double sum = first + (first / (2 * Math.Exp(Math.Sqrt(first)))) + (Math.Log(3) / (3 * Math.Exp(Math.Sqrt(Math.Log(3)))));
        Assert.Equal(0.025 * first / sum, stream.Register().Level, 1e-15);
    }

    [Fact]
    public void A_p_value_below_the_range_of_doubles_survives_at_every_positive_level_and_at_no_level_of_0()
    {
        var tiny = PValue.FromLog(-100000);
        Assert.True(new OnlineLevel(1, double.Epsilon).Rejects(tiny));
        Assert.False(new OnlineLevel(1, 0).Rejects(tiny));
        Assert.False(new OnlineLevel(1, 0).Rejects(PValue.FromValue(0)));
        Assert.True(new OnlineLevel(1, 0.0025).Rejects(PValue.FromValue(0.0025)));
    }

    [Fact]
    public void A_uniform_share_is_the_level_over_the_horizon_rounded_once()
    {
        OnlineProcedure procedure = OnlineRegistry.Find("alpha-spending")!;
        foreach (int horizon in (int[])[1, 3, 7, 10, 20, 49, 100, 1000])
        {
            OnlineStream stream = procedure.Start(OnlineSettings.For(procedure, new SignificanceLevel(0.05), horizon, "uniform"));
            Assert.Equal(0.05 / horizon, stream.Register().Level);
        }
    }

    [Fact]
    public void A_decision_stands_and_needs_a_start()
    {
        OnlineStream stream = Schedules.Start("lond", null);
        stream.Register();
        stream.Report(1, PValue.FromValue(0.2));
        Assert.Contains("decided before", Assert.Throws<ArgumentException>(() => stream.Report(1, PValue.FromValue(0.001))).Message, StringComparison.Ordinal);
        Assert.Contains("No experiment has started at position 2; 1 have", Assert.Throws<ArgumentException>(() => stream.Report(2, PValue.One)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => stream.Report(0, PValue.One));
        Assert.Throws<ArgumentException>(() => stream.LevelOf(2));
        stream.Register();
        Assert.Throws<InvalidOperationException>(() => stream.Report(2, default));
    }

    [Fact]
    public void What_cannot_have_happened_is_refused_on_going_on()
    {
        OnlineProcedure procedure = OnlineRegistry.Find("saffron")!;
        var settings = OnlineSettings.For(procedure, new SignificanceLevel(0.05), 10);
        Assert.Throws<ArgumentException>(() => procedure.Resume(settings, [OnlineEvent.Started(2, 0.01)]));
        Assert.Throws<ArgumentException>(() => procedure.Resume(settings, [OnlineEvent.Started(1, double.NaN)]));
        Assert.Throws<ArgumentException>(() => procedure.Resume(settings, [OnlineEvent.Reported(1, PValue.One)]));
        Assert.Throws<ArgumentException>(() => procedure.Resume(settings, [OnlineEvent.Started(1, 0.01), OnlineEvent.Reported(1, PValue.One), OnlineEvent.Reported(1, PValue.One)]));
    }

    [Fact]
    public void The_levels_given_then_are_kept_even_where_they_would_come_out_otherwise_now()
    {
        OnlineProcedure procedure = OnlineRegistry.Find("online-fallback")!;
        var settings = OnlineSettings.For(procedure, new SignificanceLevel(0.05), 10);
        OnlineStream stream = procedure.Resume(settings, [OnlineEvent.Started(1, 0.04), OnlineEvent.Reported(1, PValue.FromValue(0.04))]);
        Assert.Equal((0.04, 1), (stream.LevelOf(1), stream.Rejections));
        Assert.True(stream.Register().Level > 0.04);
    }

    [Fact]
    public void A_hundred_thousand_experiments_with_ten_thousand_rejections_are_decided()
    {
        foreach (OnlineProcedure procedure in OnlineRegistry.All)
        {
            OnlineStream stream = Schedules.Start(procedure.Key, 100_000);
            for (int t = 1; t <= 100_000; t++)
            {
                stream.Report(stream.Register().Position, t % 10 == 0 ? PValue.FromLog(-50) : PValue.FromValue(((t * 7919L) % 100_000 / 102_000.0) + 0.01));
            }

            Assert.InRange(stream.Rejections, 10_000, 100_000);
        }
    }
}
