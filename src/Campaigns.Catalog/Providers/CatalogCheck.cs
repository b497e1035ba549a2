using System.Globalization;
using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Providers;

/// <summary>A campaign as a check of the file found it.</summary>
/// <param name="Code">Its code.</param>
/// <param name="Title">Its title.</param>
/// <param name="Experiments">Its experiments.</param>
public sealed record CheckedCampaign(string Code, string Title, int Experiments);

/// <summary>What a check of a catalog's file found.</summary>
/// <param name="Version">The schema in its header.</param>
/// <param name="Campaigns">What it holds.</param>
/// <param name="Head">The end of its ledger; null where its schema has none.</param>
/// <param name="LastAt">When the last entry was written; null where there is none.</param>
/// <param name="Faults">What is wrong, a sentence each; empty where all is well.</param>
public sealed record CheckedCatalog(int Version, IReadOnlyList<CheckedCampaign> Campaigns, LedgerHead? Head, DateTimeOffset? LastAt, IReadOnlyList<string> Faults);

/// <summary>Reads a catalog's file from one end to the other and says whether it may be relied on; not one byte is written.</summary>
public static class CatalogCheck
{
    /// <summary>The first schema with a ledger.</summary>
    private const int LedgerSince = 4;

    private const int MostFaults = 20;

    /// <summary>Checks a file: header, structure, pages, references, ledger.</summary>
    /// <param name="path">The file.</param>
    /// <param name="expected">A head that the ledger must contain, printed when the backup was made or before; null where none was kept.</param>
    /// <param name="clock">Where instants come from.</param>
    /// <param name="stop">The wish to stop.</param>
    /// <exception cref="CatalogException">Missing, unreadable, foreign, newer, or so damaged that it cannot be opened.</exception>
    public static CheckedCatalog Run(string path, LedgerHead? expected, TimeProvider clock, CancellationToken stop)
    {
        int version = SqliteCatalogFile.ReadVersion(path);
        if (version > SqliteCatalogFile.SchemaVersion)
        {
            throw new CatalogException($"The file '{path}' was written by a newer version of this program (schema {version}, this program knows {SqliteCatalogFile.SchemaVersion}); check it with that version.");
        }

        if (SqliteErrors.WaitsForRollback(path))
        {
            throw new CatalogException($"Beside '{path}' stands a journal: an action was interrupted there, or a program is writing. A backup has none; any command on the catalog rolls the action back.");
        }

        using SqliteConnection connection = SqliteCatalogFile.Connect(path, SqliteOpenMode.ReadOnly);
        using CancellationTokenRegistration interrupt = stop.Register(() => SQLitePCL.raw.sqlite3_interrupt(connection.Handle));
        var faults = new List<string>();
        faults.AddRange(Rows(connection, "PRAGMA integrity_check(20)", row => row.Text(0)).Where(line => line != "ok").Select(line => $"The file's pages are damaged: {line}."));
        faults.AddRange(Rows(connection, "PRAGMA foreign_key_check", row => FormattableString.Invariant($"A row of '{row.Text(0)}' refers to one of '{row.Text(2)}' that is not there.")).Take(MostFaults));
        if (version == SqliteCatalogFile.SchemaVersion)
        {
            faults.AddRange(SchemaFingerprint.Differences(connection).Select(difference => $"The structure was changed by another program: {difference}."));
        }

        List<CheckedCampaign> campaigns = faults.Count > 0 ? [] : Rows(
            connection,
            "SELECT c.code, c.title, (SELECT count(*) FROM experiments e WHERE e.campaign_id = c.id) FROM campaigns c ORDER BY c.id",
            row => new CheckedCampaign(row.Text(0), row.Text(1), (int)row.Integer(2)));
        if (version < LedgerSince)
        {
            if (expected is not null)
            {
                faults.Add($"A catalog of schema {version.ToString(CultureInfo.InvariantCulture)} has no ledger, so that nothing can be held against the head.");
            }

            return new CheckedCatalog(version, campaigns, null, null, faults);
        }

        if (faults.Count > 0)
        {
            return new CheckedCatalog(version, campaigns, null, null, faults);
        }

        using Catalog catalog = Catalog.OpenReadOnly(path, clock);
        catalog.StopOn(stop);
        (LedgerHead head, DateTimeOffset? at) = Walk(catalog, expected, faults);
        return new CheckedCatalog(version, campaigns, head, at, faults);
    }

    /// <summary>Follows the chain, with the digests of all rows that its entries speak for.</summary>
    private static (LedgerHead Head, DateTimeOffset? At) Walk(Catalog catalog, LedgerHead? expected, List<string> faults)
    {
        LedgerHead head = LedgerHead.Empty;
        DateTimeOffset? at = null;
        bool isMet = expected is null || expected == head;
        foreach (LedgerEntry entry in new LedgerReader(catalog).Entries(new LedgerFilter()))
        {
            if (entry.Sequence != head.Sequence + 1 || ChainHash.Of(head.Hash, entry) != entry.Hash)
            {
                faults.Add(FormattableString.Invariant($"The ledger is not whole from entry {head.Sequence + 1} on."));
                return (head, at);
            }

            head = new LedgerHead(entry.Sequence, entry.Hash);
            at = entry.At;
            isMet |= head == expected;
        }

        if (!isMet)
        {
            faults.Add(expected!.Sequence > head.Sequence
                ? FormattableString.Invariant($"The head given is that of entry {expected.Sequence}, but the ledger ends with entry {head.Sequence}: the file is older than the head, or its end was cut off.")
                : FormattableString.Invariant($"Entry {expected.Sequence} is another one than the head given: the ledger was written anew, or belongs to another catalog."));
        }

        return (head, at);
    }

    private static List<T> Rows<T>(SqliteConnection connection, string sql, Func<SqliteStatement, T> make)
    {
        using var select = new SqliteStatement(connection, sql);
        var rows = new List<T>();
        while (select.Read())
        {
            rows.Add(make(select));
        }

        return rows;
    }
}
