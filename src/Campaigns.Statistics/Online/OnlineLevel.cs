using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>What a stream gives an experiment that starts: its place in the stream and the level at which its p-value will be judged.</summary>
/// <param name="Position">From 1, in the order of starting.</param>
/// <param name="Level">In [0, 1); at 0 the experiment cannot survive.</param>
public readonly record struct OnlineLevel(int Position, double Level)
{
    /// <summary>The rule of a standing decision: rejected if and only if the p-value is at most the level, and the level is above 0.</summary>
    /// <param name="p">The p-value; one below the range of doubles is below every positive level.</param>
    public bool Rejects(PValue p) => Level > 0 && p.Value <= Level;
}
