using System.Globalization;

namespace Campaigns.Catalog.Ledger;

/// <summary>One value before and after an action.</summary>
/// <param name="What">What has the value; where it is of an experiment, its code, a colon and a blank stand before.</param>
/// <param name="Before">The value before; null where there was none.</param>
/// <param name="After">The value after; null where there is none.</param>
public sealed record LedgerChange(string What, string? Before, string? After)
{
    /// <summary>What the clock of an entry that stands before its predecessor is called.</summary>
    public const string Clock = "clock";
}

/// <summary>The digest of rows that an action wrote.</summary>
/// <param name="Kind">Word of the kind of rows.</param>
/// <param name="Owner">Key of what owns them.</param>
/// <param name="First">The first of a range within the owner; 0 where there is no range.</param>
/// <param name="Last">The last of the range; 0 where there is none.</param>
/// <param name="Digest">SHA-256 of the rows, lower-case hexadecimal.</param>
public sealed record LedgerEvidence(string Kind, long Owner, long First, long Last, string Digest);

/// <summary>One action that changed the catalog, as the ledger keeps it.</summary>
public sealed record LedgerEntry
{
    /// <summary>Place in the chain, from 1 without gaps.</summary>
    public required long Sequence { get; init; }

    /// <summary>When, by the computer's clock.</summary>
    public required DateTimeOffset At { get; init; }

    /// <summary>Who.</summary>
    public required Actor By { get; init; }

    /// <summary>Version of the program.</summary>
    public required string ProgramVersion { get; init; }

    /// <summary>What was done, a word of <see cref="LedgerAction"/>.</summary>
    public required string Action { get; init; }

    /// <summary>Code of the campaign; null where the whole catalog is meant.</summary>
    public string? Campaign { get; init; }

    /// <summary>What in the campaign was touched; null for the campaign itself.</summary>
    public string? Subject { get; init; }

    /// <summary>Why; null where no reason is due.</summary>
    public string? Reason { get; init; }

    /// <summary>Values before and after.</summary>
    public IReadOnlyList<LedgerChange> Changes { get; init; } = [];

    /// <summary>Digests of the rows that it wrote.</summary>
    public IReadOnlyList<LedgerEvidence> Evidence { get; init; } = [];

    /// <summary>SHA-256 over the hash before and everything above.</summary>
    public required string Hash { get; init; }
}

/// <summary>The end of the chain at some moment: whoever holds it can prove later that the record was only continued.</summary>
/// <param name="Sequence">Entries; 0 for an empty ledger.</param>
/// <param name="Hash">Hash of the last one, 64 lower-case hexadecimal digits.</param>
public sealed record LedgerHead(long Sequence, string Hash)
{
    /// <summary>The head before the first entry.</summary>
    public static LedgerHead Empty { get; } = new(0, new string('0', 64));

    /// <summary>Reads a head as it is printed: SEQUENCE:HASH.</summary>
    public static bool TryParse(string text, out LedgerHead head)
    {
        ArgumentNullException.ThrowIfNull(text);
        head = Empty;
        int colon = text.IndexOf(':', StringComparison.Ordinal);
        if (colon < 1 || !long.TryParse(text.AsSpan(0, colon), NumberStyles.None, CultureInfo.InvariantCulture, out long sequence))
        {
            return false;
        }

        string hash = text[(colon + 1)..].ToLowerInvariant();
        if (hash.Length != 64 || !hash.All(char.IsAsciiHexDigit))
        {
            return false;
        }

        head = new LedgerHead(sequence, hash);
        return true;
    }

    /// <summary>SEQUENCE:HASH, as it is printed and read back.</summary>
    public override string ToString() => string.Create(CultureInfo.InvariantCulture, $"{Sequence}:{Hash}");
}
