using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Providers;

/// <summary>Tells a catalog whose tables another program changed, although its header names this program's schema.</summary>
/// <remarks>
/// Opening compares one digest over the texts of tables and indexes and over the migrations, which costs a fraction of a millisecond.
/// Tables and views that somebody added beside ours are nobody's harm. Triggers are left to the proof of the record: without one, nothing that is stored means anything else.
/// </remarks>
internal static class SchemaFingerprint
{
    /// <summary>The digest of an untouched catalog of <see cref="SqliteCatalogFile.SchemaVersion"/>, new or upgraded.</summary>
    public const string Expected = "e39a2699d158b9a1bc147cdd14ebcc367d5af3c61c932b1ee30f462f418f060b";

    /// <summary>The tables of the schema; what belongs to others is not looked at.</summary>
    private const string Ours =
        """
        ('__EFMigrationsHistory', 'campaigns', 'exclusions', 'experiments', 'families', 'group_sets', 'groups', 'ledger', 'ledger_changes', 'ledger_evidence', 'loads',
        'measurements', 'online_settings', 'original_pieces', 'originals', 'plan_amendment_changes', 'plan_amendments', 'review_families', 'reviews', 'standing_decisions',
        'stream_entries', 'streams', 'test_results', 'test_runs', 'withdrawals')
        """;

    /// <summary>The digest of a catalog.</summary>
    public static string Of(SqliteConnection connection)
    {
        using var hash = new ChainHash();
        hash.Begin(1);
        Add(hash, connection, $"SELECT type, name, tbl_name, sql FROM sqlite_schema WHERE type IN ('table', 'index') AND tbl_name IN {Ours} ORDER BY type, name");
        if (HasMigrations(connection))
        {
            Add(hash, connection, "SELECT \"MigrationId\" FROM \"__EFMigrationsHistory\" ORDER BY 1");
        }

        return hash.Finish();
    }

    /// <summary>Refuses a catalog whose tables are not those of this program.</summary>
    /// <exception cref="CatalogException">They are not; the message names the first that differs.</exception>
    public static void Demand(SqliteConnection connection, string path)
    {
        if (Of(connection) != Expected)
        {
            string what = Differences(connection) is [var first, ..] ? first : "its list of migrations is not this program's";
            throw new CatalogException($"The catalog '{path}' was changed by another program: {what}. It was not touched; restore it from a backup, or undo that change.");
        }
    }

    /// <summary>Everything in which the structure differs from that of an untouched catalog; builds one in memory, where the digest is not what it should be.</summary>
    private static List<string> Differences(SqliteConnection connection)
    {
        using SqliteConnection fresh = SqliteCatalogFile.InMemory();
        Dictionary<string, string> expected = Objects(fresh), found = Objects(connection);
        return
        [
            .. expected.Keys.Where(name => !found.ContainsKey(name)).Select(name => $"{name} is missing"),
            .. found.Keys.Where(name => !expected.ContainsKey(name)).Select(name => $"{name} is not this program's"),
            .. found.Keys.Where(name => expected.TryGetValue(name, out string? text) && text != found[name]).Select(name => $"{name} is not as this program made it"),
        ];
    }

    private static Dictionary<string, string> Objects(SqliteConnection connection)
    {
        using var select = new SqliteStatement(connection, $"SELECT type || ' ' || name, coalesce(sql, '') FROM sqlite_schema WHERE type IN ('table', 'index') AND tbl_name IN {Ours} ORDER BY type DESC, name");
        var objects = new Dictionary<string, string>(StringComparer.Ordinal);
        while (select.Read())
        {
            objects.Add(select.Text(0), select.Text(1));
        }

        return objects;
    }

    private static bool HasMigrations(SqliteConnection connection)
    {
        using var select = new SqliteStatement(connection, "SELECT 1 FROM sqlite_schema WHERE type = 'table' AND name = '__EFMigrationsHistory' AND sql LIKE '%\"MigrationId\" TEXT%'");
        return select.Read();
    }

    private static void Add(ChainHash hash, SqliteConnection connection, string sql)
    {
        using var select = new SqliteStatement(connection, sql);
        while (select.Read())
        {
            select.AddRowTo(hash);
        }
    }
}
