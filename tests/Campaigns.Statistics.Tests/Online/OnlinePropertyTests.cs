using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Online;

/// <summary>What must hold on every stream, overlapping or not; streams are drawn from fixed seeds.</summary>
public sealed class OnlinePropertyTests
{
    public static TheoryData<string> Keys => [.. OnlineRegistry.All.Select(p => p.Key)];

    [Theory]
    [MemberData(nameof(Keys))]
    public void What_was_spent_never_exceeds_what_was_earned(string key)
    {
        // The bound from which each publication proves its guarantee, at every moment of the stream.
        OnlineProcedure procedure = OnlineRegistry.Find(key)!;
        for (int seed = 1; seed <= 60; seed++)
        {
            var random = new Random(seed);
            foreach ((int together, int? horizon) in ((int, int?)[])[(1, null), (1, 80), (7, null), (7, 80), (40, 50)])
            {
                OnlineStream stream = Schedules.Start(key, horizon);
                double lambda = stream.Settings.Lambda ?? -1;
                double tau = stream.Settings.Tau ?? 1;
                double factor = stream.Settings.Lambda is null ? 1 : tau - lambda;
                var costs = new Dictionary<int, double>();
                foreach ((int position, double? p) in Schedules.Draw(random, 80, together))
                {
                    if (p is null)
                    {
                        costs[position] = stream.Register().Level / factor;
                    }
                    else
                    {
                        bool rejected = stream.Report(position, PValue.FromValue(p.Value));
                        bool free = p <= lambda || p > tau || (rejected && key == "online-fallback");
                        costs[position] = free ? 0 : costs[position];
                    }

                    double earned = 0.05 * Earned(key, stream.Rejections);
                    Assert.True(costs.Values.Sum() <= earned * (1 + 1e-12), FormattableString.Invariant($"{key}, seed {seed}: {costs.Values.Sum():R} spent of {earned:R}"));
                }
            }
        }
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void A_level_depends_on_nothing_that_became_known_after_the_start(string key)
    {
        for (int seed = 1; seed <= 40; seed++)
        {
            var random = new Random(seed);
            List<(int Position, double? P)> events = Schedules.Draw(random, 40, 1 + (seed % 5));
            List<double> levels = Schedules.Levels(Schedules.Start(key, 30), events);
            int changed = random.Next(events.Count);
            int before = events.Take(changed).Count(e => e.P is null);
            List<(int Position, double? P)> others = [.. events.Select((e, i) => i >= changed && e.P is not null ? (e.Position, random.NextDouble() / 10) : e)];
            Assert.Equal(levels.Take(before), Schedules.Levels(Schedules.Start(key, 30), others).Take(before));
        }
    }

    [Theory]
    [InlineData("alpha-spending")]
    [InlineData("online-fallback")]
    [InlineData("lond")]
    [InlineData("lond-any")]
    [InlineData("lord")]
    [InlineData("saffron")]
    public void A_smaller_p_value_never_lowers_a_later_level(string key)
    {
        for (int seed = 1; seed <= 60; seed++)
        {
            var random = new Random(seed);
            List<(int Position, double? P)> events = Schedules.Draw(random, 40, 1 + (seed % 5));
            int smaller = events.FindIndex(random.Next(events.Count / 2), e => e.P is not null);
            List<(int Position, double? P)> others = [.. events.Select((e, i) => i == smaller ? (e.Position, e.P * random.NextDouble() / 20) : e)];
            Assert.All(
                Schedules.Levels(Schedules.Start(key, 40), events).Zip(Schedules.Levels(Schedules.Start(key, 40), others)),
                pair => Assert.True(pair.Second >= pair.First * (1 - 1e-14), FormattableString.Invariant($"{key}, seed {seed}: {pair}")));
        }
    }

    [Fact]
    public void Addis_that_discards_nothing_is_saffron_to_the_bit()
    {
        for (int seed = 1; seed <= 40; seed++)
        {
            List<(int Position, double? P)> events = Schedules.Draw(new Random(seed), 60, 1 + (seed % 6));
            OnlineProcedure addis = OnlineRegistry.Find("addis")!;
            OnlineStream nothingDiscarded = addis.Start(OnlineSettings.For(addis, new SignificanceLevel(0.05), 60, lambda: 0.5, tau: 1));
            Assert.Equal(Schedules.Levels(Schedules.Start("saffron", 60), events), Schedules.Levels(nothingDiscarded, events));
        }
    }

    [Fact]
    public void Addis_spending_without_candidates_and_discarding_is_alpha_spending_to_the_bit()
    {
        List<(int Position, double? P)> events = Schedules.Draw(new Random(5), 60, 1);
        OnlineProcedure procedure = OnlineRegistry.Find("addis-spending")!;
        List<(int Position, double? P)> positive = [.. events.Select(e => (e.Position, e.P == 0 ? 0.9 : e.P))];
        OnlineStream plain = procedure.Start(OnlineSettings.For(procedure, new SignificanceLevel(0.05), 60, "jm", lambda: 0, tau: 1));
        Assert.Equal(Schedules.Levels(Schedules.Start("alpha-spending", 60), positive), Schedules.Levels(plain, positive));
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void A_stream_that_was_kept_goes_on_as_if_it_had_never_stopped(string key)
    {
        for (int seed = 1; seed <= 20; seed++)
        {
            List<(int Position, double? P)> events = Schedules.Draw(new Random(seed), 50, 1 + (seed % 5));
            OnlineStream whole = Schedules.Start(key, 50);
            List<double> levels = Schedules.Levels(whole, events);
            int stop = seed * events.Count / 21;
            IEnumerable<OnlineEvent> kept = events.Take(stop).Select(e => e.P is { } p ? OnlineEvent.Reported(e.Position, PValue.FromValue(p)) : OnlineEvent.Started(e.Position, levels[e.Position - 1]));
            OnlineStream resumed = OnlineRegistry.Find(key)!.Resume(whole.Settings, kept);
            Assert.Equal(levels.Skip(resumed.Started), Schedules.Levels(resumed, events.Skip(stop)));
            Assert.Equal((whole.Started, whole.Finished, whole.Rejections), (resumed.Started, resumed.Finished, resumed.Rejections));
        }
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Only_p_of_0_survives_everywhere_and_p_of_1_nowhere(string key)
    {
        OnlineStream zeros = Schedules.Start(key, 30);
        OnlineStream ones = Schedules.Start(key, 30);
        for (int t = 1; t <= 30; t++)
        {
            Assert.True(zeros.Report(zeros.Register().Position, PValue.FromValue(0)));
            Assert.False(ones.Report(ones.Register().Position, PValue.One));
        }

        Assert.True(Schedules.Levels(zeros, [(31, null)])[0] is >= 0 and <= 1);
        Assert.Equal((30, 0), (zeros.Rejections, ones.Rejections));
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Many_rejections_known_at_once_never_lift_a_level_to_1(string key)
    {
        OnlineStream stream = Schedules.Start(key, null, 0.5);
        Schedules.Levels(stream, Enumerable.Range(1, 500).Select(t => (t, (double?)null)));
        Schedules.Levels(stream, Enumerable.Range(1, 500).Select(t => (t, (double?)0)));
        Assert.All(Schedules.Levels(stream, Enumerable.Range(501, 20).Select(t => (t, (double?)null))), level => Assert.InRange(level, double.Epsilon, Math.BitDecrement(1)));
    }

    private static int Earned(string key, int rejections) => key switch
    {
        "alpha-spending" or "online-fallback" or "addis-spending" => 1,
        "lond" or "lond-any" => rejections + 1,
        _ => Math.Max(1, rejections),
    };
}
