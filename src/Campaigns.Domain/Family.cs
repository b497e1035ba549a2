using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>A family of a campaign: hypotheses that are corrected together, with what its plan says of it.</summary>
/// <param name="Name">The name by which experiments of the plan name it; empty for the one family of a campaign that names none.</param>
public sealed record Family(string Name)
{
    /// <summary>Key of its correction; null for the campaign's.</summary>
    public string? Correction { get; init; }

    /// <summary>Its level; null for what the campaign gives it.</summary>
    public SignificanceLevel? Level { get; init; }

    /// <summary>Name of the family on which it waits; null where it is open from the start.</summary>
    public string? OpensAfter { get; init; }

    /// <summary>What of that family opens it.</summary>
    public FamilyGate Gate { get; init; }
}
