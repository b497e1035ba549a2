using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>Related experiments judged together under one error-rate goal.</summary>
public sealed record Campaign
{
    /// <summary>The short name by which people and commands call it; unique in its catalog.</summary>
    public required string Code { get; init; }

    /// <summary>One line for people.</summary>
    public string Title { get; init; } = "";

    /// <summary>Why the campaign is run.</summary>
    public string Purpose { get; init; } = "";

    /// <summary>Familywise or false discovery.</summary>
    public required ErrorRate ErrorRate { get; init; }

    /// <summary>Alpha or q, as <see cref="ErrorRate"/> says.</summary>
    public required SignificanceLevel Level { get; init; }

    /// <summary>Key of the correction, or of the online procedure by which experiments are judged as they arrive.</summary>
    public required string Correction { get; init; }

    /// <summary>The families that the plan names, in its order; empty where all experiments are one family.</summary>
    public IReadOnlyList<Family> Families { get; init; } = [];

    /// <summary>The families by which its experiments are judged: those of the sealed plan. Empty for one family, and before the seal, when nothing is judged yet.</summary>
    public IReadOnlyList<Family> JudgedFamilies => IsSealed ? Families : [];

    /// <summary>Settings of an online procedure; null for a batch correction, and where all are left at their defaults.</summary>
    public OnlineOptions? Online { get; init; }

    /// <summary>The streams of a campaign that is judged as experiments arrive, oldest first; empty before its seal and for a batch correction.</summary>
    public IReadOnlyList<StreamHead> Streams { get; init; } = [];

    /// <summary>Key of the test for experiments whose plan names none.</summary>
    public string DefaultTest { get; init; } = "f";

    /// <summary>Key of the follow-up for experiments whose plan names none.</summary>
    public string DefaultFollowUp { get; init; } = "none";

    /// <summary>Whether the experiments were taken from the data instead of from a plan made before it.</summary>
    public bool IsExploratory { get; init; }

    /// <summary>When the campaign was opened.</summary>
    public required DateTimeOffset OpenedAt { get; init; }

    /// <summary>When the plan was fixed; null while it is open.</summary>
    public DateTimeOffset? SealedAt { get; init; }

    /// <summary>SHA-256 of the plan as it was sealed, lower-case hexadecimal; null while it is open.</summary>
    public string? PlanDigest { get; init; }

    /// <summary>Whether level, correction and family are fixed.</summary>
    public bool IsSealed => SealedAt is not null;
}
