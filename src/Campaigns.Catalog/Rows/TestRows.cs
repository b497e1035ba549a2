namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table test_runs: one use of the command that tests experiments.</summary>
public sealed class TestRunRow
{
    /// <summary>Key within the catalog.</summary>
    public long Id { get; set; }

    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>The latest load whose data the run saw; null where there was none.</summary>
    public long? LastLoadId { get; set; }

    /// <summary>The latest exclusion that the run heeded; null where there was none.</summary>
    public long? LastExclusionId { get; set; }

    /// <summary>The latest plan amendment of the campaign that the run heeded; null where there was none.</summary>
    public long? LastAmendmentId { get; set; }

    /// <summary>The latest withdrawal that the run heeded; null where there was none.</summary>
    public long? LastWithdrawalId { get; set; }

    /// <summary>Microseconds since 1970 UTC.</summary>
    public long RanAt { get; set; }

    /// <summary>Whether experiments short of their planned values were tested too.</summary>
    public bool IncludesIncomplete { get; set; }

    /// <summary>Version of the program.</summary>
    public string ProgramVersion { get; set; } = "";
}

/// <summary>A line of the table test_results: one experiment's outcome in one run; the latest run's stands, earlier ones stay.</summary>
public sealed class TestResultRow
{
    /// <summary>The experiment.</summary>
    public long ExperimentId { get; set; }

    /// <summary>The run.</summary>
    public long TestRunId { get; set; }

    /// <summary>"tested", or the frozen word of the reason why there is no result.</summary>
    public string Status { get; set; } = "";

    /// <summary>Groups with at least one value.</summary>
    public int GroupCount { get; set; }

    /// <summary>Values used.</summary>
    public int ObservationCount { get; set; }

    /// <summary>The test statistic.</summary>
    public double? Statistic { get; set; }

    /// <summary>First degrees of freedom.</summary>
    public double? Df1 { get; set; }

    /// <summary>Second degrees of freedom.</summary>
    public double? Df2 { get; set; }

    /// <summary>Upper-tail p-value.</summary>
    public double? P { get; set; }

    /// <summary>Natural logarithm of p, kept only where p is too small for its own logarithm to be exact.</summary>
    public double? LogP { get; set; }

    /// <summary>Eta squared of the sample.</summary>
    public double? EtaSquared { get; set; }

    /// <summary>Omega squared, possibly negative.</summary>
    public double? OmegaSquared { get; set; }

    /// <summary>Specimens that were tested, readings of one averaged; null where none is recorded.</summary>
    public int? SpecimenCount { get; set; }

    /// <summary>Arrangements behind a permutation p-value: all there are, or the random draws; null for other tests.</summary>
    public long? Arrangements { get; set; }

    /// <summary>How many of them were at least as extreme as the data.</summary>
    public long? AsExtreme { get; set; }

    /// <summary>Seed of the random draws, as 64 bits with a sign; null for a complete enumeration and for other tests.</summary>
    public long? Seed { get; set; }
}
