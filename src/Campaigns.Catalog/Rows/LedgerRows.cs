namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table ledger: one action that changed the catalog; never changed itself.</summary>
public sealed class LedgerRow
{
    /// <summary>Place in the chain, from 1 without gaps; the order of the record, whatever the clock said.</summary>
    public long Sequence { get; set; }

    /// <summary>Microseconds since 1970 UTC, by the computer's clock.</summary>
    public long At { get; set; }

    /// <summary>The account under which the program ran.</summary>
    public string Account { get; set; } = "";

    /// <summary>Whom the account named as acting; null where it named nobody.</summary>
    public string? ActingAs { get; set; }

    /// <summary>Version of the program.</summary>
    public string ProgramVersion { get; set; } = "";

    /// <summary>Word of the action; see LedgerAction.</summary>
    public string Action { get; set; } = "";

    /// <summary>Code of the campaign; null where the whole catalog is meant.</summary>
    public string? Campaign { get; set; }

    /// <summary>What in the campaign was touched: an experiment, a file, a review; null for the campaign itself.</summary>
    public string? Subject { get; set; }

    /// <summary>Why; null where no reason is due.</summary>
    public string? Reason { get; set; }

    /// <summary>SHA-256 over the hash before and everything in this entry, lower-case hexadecimal.</summary>
    public string Hash { get; set; } = "";
}

/// <summary>A line of the table ledger_changes: one value before and after an action.</summary>
public sealed class LedgerChangeRow
{
    /// <summary>The entry.</summary>
    public long Sequence { get; set; }

    /// <summary>Place in the entry, from 1.</summary>
    public int Position { get; set; }

    /// <summary>What has the value.</summary>
    public string What { get; set; } = "";

    /// <summary>The value before; null where there was none.</summary>
    public string? Before { get; set; }

    /// <summary>The value after; null where there is none.</summary>
    public string? After { get; set; }
}

/// <summary>A line of the table ledger_evidence: the digest of rows that an action wrote.</summary>
public sealed class LedgerEvidenceRow
{
    /// <summary>The entry.</summary>
    public long Sequence { get; set; }

    /// <summary>Place in the entry, from 1.</summary>
    public int Position { get; set; }

    /// <summary>Word of the kind of rows; see EvidenceRegistry.</summary>
    public string Kind { get; set; } = "";

    /// <summary>Key of what owns the rows.</summary>
    public long Owner { get; set; }

    /// <summary>The first of a range within the owner; 0 where there is no range.</summary>
    public long First { get; set; }

    /// <summary>The last of the range; 0 where there is none.</summary>
    public long Last { get; set; }

    /// <summary>SHA-256 of the rows, lower-case hexadecimal.</summary>
    public string Digest { get; set; } = "";
}
