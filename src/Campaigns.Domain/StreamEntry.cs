using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>An experiment's place in a stream: the level it was given before its p-value was seen, and once it is tested the decision, which stands.</summary>
/// <param name="Stream">Number of the stream.</param>
/// <param name="Position">Place in the stream, from 1.</param>
/// <param name="Level">The level given, in [0, 1); 0 where the procedure had nothing to give.</param>
/// <param name="RegisteredAt">When it was given.</param>
public sealed record StreamEntry(int Stream, int Position, double Level, DateTimeOffset RegisteredAt)
{
    /// <summary>When it was decided; null while it runs.</summary>
    public DateTimeOffset? DecidedAt { get; init; }

    /// <summary>The p-value on which it was decided; null while it runs, and where the data gave none, which counted as 1.</summary>
    public PValue? P { get; init; }

    /// <summary>Whether that p-value was at most the level given; null while it runs.</summary>
    public bool? Survives { get; init; }

    /// <summary>Whether another experiment of the stream ran at the same time.</summary>
    public bool Overlaps { get; init; }

    /// <summary>p times level over the level given: at most the level if and only if the experiment survives; 1 where the data gave no p-value, null while it runs.</summary>
    /// <param name="level">The campaign's level.</param>
    public PValue? AdjustedP(SignificanceLevel level) => DecidedAt is null ? null : new OnlineLevel(Position, Level).Adjusted(P ?? PValue.One, level);
}
