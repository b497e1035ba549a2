using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.FollowUps;

/// <summary>Two groups of one experiment held against each other.</summary>
/// <param name="GroupA">Number of the group that is taken away: the earlier one, or the control.</param>
/// <param name="GroupB">Number of the group that it is taken from.</param>
/// <param name="Difference">Mean of B less mean of A, in units of the response.</param>
public sealed record GroupComparison(int GroupA, int GroupB, double Difference)
{
    /// <summary>Lower end of the simultaneous confidence interval; null where the procedure gives none.</summary>
    public double? Lower { get; init; }

    /// <summary>Upper end of it.</summary>
    public double? Upper { get; init; }

    /// <summary>The procedure's statistic, with the sign of the difference where it has one; null where the pair cannot be compared.</summary>
    public double? Statistic { get; init; }

    /// <summary>Degrees of freedom of the standard error behind it; null where the pair cannot be compared.</summary>
    public double? DegreesOfFreedom { get; init; }

    /// <summary>Two-sided p-value, adjusted for the comparisons inside the experiment; null where the pair cannot be compared.</summary>
    public PValue? P { get; init; }

    /// <summary>Why the pair cannot be compared, in a sentence without a full stop; null where it can.</summary>
    public string? Obstacle { get; init; }
}
