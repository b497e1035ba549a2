using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
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

        return version < SqliteCatalogFile.SchemaVersion ? Earlier(path, version, expected, stop) : Today(path, expected, clock, stop);
    }

    private static CheckedCatalog Today(string path, LedgerHead? expected, TimeProvider clock, CancellationToken stop)
    {
        using Catalog catalog = Catalog.OpenForProof(path, clock, isReadOnly: true);
        catalog.StopOn(stop);
        LedgerProof proof = new LedgerVerifier(catalog).Verify(expected);
        string[] faults = [.. proof.Findings.Select(f => f.What)];
        bool isReadable = faults.Length == 0;
        DateTimeOffset? last = isReadable && proof.Head.Sequence > 0 ? new LedgerReader(catalog).Entries(new LedgerFilter { From = proof.Head.Sequence }).Single().At : null;
        return new CheckedCatalog(SqliteCatalogFile.SchemaVersion, isReadable ? Held(catalog.Connection) : [], proof.Head, last, faults);
    }

    /// <summary>Pages and references alone: an earlier schema has no ledger that this program could follow.</summary>
    private static CheckedCatalog Earlier(string path, int version, LedgerHead? expected, CancellationToken stop)
    {
        using SqliteConnection connection = SqliteCatalogFile.Connect(path, SqliteOpenMode.ReadOnly);
        using CancellationTokenRegistration interrupt = stop.Register(() => SQLitePCL.raw.sqlite3_interrupt(connection.Handle));
        List<string> faults =
        [
            .. Rows(connection, "PRAGMA integrity_check(20)", row => row.Text(0)).Where(line => line != "ok").Select(line => $"The file is damaged: {line}."),
            .. Rows(connection, "PRAGMA foreign_key_check", row => $"A row of the table {row.Text(0)} belongs to a row of {row.Text(2)} that is not there.").Take(MostFaults),
        ];
        if (expected is not null)
        {
            faults.Add(FormattableString.Invariant($"A catalog of schema {version} has no ledger, so that nothing can be held against the head."));
        }

        return new CheckedCatalog(version, faults.Count == 0 ? Held(connection) : [], null, null, faults);
    }

    private static List<CheckedCampaign> Held(SqliteConnection connection) => Rows(
        connection,
        "SELECT c.code, c.title, (SELECT count(*) FROM experiments e WHERE e.campaign_id = c.id) FROM campaigns c ORDER BY c.id",
        row => new CheckedCampaign(row.Text(0), row.Text(1), (int)row.Integer(2)));

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
