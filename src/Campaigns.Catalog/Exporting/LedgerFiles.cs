using Campaigns.Catalog.Ledger;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes a campaign's part of the ledger so that the hash of every entry can be recomputed from these files alone.</summary>
/// <remarks>Entries of other campaigns are left out, so an entry carries the hash before it; where the one before is there too, both must agree.</remarks>
internal sealed class LedgerFiles
{
    private readonly List<(LedgerEntry Entry, string Previous)> _entries = [];

    /// <summary>Reads the entries of the campaign, and those of the whole catalog.</summary>
    public LedgerFiles(Catalog catalog, string campaign)
    {
        string previous = LedgerHead.Empty.Hash;
        foreach (LedgerEntry e in new LedgerReader(catalog).Entries(new LedgerFilter()))
        {
            if (e.Campaign is null || e.Campaign == campaign)
            {
                _entries.Add((e, previous));
            }

            previous = e.Hash;
        }
    }

    /// <summary>A row an entry, with its changes in words too.</summary>
    public void WriteEntries(TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("sequence", "at", "account", "acting_as", "version", "action", "campaign", "subject", "reason", "changes", "hash", "previous_hash");
        foreach ((LedgerEntry e, string previous) in _entries)
        {
            csv.Write(
                CsvLine.Number(e.Sequence), CsvField.AsItStands(Instants.Text(Instants.ToMicroseconds(e.At))), e.By.Account, e.By.ActingAs ?? "", e.ProgramVersion, e.Action,
                e.Campaign ?? "", e.Subject ?? "", e.Reason ?? "", string.Join('\n', e.Changes.Select(c => $"{c.What}: {c.Before ?? "(none)"} -> {c.After ?? "(none)"}")), e.Hash, previous);
        }
    }

    /// <summary>A row a value that an entry changed. No value and an empty one are told apart.</summary>
    public void WriteChanges(TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("sequence", "position", "what", "had_before", "before", "has_after", "after");
        foreach (LedgerEntry e in _entries.Select(e => e.Entry))
        {
            for (int i = 0; i < e.Changes.Count; i++)
            {
                LedgerChange c = e.Changes[i];
                csv.Write(CsvLine.Number(e.Sequence), CsvLine.Number(i + 1), c.What, Truth(c.Before is not null), c.Before ?? "", Truth(c.After is not null), c.After ?? "");
            }
        }
    }

    /// <summary>A row a digest of rows that an entry speaks for.</summary>
    public void WriteEvidence(TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("sequence", "position", "kind", "owner", "first", "last", "digest");
        foreach (LedgerEntry e in _entries.Select(e => e.Entry))
        {
            for (int i = 0; i < e.Evidence.Count; i++)
            {
                LedgerEvidence d = e.Evidence[i];
                csv.Write(CsvLine.Number(e.Sequence), CsvLine.Number(i + 1), d.Kind, Whole(d.Owner), Whole(d.First), Whole(d.Last), d.Digest);
            }
        }
    }

    private static CsvField Truth(bool value) => CsvField.AsItStands(value ? "true" : "false");

    private static CsvField Whole(long value) => CsvField.AsItStands(value.ToString(System.Globalization.CultureInfo.InvariantCulture));
}
