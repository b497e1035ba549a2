namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Something about the record that is not as it should be.</summary>
/// <param name="Sequence">The entry of the ledger that shows it; null where none does.</param>
/// <param name="Campaign">Code of the campaign that the entry is about; null where it is about none, or no entry shows it.</param>
/// <param name="What">What is wrong, one sentence.</param>
public sealed record LedgerFinding(long? Sequence, string? Campaign, string What);

/// <summary>What came of proving a catalog's record.</summary>
public sealed record LedgerProof
{
    /// <summary>The chain's end as it stands in the file.</summary>
    public required LedgerHead Head { get; init; }

    /// <summary>Entries that were read.</summary>
    public required long Entries { get; init; }

    /// <summary>Digests that were recomputed from the rows they speak for.</summary>
    public required long Digests { get; init; }

    /// <summary>Entries whose instant stands before that of the entry before.</summary>
    public required long ClockSteps { get; init; }

    /// <summary>The head from outside that the chain was held against; null where none was given, and then a cut tail or an older copy cannot be seen.</summary>
    public LedgerHead? Known { get; init; }

    /// <summary>What is wrong, the lowest sequence first; what no entry shows stands last.</summary>
    public required IReadOnlyList<LedgerFinding> Findings { get; init; }

    /// <summary>What is not wrong and should be known: things in the file that the record does not speak of.</summary>
    public required IReadOnlyList<string> Remarks { get; init; }

    /// <summary>Whether the record is whole.</summary>
    public bool IsWhole => Findings.Count == 0;
}
