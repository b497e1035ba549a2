using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>A dated, unchangeable application of a correction to a family, without its lines.</summary>
public sealed record ReviewHead
{
    /// <summary>Number of the review in its campaign, from 1.</summary>
    public required int Number { get; init; }

    /// <summary>When it was taken.</summary>
    public required DateTimeOffset At { get; init; }

    /// <summary>Key of the correction applied.</summary>
    public required string Correction { get; init; }

    /// <summary>The level applied.</summary>
    public required SignificanceLevel Level { get; init; }

    /// <summary>Hypotheses counted.</summary>
    public required int FamilySize { get; init; }

    /// <summary>Experiments with a test result at the time.</summary>
    public required int TestedCount { get; init; }

    /// <summary>Survivors.</summary>
    public required int SurvivorCount { get; init; }

    /// <summary>Whether only tested experiments were counted instead of the whole family.</summary>
    public required bool IsInterim { get; init; }

    /// <summary>Version of the program that took it.</summary>
    public required string ProgramVersion { get; init; }
}
