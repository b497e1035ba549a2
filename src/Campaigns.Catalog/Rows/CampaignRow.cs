namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table campaigns.</summary>
public sealed class CampaignRow
{
    /// <summary>Key within the catalog.</summary>
    public long Id { get; set; }

    /// <summary>The short name; unique in the catalog.</summary>
    public string Code { get; set; } = "";

    /// <summary>One line for people.</summary>
    public string Title { get; set; } = "";

    /// <summary>Why the campaign is run.</summary>
    public string Purpose { get; set; } = "";

    /// <summary>familywise or false-discovery.</summary>
    public string ErrorRate { get; set; } = "";

    /// <summary>Alpha or q, in (0, 1).</summary>
    public double Level { get; set; }

    /// <summary>Key of the correction.</summary>
    public string Correction { get; set; } = "";

    /// <summary>Key of the test for experiments whose plan names none.</summary>
    public string DefaultTest { get; set; } = "";

    /// <summary>Key of the follow-up for experiments whose plan names none.</summary>
    public string DefaultFollowUp { get; set; } = "";

    /// <summary>Whether the experiments were taken from the data.</summary>
    public bool IsExploratory { get; set; }

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long OpenedAt { get; set; }

    /// <summary>Microseconds since 1970 UTC; null while the plan is open.</summary>
    public long? SealedAt { get; set; }

    /// <summary>SHA-256 of the plan as sealed, lower-case hexadecimal; null while the plan is open.</summary>
    public string? PlanDigest { get; set; }
}
