namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table reviews: a correction applied to a family on a day, with all its lines packed; never changed.</summary>
public sealed class ReviewRow
{
    /// <summary>Key within the catalog.</summary>
    public long Id { get; set; }

    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>Number in the campaign, from 1.</summary>
    public int Number { get; set; }

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long TakenAt { get; set; }

    /// <summary>Key of the correction.</summary>
    public string Correction { get; set; } = "";

    /// <summary>Level applied.</summary>
    public double Level { get; set; }

    /// <summary>Hypotheses counted.</summary>
    public int FamilySize { get; set; }

    /// <summary>Experiments with a result.</summary>
    public int TestedCount { get; set; }

    /// <summary>Survivors.</summary>
    public int SurvivorCount { get; set; }

    /// <summary>Whether only tested experiments were counted.</summary>
    public bool IsInterim { get; set; }

    /// <summary>The latest test run seen; null where there was none.</summary>
    public long? LastTestRunId { get; set; }

    /// <summary>The latest load of the campaign at that moment; null where there was none.</summary>
    public long? LastLoadId { get; set; }

    /// <summary>The latest exclusion in the catalog at that moment; null where there was none.</summary>
    public long? LastExclusionId { get; set; }

    /// <summary>The latest plan amendment of the campaign at that moment; null where there was none.</summary>
    public long? LastAmendmentId { get; set; }

    /// <summary>The latest withdrawal in the catalog at that moment; null where there was none.</summary>
    public long? LastWithdrawalId { get; set; }

    /// <summary>Version of the program.</summary>
    public string ProgramVersion { get; set; } = "";

    /// <summary>Experiment, p and adjusted p of every line; see PackedReviewLines.</summary>
    public byte[] Lines { get; set; } = [];
}
