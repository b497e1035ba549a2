using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>Rows deleted, exchanged and doubled behind the catalog's own guards, which are put back afterwards as they were.</summary>
internal static class RowDamage
{
    /// <summary>Each kind of damage; gives what was done.</summary>
    public static IReadOnlyList<(string What, Func<SqliteConnection, Random, string?> Damage)> All { get; } =
        [("a row deleted", Delete), ("two rows exchanged", Exchange), ("a row doubled", Double)];

    /// <summary>Does something without triggers, keys and checks, and leaves the triggers as they were.</summary>
    public static string? BehindTheGuards(SqliteConnection connection, Func<string?> work)
    {
        List<string> names = RecordedLife.Strings(connection, "SELECT name FROM sqlite_schema WHERE type = 'trigger' ORDER BY name");
        List<string> texts = RecordedLife.Strings(connection, "SELECT sql FROM sqlite_schema WHERE type = 'trigger' ORDER BY name");
        Run(connection, "PRAGMA foreign_keys = OFF; PRAGMA ignore_check_constraints = ON;");
        names.ForEach(name => Run(connection, $"DROP TRIGGER {name}"));
        string? done;
        try
        {
            done = work();
        }
        catch (SqliteException error) when (error.SqliteErrorCode == SQLitePCL.raw.SQLITE_CONSTRAINT)
        {
            // A unique index refuses it: there is nothing to see.
            done = null;
        }

        texts.ForEach(text => Run(connection, text));
        return done;
    }

    /// <summary>Takes the last entries away, and the decisions that they recorded: the catalog is then just as it was before them.</summary>
    public static void CutTail(Workbench bench, byte[] whole, int entries)
    {
        File.WriteAllBytes(bench.Catalog, whole);
        using SqliteConnection connection = RecordedLife.Open(bench.Catalog, SqliteOpenMode.ReadWrite);
        BehindTheGuards(connection, () =>
        {
            string tail = RecordedLife.Text($"(SELECT max(sequence) - {entries} FROM ledger)");
            Run(connection, $"DELETE FROM exclusions WHERE id IN (SELECT owner FROM ledger_evidence WHERE kind = 'exclusion' AND sequence > {tail})");
            Run(connection, $"DELETE FROM ledger_evidence WHERE sequence > {tail}");
            Run(connection, $"DELETE FROM ledger_changes WHERE sequence > {tail}");
            Run(connection, $"DELETE FROM ledger WHERE sequence > {tail}");
            return null;
        });
    }

    private static string? Delete(SqliteConnection connection, Random random)
    {
        (string table, string key) = Any(connection, random);
        string row = AnyRow(connection, table, key, random);
        Run(connection, $"DELETE FROM \"{table}\" WHERE {row}");
        return $"{table}: {row} deleted";
    }

    /// <summary>Each of two rows takes the other's key.</summary>
    private static string? Exchange(SqliteConnection connection, Random random)
    {
        (string table, string key) = Any(connection, random);
        string one = AnyRow(connection, table, key, random), other = AnyRow(connection, table, key, random);
        List<string> rest = RecordedLife.Strings(connection, $"SELECT name FROM pragma_table_info('{table}') WHERE pk = 0");
        if (one == other || rest.Count == 0)
        {
            return null;
        }

        string columns = string.Join(", ", rest.Select(c => $"\"{c}\""));
        Run(connection, $"CREATE TEMP TABLE held AS SELECT {columns} FROM \"{table}\" WHERE {one}");
        Run(connection, $"UPDATE \"{table}\" SET ({columns}) = (SELECT {columns} FROM \"{table}\" WHERE {other}) WHERE {one}");
        Run(connection, $"UPDATE \"{table}\" SET ({columns}) = (SELECT {columns} FROM held) WHERE {other}");
        Run(connection, "DROP TABLE held");
        return $"{table}: {one} and {other} exchanged";
    }

    /// <summary>A copy of a row under the next key.</summary>
    private static string? Double(SqliteConnection connection, Random random)
    {
        (string table, string key) = Any(connection, random);
        string row = AnyRow(connection, table, key, random);
        List<string> columns = RecordedLife.Strings(connection, $"SELECT '\"' || name || '\"' FROM pragma_table_info('{table}')");
        string last = RecordedLife.Strings(connection, $"SELECT '\"' || name || '\"' FROM pragma_table_info('{table}') ORDER BY pk DESC LIMIT 1")[0];
        string values = string.Join(", ", columns.Select(c => c == last ? $"(SELECT max({c}) FROM \"{table}\") + 1" : c));
        Run(connection, $"INSERT INTO \"{table}\" ({string.Join(", ", columns)}) SELECT {values} FROM \"{table}\" WHERE {row}");
        return $"{table}: {row} doubled";
    }

    /// <summary>A table that has rows, and the SQL that names the key of a row of it.</summary>
    private static (string Table, string Key) Any(SqliteConnection connection, Random random)
    {
        List<string> tables = [.. RecordedLife.Strings(connection, "SELECT name FROM sqlite_schema WHERE type = 'table' ORDER BY name").Where(t => RecordedLife.Strings(connection, $"SELECT 'x' FROM \"{t}\" LIMIT 1").Count > 0)];
        string table = tables[random.Next(tables.Count)];
        string key = string.Join(" || ' AND ' || ", RecordedLife.Strings(connection, $"SELECT '''\"' || name || '\" = '' || quote(\"' || name || '\")' FROM pragma_table_info('{table}') WHERE pk > 0"));
        return (table, key);
    }

    private static string AnyRow(SqliteConnection connection, string table, string key, Random random)
    {
        List<string> rows = RecordedLife.Strings(connection, $"SELECT {key} FROM \"{table}\" ORDER BY 1");
        return rows[random.Next(rows.Count)];
    }

    private static void Run(SqliteConnection connection, string sql) => SqliteCatalogFile.Execute(connection, sql);
}
