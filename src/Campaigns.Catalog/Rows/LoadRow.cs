namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table loads: one measurement file that was taken in whole.</summary>
public sealed class LoadRow
{
    /// <summary>Key within the catalog.</summary>
    public long Id { get; set; }

    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>Name of the file, without its folder.</summary>
    public string FileName { get; set; } = "";

    /// <summary>SHA-256 of the file's bytes, lower-case hexadecimal; unique in the campaign.</summary>
    public string Sha256 { get; set; } = "";

    /// <summary>Size of the file in bytes.</summary>
    public long ByteCount { get; set; }

    /// <summary>Rows with a measurement, missing ones included.</summary>
    public long RowCount { get; set; }

    /// <summary>Rows whose value is marked as missing.</summary>
    public long MissingCount { get; set; }

    /// <summary>Experiments that received values.</summary>
    public int ExperimentCount { get; set; }

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long LoadedAt { get; set; }

    /// <summary>Why values were added to experiments that had been tested; null for an ordinary load.</summary>
    public string? AmendmentReason { get; set; }
}

/// <summary>A line of the table measurements: what one load brought to one experiment, as packed columns.</summary>
public sealed class MeasurementRow
{
    /// <summary>The experiment.</summary>
    public long ExperimentId { get; set; }

    /// <summary>The load.</summary>
    public long LoadId { get; set; }

    /// <summary>Values in the packed columns.</summary>
    public int ValueCount { get; set; }

    /// <summary>Rows whose value is marked as missing.</summary>
    public int MissingCount { get; set; }

    /// <summary>The group set to which the packed groups refer: the experiment's when the load was stored; null in rows without one.</summary>
    public long? GroupSetId { get; set; }

    /// <summary>The columns; see PackedMeasurements.</summary>
    public byte[] Packed { get; set; } = [];
}
