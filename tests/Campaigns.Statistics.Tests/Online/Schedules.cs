using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Online;

/// <summary>Streams drawn at random from a seed: experiments that start and finish, up to some at a time.</summary>
internal static class Schedules
{
    /// <summary>Starts (p is null) and reports of a stream, every experiment once each.</summary>
    public static List<(int Position, double? P)> Draw(Random random, int experiments, int together)
    {
        var events = new List<(int, double?)>();
        var running = new List<int>();
        int started = 0;
        double effects = random.Next(4) * 0.25;
        while (started < experiments || running.Count > 0)
        {
            if (started < experiments && running.Count < together && (running.Count == 0 || random.Next(2) == 0))
            {
                events.Add((++started, null));
                running.Add(started);
            }
            else
            {
                int at = random.Next(running.Count);
                events.Add((running[at], P(random, effects)));
                running.RemoveAt(at);
            }
        }

        return events;
    }

    /// <summary>Plays a stream; gives the levels in the order of starting.</summary>
    public static List<double> Levels(OnlineStream stream, IEnumerable<(int Position, double? P)> events)
    {
        var levels = new List<double>();
        foreach ((int position, double? p) in events)
        {
            if (p is null)
            {
                levels.Add(stream.Register().Level);
            }
            else
            {
                stream.Report(position, PValue.FromValue(p.Value));
            }
        }

        return levels;
    }

    public static OnlineStream Start(string key, int? horizon, double level = 0.05)
    {
        OnlineProcedure procedure = OnlineRegistry.Find(key)!;
        return procedure.Start(OnlineSettings.For(procedure, new SignificanceLevel(level), horizon));
    }

    private static double P(Random random, double effects) => random.Next(20) switch
    {
        0 => 0,
        1 => 1,
        2 => 0.25,
        3 => 0.5,
        4 => 5e-324,
        _ => random.NextDouble() < effects ? Math.Pow(random.NextDouble(), 8) : random.NextDouble(),
    };
}
