namespace Campaigns.Domain;

/// <summary>When a family that waits on another one opens.</summary>
public enum FamilyGate
{
    /// <summary>When at least one experiment of the other family survives.</summary>
    AnySurvives,

    /// <summary>When every experiment of the other family survives.</summary>
    AllSurvive,
}
