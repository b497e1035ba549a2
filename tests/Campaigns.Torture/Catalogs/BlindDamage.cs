using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>T8: bits of the file flipped anywhere, rows deleted, exchanged and doubled, the tail of the record cut with all that belongs to it, the file replaced by an older copy.</summary>
/// <remarks>
/// What a reader sees is every row of every table, and the texts of the schema, as any program reads them through SQL; or that the file no longer opens.
/// Of a flip that changes nothing of this, nothing is demanded but that the program does not stumble.
/// </remarks>
internal sealed class BlindDamage : TortureTest
{
    private const int BeforeTail = 25;
    private const int Tail = 50;
    private const int MostAttempts = 50;

    public override string Key => "T8";

    public override string What => "blind damage to the file, rows and tails";

    public override int Full => 1_500;

    public override int Short => 200;

    public override void Run(Tally tally, int tries, Random random)
    {
        using var bench = new Workbench();
        RecordedLife.Live(bench, BeforeTail);
        var older = new List<byte[]> { File.ReadAllBytes(bench.Catalog) };
        for (int i = 0; i < Tail; i++)
        {
            RecordedLife.Decide(bench, BeforeTail + i);
            older.Add(File.ReadAllBytes(bench.Catalog));
        }

        LedgerHead head = RecordedLife.Head(bench);
        byte[] whole = older[^1];
        string seen = WhatAReaderSees(bench.Catalog);
        tally.Try("untouched", () => Demand(bench.Run("ledger", "verify", "--head", head.ToString()), 0));
        for (int i = 0; i < tries; i++)
        {
            int bit = random.Next(whole.Length * 8);
            tally.Try(RecordedLife.Text($"bit {bit}"), () => Flip(bench, whole, bit, seen));
        }

        int rest = Math.Max(1, tries / 30);
        foreach ((string what, Func<SqliteConnection, Random, string?> damage) in RowDamage.All)
        {
            for (int i = 0; i < rest; i++)
            {
                tally.Try(what, () => OfRows(bench, whole, seen, connection => damage(connection, random)));
            }
        }

        for (int i = 0; i < rest; i++)
        {
            int cut = 1 + random.Next(Tail);
            tally.Try(RecordedLife.Text($"tail of {cut} cut"), () => Gone(bench, () => RowDamage.CutTail(bench, whole, cut), head));
            byte[] copy = older[random.Next(Tail)];
            tally.Try("replaced by an older copy", () => Gone(bench, () => File.WriteAllBytes(bench.Catalog, copy), head));
        }
    }

    private static string? Flip(Workbench bench, byte[] whole, int bit, string seen)
    {
        byte[] damaged = [.. whole];
        damaged[bit / 8] ^= (byte)(1 << (bit % 8));
        File.WriteAllBytes(bench.Catalog, damaged);
        string now;
        try
        {
            now = WhatAReaderSees(bench.Catalog);
        }
        catch (SqliteException error)
        {
            now = error.Message;
        }

        Ran proof = bench.Run("ledger", "verify");
        RemoveSidecars(bench);
        return proof.Code is not (0 or 4 or 5) ? RecordedLife.Text($"exit {proof.Code}: {proof.Error}")
            : proof.Code == 0 && now != seen ? $"unseen: {Difference(seen, now)}"
            : null;
    }

    /// <summary>Damages rows; where that happened to change nothing, as when two equal rows are exchanged, others are taken.</summary>
    private static string? OfRows(Workbench bench, byte[] whole, string seen, Func<SqliteConnection, string?> damage)
    {
        for (int attempt = 0; attempt < MostAttempts; attempt++)
        {
            File.WriteAllBytes(bench.Catalog, whole);
            string? done;
            using (SqliteConnection connection = RecordedLife.Open(bench.Catalog, SqliteOpenMode.ReadWrite))
            {
                done = RowDamage.BehindTheGuards(connection, () => damage(connection));
            }

            if (WhatAReaderSees(bench.Catalog) != seen)
            {
                return Demand(bench.Run("ledger", "verify"), 5) is { } fault ? $"{done}: {fault}" : null;
            }
        }

        return "nothing could be changed";
    }

    /// <summary>What is gone without a trace is seen with a head, and without one it is said that it cannot be.</summary>
    private static string? Gone(Workbench bench, Action damage, LedgerHead head)
    {
        damage();
        Ran without = bench.Run("ledger", "verify"), with = bench.Run("ledger", "verify", "--head", head.ToString());
        return without.Code != 0 ? RecordedLife.Text($"without a head: exit {without.Code}: {without.Error}")
            : !without.Out.ReplaceLineEndings(" ").Contains("it cannot be seen whether the end of the record was cut off", StringComparison.Ordinal) ? $"without a head it is not said: {without.Out}"
            : with.Code != 5 ? RecordedLife.Text($"with the head: exit {with.Code}: {with.Error}")
            : with.Error.Contains("was cut, or this is an older copy", StringComparison.Ordinal) ? null : with.Error;
    }

    private static string? Demand(Ran ran, int code) => ran.Code == code ? null : RecordedLife.Text($"exit {ran.Code} instead of {code}: {ran.Error}{ran.Out}");

    private static string WhatAReaderSees(string path)
    {
        using SqliteConnection connection = RecordedLife.Open(path, SqliteOpenMode.ReadOnly);
        var lines = new List<string>();
        lines.AddRange(RecordedLife.Strings(connection, "SELECT type || ' ' || name || ' ' || tbl_name || ' ' || coalesce(sql, '') FROM sqlite_schema ORDER BY 1"));

        // The list of schema steps is the migration library's: its keys are proved, and the versions of the library beside them are shown to nobody.
        foreach (string table in RecordedLife.Strings(connection, "SELECT name FROM sqlite_schema WHERE type = 'table' AND name <> '__EFMigrationsHistory' ORDER BY name"))
        {
            lines.Add(table);
            string columns = string.Join(" || '|' || ", RecordedLife.Strings(connection, $"SELECT 'quote(\"' || name || '\")' FROM pragma_table_info('{table.Replace("'", "''", StringComparison.Ordinal)}')"));
            lines.AddRange(RecordedLife.Strings(connection, $"SELECT {columns} FROM \"{table}\" NOT INDEXED"));
        }

        return string.Join('\n', lines);
    }

    private static string Difference(string before, string after)
    {
        string[] one = before.Split('\n'), other = after.Split('\n');
        int at = one.Zip(other).TakeWhile(pair => pair.First == pair.Second).Count();
        return $"{one.ElementAtOrDefault(at)} became {other.ElementAtOrDefault(at)}";
    }

    private static void RemoveSidecars(Workbench bench)
    {
        foreach (string end in (string[])["-wal", "-shm", "-journal"])
        {
            File.Delete(bench.Catalog + end);
        }
    }
}
