using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>One thing that happened to a stream: an experiment started at a level, or its p-value became known.</summary>
public readonly record struct OnlineEvent
{
    private OnlineEvent(int position, double level, PValue? p)
    {
        Position = position;
        Level = level;
        P = p;
    }

    /// <summary>The experiment's position in the stream, from 1.</summary>
    public int Position { get; }

    /// <summary>The level given at the start, in [0, 1); meaningless for a report.</summary>
    internal double Level { get; }

    /// <summary>The p-value that became known; null for a start.</summary>
    internal PValue? P { get; }

    /// <summary>An experiment started.</summary>
    /// <param name="position">One more than had started.</param>
    /// <param name="level">The level that it was given then, in [0, 1).</param>
    public static OnlineEvent Started(int position, double level) => new(position, level, null);

    /// <summary>The p-value of a started experiment became known.</summary>
    /// <param name="position">Its position.</param>
    /// <param name="p">Its p-value.</param>
    public static OnlineEvent Reported(int position, PValue p) => new(position, 0, p);
}
