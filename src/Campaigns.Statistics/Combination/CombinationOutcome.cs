using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Combination;

/// <summary>What a test of the global null gave.</summary>
public sealed record CombinationOutcome
{
    private CombinationOutcome(double? statistic, PValue? p, string? reason) =>
        (Statistic, P, Reason) = (statistic is { } given && double.IsFinite(given) ? given : null, p, reason);

    /// <summary>The test statistic; null where it is not a finite number.</summary>
    public double? Statistic { get; }

    /// <summary>The p-value of the global null; null where it is not defined.</summary>
    public PValue? P { get; }

    /// <summary>Why there is no p-value, as a clause without a full stop; null where there is one.</summary>
    public string? Reason { get; }

    /// <summary>A result.</summary>
    /// <param name="statistic">The statistic; one that is not finite is left out.</param>
    /// <param name="p">The p-value.</param>
    public static CombinationOutcome Of(double statistic, PValue p) => new(statistic, p, null);

    /// <summary>No result.</summary>
    /// <param name="reason">Why, as a clause without a full stop.</param>
    public static CombinationOutcome Undefined(string reason) => new(null, null, reason);
}
