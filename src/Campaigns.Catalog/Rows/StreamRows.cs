namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table online_settings: what a campaign says of its online procedure before the seal; null leaves the default.</summary>
public sealed class OnlineSettingsRow
{
    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>Experiments that the shape is spread over; 0 for no end; null for the planned number.</summary>
    public int? Horizon { get; set; }

    /// <summary>Key of the spending shape.</summary>
    public string? Shape { get; set; }

    /// <summary>Initial wealth, from 0 to the level.</summary>
    public double? InitialWealth { get; set; }

    /// <summary>The bound of candidates.</summary>
    public double? Lambda { get; set; }

    /// <summary>The bound of the selected.</summary>
    public double? Tau { get; set; }
}

/// <summary>A line of the table streams: an online procedure with its settings, from the seal or from a later restart on; never changed.</summary>
public sealed class StreamRow
{
    /// <summary>Key within the catalog.</summary>
    public long Id { get; set; }

    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>Number in the campaign, from 1; the latest takes new experiments.</summary>
    public int Number { get; set; }

    /// <summary>Key of the procedure.</summary>
    public string Procedure { get; set; } = "";

    /// <summary>Alpha or q, in (0, 1).</summary>
    public double Level { get; set; }

    /// <summary>Experiments that the shape is spread over; null for no end.</summary>
    public int? Horizon { get; set; }

    /// <summary>Key of the spending shape.</summary>
    public string Shape { get; set; } = "";

    /// <summary>Initial wealth; null where the procedure has none.</summary>
    public double? InitialWealth { get; set; }

    /// <summary>The bound of candidates; null where the procedure has none.</summary>
    public double? Lambda { get; set; }

    /// <summary>The bound of the selected; null where the procedure has none.</summary>
    public double? Tau { get; set; }

    /// <summary>Why it was started in the place of an earlier one; null for the first.</summary>
    public string? Reason { get; set; }

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long StartedAt { get; set; }

    /// <summary>Version of the program.</summary>
    public string ProgramVersion { get; set; } = "";
}

/// <summary>A line of the table stream_entries: the level that an experiment was given before its p-value was seen; never changed.</summary>
public sealed class StreamEntryRow
{
    /// <summary>The stream.</summary>
    public long StreamId { get; set; }

    /// <summary>Place in the stream, from 1.</summary>
    public int Position { get; set; }

    /// <summary>The experiment.</summary>
    public long ExperimentId { get; set; }

    /// <summary>The level given; 0 beyond the horizon.</summary>
    public double Level { get; set; }

    /// <summary>Decisions of the stream that were known when the level was given: with their order they rebuild it.</summary>
    public int KnownCount { get; set; }

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long RegisteredAt { get; set; }
}

/// <summary>A line of the table standing_decisions: what an experiment's first test decided at the level given to it; never changed, never revoked.</summary>
public sealed class StandingDecisionRow
{
    /// <summary>The stream.</summary>
    public long StreamId { get; set; }

    /// <summary>Place of the experiment in the stream.</summary>
    public int Position { get; set; }

    /// <summary>Place among the stream's decisions in the order in which they became known, from 1.</summary>
    public int KnownOrder { get; set; }

    /// <summary>The test run that decided.</summary>
    public long TestRunId { get; set; }

    /// <summary>The p-value it decided on; null where the data gave none, which counts as 1.</summary>
    public double? P { get; set; }

    /// <summary>Natural logarithm of p, where p is too small for its own to be exact.</summary>
    public double? LogP { get; set; }

    /// <summary>Whether p was at most the level given.</summary>
    public bool Survives { get; set; }

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long DecidedAt { get; set; }
}
