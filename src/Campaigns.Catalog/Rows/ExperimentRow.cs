namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table experiments; the order of the keys is the order of the plan.</summary>
public sealed class ExperimentRow
{
    /// <summary>Key within the catalog, ascending in the plan's order within a campaign.</summary>
    public long Id { get; set; }

    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>The short name; unique in the campaign.</summary>
    public string Code { get; set; } = "";

    /// <summary>One line for people.</summary>
    public string? Title { get; set; }

    /// <summary>What is measured.</summary>
    public string? Response { get; set; }

    /// <summary>Unit of measure.</summary>
    public string? Unit { get; set; }

    /// <summary>The groups compared; null where the plan names none and no data has come.</summary>
    public long? GroupSetId { get; set; }

    /// <summary>Whether the plan named the groups; otherwise they came with the data and may grow.</summary>
    public bool GroupsArePlanned { get; set; }

    /// <summary>The control's label; null where there is none.</summary>
    public string? Control { get; set; }

    /// <summary>Key of the test.</summary>
    public string Test { get; set; } = "";

    /// <summary>Key of the follow-up.</summary>
    public string FollowUp { get; set; } = "";

    /// <summary>Planned values in each group.</summary>
    public int? Replicates { get; set; }

    /// <summary>Smallest difference worth finding, in units of the response.</summary>
    public double? SmallestEffect { get; set; }

    /// <summary>Standard deviation assumed in planning, in units of the response.</summary>
    public double? AssumedStandardDeviation { get; set; }

    /// <summary>Relative weight.</summary>
    public double? Weight { get; set; }

    /// <summary>Name of the family; null for the campaign's one family.</summary>
    public string? Family { get; set; }

    /// <summary>Code of the earlier experiment that this one confirms: of the same campaign, or CAMPAIGN/EXPERIMENT; null for none.</summary>
    public string? Confirms { get; set; }

    /// <summary>Name of the control, batch or instrument that it shares with other experiments; null where it shares none.</summary>
    public string? SharedControl { get; set; }

    /// <summary>The load that brought the experiment; null where it was planned.</summary>
    public long? FirstLoadId { get; set; }

    /// <summary>The latest amendment after the seal that added or changed it; null where there was none.</summary>
    public long? AmendmentId { get; set; }
}
