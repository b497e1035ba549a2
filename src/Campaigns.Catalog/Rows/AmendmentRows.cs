namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table plan_amendments: a change of a plan after its seal, with its reason.</summary>
public sealed class PlanAmendmentRow
{
    /// <summary>Key within the catalog, ascending in time.</summary>
    public long Id { get; set; }

    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>Number in the campaign, from 1: the version of its plan.</summary>
    public int Number { get; set; }

    /// <summary>Why.</summary>
    public string Reason { get; set; } = "";

    /// <summary>Who says so.</summary>
    public string NamedBy { get; set; } = "";

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long MadeAt { get; set; }

    /// <summary>Version of the program.</summary>
    public string ProgramVersion { get; set; } = "";
}

/// <summary>A line of the table plan_amendment_changes: one field of an experiment before and after an amendment; the sealed plan is what stands when all are undone.</summary>
public sealed class PlanAmendmentChangeRow
{
    /// <summary>The amendment.</summary>
    public long AmendmentId { get; set; }

    /// <summary>The experiment.</summary>
    public long ExperimentId { get; set; }

    /// <summary>Column of the plan; "experiment" where the amendment added the experiment.</summary>
    public string Field { get; set; } = "";

    /// <summary>The text of the field before, as in a plan file; null where it said nothing.</summary>
    public string? Before { get; set; }

    /// <summary>The text after; null where it says nothing.</summary>
    public string? After { get; set; }
}

/// <summary>A line of the table withdrawals: an experiment was taken out, or back in; the latest line about it stands, earlier ones stay.</summary>
public sealed class WithdrawalRow
{
    /// <summary>Key within the catalog, ascending in time.</summary>
    public long Id { get; set; }

    /// <summary>The experiment.</summary>
    public long ExperimentId { get; set; }

    /// <summary>Whether it is out from here on; false where it is taken in again.</summary>
    public bool IsWithdrawn { get; set; }

    /// <summary>Whether it had data at that moment: then it stays in the family and counts with p = 1.</summary>
    public bool HadData { get; set; }

    /// <summary>Why.</summary>
    public string Reason { get; set; } = "";

    /// <summary>Who says so.</summary>
    public string NamedBy { get; set; } = "";

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long MadeAt { get; set; }

    /// <summary>Version of the program.</summary>
    public string ProgramVersion { get; set; } = "";
}
