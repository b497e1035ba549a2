using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves the file: its pages and indexes fit together, every row that names another finds it, and tables, indexes and triggers are those of the program.</summary>
/// <param name="catalog">The open catalog, in a snapshot.</param>
/// <param name="findings">Takes what is wrong.</param>
internal sealed class FileProof(Catalog catalog, Findings findings)
{
    private const string History = "SELECT MigrationId FROM \"__EFMigrationsHistory\" ORDER BY MigrationId";

    // Indexes of SQLite's own, for primary keys, have no text; their names are looked at all the same.
    private const string Objects = "SELECT type, name, tbl_name, sql FROM sqlite_schema ORDER BY type, name";

    /// <summary>Looks at the whole file. O(bytes).</summary>
    public void Run()
    {
        findings.Look("The file", Pages);
        findings.Look("The file", ForeignKeys);
        findings.Look("The schema", Schema);
    }

    private void Pages()
    {
        using SqliteStatement check = catalog.PrepareAsItIs("PRAGMA integrity_check");
        while (check.Read())
        {
            if (check.Text(0) != "ok")
            {
                findings.Add(null, null, $"The file is damaged: {check.Text(0)}.");
            }
        }
    }

    private void ForeignKeys()
    {
        using SqliteStatement check = catalog.PrepareAsItIs("PRAGMA foreign_key_check");
        while (check.Read())
        {
            findings.Add(null, null, $"A row of the table {check.Text(0)} belongs to a row of {check.Text(2)} that is not there.");
        }
    }

    private void Schema()
    {
        using SqliteConnection memory = SqliteCatalogFile.InMemory();
        using Catalog fresh = Catalog.On(memory, catalog.Path, catalog.Clock, catalog.Actor);
        Dictionary<(string Type, string Name), SchemaObject> ours = ReadObjects(fresh), there = ReadObjects(catalog);
        foreach (SchemaObject one in ours.Values)
        {
            if (!there.TryGetValue((one.Type, one.Name), out SchemaObject? found))
            {
                findings.Add(null, null, $"The {one.Type} {one.Name} is missing.");
            }
            else if (found != one)
            {
                findings.Add(null, null, $"The {one.Type} {one.Name} is not as this program makes it.");
            }
        }

        HashSet<string> tables = [.. ours.Values.Select(o => o.Table)];
        foreach (SchemaObject other in there.Values.Where(o => !ours.ContainsKey((o.Type, o.Name))))
        {
            // What others keep beside our tables is theirs; what hangs on our tables may change what they hold, or how they are read.
            if (tables.Contains(other.Table))
            {
                findings.Add(null, null, $"The {other.Type} {other.Name} hangs on the table {other.Table} and is none of this program's.");
            }
            else
            {
                findings.Remarks.Add($"The {other.Type} {other.Name} is none of this program's; the record does not speak of it.");
            }
        }

        if (!Rows(catalog, History).SequenceEqual(Rows(fresh, History)))
        {
            findings.Add(null, null, "The list of schema steps is not the one of this program.");
        }
    }

    private static Dictionary<(string Type, string Name), SchemaObject> ReadObjects(Catalog catalog)
    {
        using SqliteStatement rows = catalog.PrepareAsItIs(Objects);
        var objects = new Dictionary<(string, string), SchemaObject>();
        while (rows.Read())
        {
            objects[(rows.Text(0), rows.Text(1))] = new SchemaObject(rows.Text(0), rows.Text(1), rows.Text(2), rows.NullableText(3));
        }

        return objects;
    }

    private static List<string> Rows(Catalog catalog, string sql)
    {
        using SqliteStatement rows = catalog.PrepareAsItIs(sql);
        var all = new List<string>();
        while (rows.Read())
        {
            all.Add(rows.Text(0));
        }

        return all;
    }

    private sealed record SchemaObject(string Type, string Name, string Table, string? Sql);
}
