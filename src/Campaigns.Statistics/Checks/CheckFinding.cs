using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Checks;

/// <summary>How a check came out.</summary>
public enum CheckVerdict
{
    /// <summary>Nothing to worry about was seen.</summary>
    Quiet,

    /// <summary>Something was seen that calls for care.</summary>
    Warns,

    /// <summary>These data do not allow the check.</summary>
    NotPossible,
}

/// <summary>What a check saw in one experiment.</summary>
/// <param name="Verdict">How it came out.</param>
/// <param name="Saw">What it saw, or why it could not look: one plain sentence with a full stop, figures and group names included.</param>
/// <param name="Statistic">Its statistic; null where it has none.</param>
/// <param name="P">Its p-value; null where it has none.</param>
public sealed record CheckFinding(CheckVerdict Verdict, string Saw, double? Statistic = null, PValue? P = null);
