using System.Text;
using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>T10: files that are no catalog of this version are refused, by reading and by writing commands, and left as they are with nothing beside them.</summary>
internal sealed class ForeignFiles : TortureTest
{
    public override string Key => "T10";

    public override string What => "newer, foreign and cut files";

    public override int Full => 200;

    public override int Short => 200;

    public override void Run(Tally tally, int tries, Random random)
    {
        byte[] whole = Whole();
        int count = 0;
        foreach ((string what, byte[] bytes) in Changed(whole).Concat(Others()).Concat(Cut(whole, random)).Take(tries))
        {
            count++;
            tally.Try(what, () => Fault(bytes));
        }

        tally.Try("as many as were asked for", () => count == tries ? null : FormattableString.Invariant($"only {count} files"));
        tally.Try("the file that all were made of is taken", () =>
        {
            using var bench = new Workbench();
            bench.Write("campaigns.db", whole);
            return bench.Run("list").Code == 0 && bench.Run("start", "NEW").Code == 0 ? null : "refused";
        });
    }

    private static string? Fault(byte[] bytes)
    {
        using var bench = new Workbench();
        bench.Write("campaigns.db", bytes);
        string before = Inspection.Hash(bench.Catalog);
        foreach (string[] words in new string[][] { ["list"], ["start", "NEW"], ["upgrade"], ["backup", bench.At("copy.db")], ["restore-check", bench.Catalog] })
        {
            Ran ran = bench.Run(words);
            bool mayKnowBetter = words[0] is "upgrade" or "restore-check" && ran.Code is 0 or 5;
            if (ran.Code is not (3 or 4) && !mayKnowBetter)
            {
                return $"{words[0]} ended with {ran.Code}: {ran.Out}{ran.Error}";
            }

            if (!mayKnowBetter && ran.Error.TrimEnd('\n').Contains('\n'))
            {
                return $"{words[0]} said more than a sentence: {ran.Error}";
            }

            if (Inspection.Hash(bench.Catalog) != before)
            {
                return $"{words[0]} changed the file";
            }

            if (Inspection.Files(bench.Folder) is not ["campaigns.db"])
            {
                return $"{words[0]} left {string.Join(", ", Inspection.Files(bench.Folder))}";
            }
        }

        return null;
    }

    private static byte[] Whole()
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        bench.Run("load", "C", bench.Write("m.csv", "experiment,group,value\nE,a,1\nE,a,2\nE,b,3\nE,b,4\n"));
        return File.ReadAllBytes(bench.Catalog);
    }

    /// <summary>Headers and structures that another program, or a later version, made.</summary>
    private static IEnumerable<(string What, byte[] Bytes)> Changed(byte[] whole)
    {
        string[] tables, indexes;
        using (var bench = new Workbench())
        {
            bench.Write("campaigns.db", whole);
            using SqliteConnection connection = Inspection.Open(bench.Catalog);
            tables = Inspection.Texts(connection, "SELECT name FROM sqlite_schema WHERE type = 'table' ORDER BY name");
            indexes = Inspection.Texts(connection, "SELECT 'CREATE INDEX other_' || name || ' ON \"' || name || '\" (\"' || (SELECT c.name FROM pragma_table_info(m.name) c LIMIT 1) || '\")' FROM sqlite_schema m WHERE type = 'table' ORDER BY name");
        }

        string[] changes =
        [
            .. Enumerable.Range(1, 5).Select(i => FormattableString.Invariant($"PRAGMA user_version = {SqliteCatalogFile.SchemaVersion + i}")),
            "PRAGMA user_version = 2147483647", "PRAGMA user_version = -1", "PRAGMA application_id = 0", "PRAGMA application_id = 1", "PRAGMA application_id = -1", "PRAGMA journal_mode = WAL",
            "INSERT INTO \"__EFMigrationsHistory\" VALUES ('20990101000000_Later', '99.0.0')",
            "DELETE FROM \"__EFMigrationsHistory\"", "DROP TABLE \"__EFMigrationsHistory\"",
            "DELETE FROM \"__EFMigrationsHistory\" WHERE \"MigrationId\" = (SELECT max(\"MigrationId\") FROM \"__EFMigrationsHistory\")",
            .. tables.Select(t => $"ALTER TABLE \"{t}\" ADD COLUMN unknown TEXT"),
            .. indexes,
            .. tables.Select(t => $"PRAGMA writable_schema = ON; DELETE FROM sqlite_schema WHERE name = '{t}'; PRAGMA writable_schema = OFF"),
            "ALTER TABLE campaigns RENAME COLUMN title TO heading", "ALTER TABLE loads RENAME TO files",
        ];
        foreach (string change in changes)
        {
            using var bench = new Workbench();
            bench.Write("campaigns.db", whole);
            Inspection.Execute(bench.Catalog, change);
            yield return (change, File.ReadAllBytes(bench.Catalog));
        }
    }

    private static IEnumerable<(string What, byte[] Bytes)> Others()
    {
        yield return ("no byte", []);
        yield return ("one byte", [0]);
        yield return ("zeros", new byte[100_000]);
        yield return ("a table of values", Encoding.UTF8.GetBytes("experiment,group,value\nE,a,1\n"));
        yield return ("the signature alone", Encoding.UTF8.GetBytes("SQLite format 3\0"));
        yield return ("words", Encoding.UTF8.GetBytes(string.Concat(Enumerable.Repeat("not a database ", 10_000))));
        using var bench = new Workbench();
        Inspection.Execute(bench.Catalog, "CREATE TABLE notes (text TEXT)");
        yield return ("another program's database", File.ReadAllBytes(bench.Catalog));
    }

    /// <summary>Cut at every page, and then anywhere.</summary>
    private static IEnumerable<(string What, byte[] Bytes)> Cut(byte[] whole, Random random)
    {
        const int page = 8192;
        for (int length = page; length < whole.Length; length += page)
        {
            yield return (FormattableString.Invariant($"cut to {length / page} pages"), whole[..length]);
        }

        while (true)
        {
            int length = random.Next(1, whole.Length);
            yield return (FormattableString.Invariant($"cut to {length} bytes"), whole[..length]);
        }
    }
}
