namespace Campaigns.Domain;

/// <summary>What was registered of one experiment before its data: one hypothesis, "all group means are equal".</summary>
public sealed record PlannedExperiment
{
    /// <summary>The short name, unique in its campaign.</summary>
    public required string Code { get; init; }

    /// <summary>One line for people.</summary>
    public string Title { get; init; } = "";

    /// <summary>What is measured.</summary>
    public string Response { get; init; } = "";

    /// <summary>The response's unit of measure.</summary>
    public string Unit { get; init; } = "";

    /// <summary>The groups compared, in the plan's order; empty where the plan names none, and then the data's groups are taken.</summary>
    public IReadOnlyList<string> Groups { get; init; } = [];

    /// <summary>The group against which the others are held; null where there is none.</summary>
    public string? Control { get; init; }

    /// <summary>Key of the omnibus test.</summary>
    public required string Test { get; init; }

    /// <summary>Key of the follow-up procedure.</summary>
    public required string FollowUp { get; init; }

    /// <summary>Planned values in each group; null where the plan gives no number.</summary>
    public int? Replicates { get; init; }

    /// <summary>The smallest difference worth finding, in units of the response.</summary>
    public double? SmallestEffect { get; init; }

    /// <summary>The standard deviation assumed in planning, in units of the response.</summary>
    public double? AssumedStandardDeviation { get; init; }

    /// <summary>Relative weight in a weighted correction; null counts as 1.</summary>
    public double? Weight { get; init; }

    /// <summary>Name of the family it is corrected in; null for the campaign's one family.</summary>
    public string? Family { get; init; }

    /// <summary>The earlier experiment that this one confirms, on new data: a code of the same campaign, or CAMPAIGN/EXPERIMENT; null for none.</summary>
    public string? Confirms { get; init; }

    /// <summary>Name of the control, batch or instrument that it shares with other experiments, which are then not independent; null where it shares none.</summary>
    public string? SharedControl { get; init; }
}
