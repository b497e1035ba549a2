using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What came of the confirmation of an earlier experiment: both must call its groups different.</summary>
/// <param name="First">The earlier experiment.</param>
public sealed record Confirmation(EarlierExperiment First)
{
    /// <summary>The larger of both p-values; null until both sides have a result.</summary>
    public PValue? P { get; init; }

    /// <summary>That p-value adjusted over <see cref="FamilySize"/> hypotheses by the campaign's correction; null without one.</summary>
    public PValue? AdjustedP { get; init; }

    /// <summary>Whether the adjusted p-value is at most the campaign's level; null without one.</summary>
    public bool? IsReplicated { get; init; }

    /// <summary>Hypotheses that the correction of replicability counts.</summary>
    public required int FamilySize { get; init; }

    /// <summary>Key of the correction applied.</summary>
    public required string Correction { get; init; }
}
