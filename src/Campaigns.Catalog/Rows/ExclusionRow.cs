namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table exclusions: one observation was left out of the analysis, or taken in again; the latest line about it stands, earlier ones stay.</summary>
public sealed class ExclusionRow
{
    /// <summary>Key within the catalog, ascending in time.</summary>
    public long Id { get; set; }

    /// <summary>The experiment.</summary>
    public long ExperimentId { get; set; }

    /// <summary>The load that brought the observation.</summary>
    public long LoadId { get; set; }

    /// <summary>Its line in that file, from 1.</summary>
    public long Line { get; set; }

    /// <summary>Whether it is left out from here on; false where it is taken in again.</summary>
    public bool IsExcluded { get; set; }

    /// <summary>Label of its group, for people who read the record.</summary>
    public string GroupLabel { get; set; } = "";

    /// <summary>Its value as typed, for people who read the record.</summary>
    public string Value { get; set; } = "";

    /// <summary>Why.</summary>
    public string Reason { get; set; } = "";

    /// <summary>Who says so.</summary>
    public string NamedBy { get; set; } = "";

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long MadeAt { get; set; }

    /// <summary>Version of the program.</summary>
    public string ProgramVersion { get; set; } = "";
}
