using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>What a stream gives an experiment that starts: its place in the stream and the level at which its p-value will be judged.</summary>
/// <param name="Position">From 1, in the order of starting.</param>
/// <param name="Level">In [0, 1); at 0 the experiment cannot survive.</param>
public readonly record struct OnlineLevel(int Position, double Level)
{
    /// <summary>Below this value the product of p and level may have lost digits, and the logarithm tells.</summary>
    private const double SmallestExact = 1e-280;

    /// <summary>The rule of a standing decision: rejected if and only if the p-value is at most the level, and the level is above 0.</summary>
    /// <param name="p">The p-value; one below the range of doubles is below every positive level.</param>
    public bool Rejects(PValue p) => Level > 0 && p.Value <= Level;

    /// <summary>The p-value as it compares with the level of the stream instead of the one given: p level / given level, at most 1.</summary>
    /// <param name="p">The p-value.</param>
    /// <param name="level">The level of the stream.</param>
    /// <returns>At most <paramref name="level"/> if and only if <see cref="Rejects"/>, to the last bit; 1 where the level given is 0.</returns>
    public PValue Adjusted(PValue p, SignificanceLevel level)
    {
        if (Level == 0)
        {
            return PValue.One;
        }

        double log = Math.Min(0, p.Log + Math.Log(level.Value / Level));
        double value = Math.Min(1, (DoubleDouble.From(p.Value) * DoubleDouble.From(level.Value) / Level).High);
        if (Rejects(p) != value <= level.Value)
        {
            // Rounding went over the edge: the nearest double on the right side.
            return PValue.FromValue(Rejects(p) ? level.Value : Math.BitIncrement(level.Value));
        }

        return value < SmallestExact ? PValue.FromLog(log) : PValue.FromValue(value);
    }
}
