using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>T7: every byte of every cell of the ledger is changed through SQL, one after the other, and cells are emptied, lengthened and given other types; each is seen, and the first bad entry is named.</summary>
internal sealed class TamperedCells : TortureTest
{
    private const int Entries = 200;

    public override string Key => "T7";

    public override string What => "every byte of the ledger changed through SQL";

    public override int Full => 60_000;

    public override int Short => 3_000;

    public override void Run(Tally tally, int tries, Random random)
    {
        using var bench = new Workbench();
        RecordedLife.Live(bench, Entries);
        using SqliteConnection memory = RecordedLife.Unguarded(bench.Catalog);
        using Campaigns.Catalog.Catalog catalog = Campaigns.Catalog.Catalog.On(memory, "memory", TimeProvider.System, new Actor("nobody"));
        tally.Try("untouched", () => FirstBad(catalog) is { } bad ? $"entry {bad} is called bad" : null);
        List<Tampering> all = [.. Every(memory, random)];
        int stride = Math.Max(1, all.Count / tries);
        for (int i = random.Next(stride); i < all.Count; i += stride)
        {
            Tampering tampering = all[i];
            tally.Try(tampering.ToString(), () => Fault(memory, catalog, tampering));
        }

        tally.Try("untouched again", () => FirstBad(catalog) is { } bad ? $"entry {bad} is called bad" : null);
    }

    private static string? Fault(SqliteConnection memory, Campaigns.Catalog.Catalog catalog, Tampering tampering)
    {
        long rowId = tampering.RowId;
        long expected = tampering.Sequence;
        if (tampering.Column == "sequence")
        {
            expected = Math.Min(expected, (long)tampering.After!);
            rowId = tampering.Table == "ledger" ? (long)tampering.After! : rowId;
        }

        if (!TrySet(memory, tampering, tampering.RowId, tampering.After))
        {
            // Another row has the key already: the file itself refuses it.
            return null;
        }

        string? bad = FirstBad(catalog);
        TrySet(memory, tampering, rowId, tampering.Before);
        return bad == RecordedLife.Text($"{expected}") ? null : $"the first bad entry is {expected}, named is {bad ?? "none"}";
    }

    private static string? FirstBad(Campaigns.Catalog.Catalog catalog)
    {
        var findings = new Findings();
        using var chain = new ChainProof(catalog, findings);
        findings.Look("The ledger", () => chain.Run(null));
        return findings.InOrder() is [var first, ..] ? first.Sequence is { } sequence ? RecordedLife.Text($"{sequence}") : first.What : null;
    }

    private static bool TrySet(SqliteConnection memory, Tampering tampering, long rowId, object? value)
    {
        using SqliteCommand update = memory.CreateCommand();
        string cell = value is byte[] && tampering.IsTextOfBytes ? "CAST($value AS TEXT)" : "$value";
#pragma warning disable CA2100 // Names of tables and columns of the schema.
        update.CommandText = $"UPDATE {tampering.Table} SET {tampering.Column} = {cell} WHERE rowid = $row";
#pragma warning restore CA2100
        update.Parameters.AddWithValue("$value", value ?? DBNull.Value);
        update.Parameters.AddWithValue("$row", rowId);
        try
        {
            return update.ExecuteNonQuery() == 1;
        }
        catch (SqliteException error) when (error.SqliteErrorCode == SQLitePCL.raw.SQLITE_CONSTRAINT)
        {
            return false;
        }
    }

    private static IEnumerable<Tampering> Every(SqliteConnection memory, Random random)
    {
        foreach (string table in (string[])["ledger", "ledger_changes", "ledger_evidence"])
        {
            using SqliteCommand select = memory.CreateCommand();
#pragma warning disable CA2100 // As above.
            select.CommandText = $"SELECT rowid AS row_number, * FROM {table} ORDER BY sequence";
#pragma warning restore CA2100
            using SqliteDataReader rows = select.ExecuteReader();
            while (rows.Read())
            {
                int first = rows.GetName(1) == "row_number" ? 2 : 1;
                for (int column = first; column < rows.FieldCount; column++)
                {
                    var cell = new Tampering(table, rows.GetName(column), rows.GetInt64(0), rows.GetInt64(rows.GetOrdinal("sequence")), null, null, false);
                    foreach (Tampering one in rows.GetValue(column) switch
                    {
                        long number => OfNumber(cell, number, random),
                        string text => OfText(cell, text, random),
                        _ => [cell with { After = "" }, cell with { After = "x" }],
                    })
                    {
                        yield return one;
                    }
                }
            }
        }
    }

    private static IEnumerable<Tampering> OfNumber(Tampering cell, long number, Random random)
    {
        for (int i = 0; i < 8; i++)
        {
            yield return cell with { Before = number, After = number ^ ((long)random.Next(1, 256) << (8 * i)) };
        }

        if (cell.Column != "sequence")
        {
            yield return cell with { Before = number, After = number + 0.5 };
            yield return cell with { Before = number, After = new byte[] { 1 } };
        }
    }

    private static IEnumerable<Tampering> OfText(Tampering cell, string text, Random random)
    {
        byte[] utf8 = System.Text.Encoding.UTF8.GetBytes(text);
        cell = cell with { Before = utf8, IsTextOfBytes = true };
        for (int i = 0; i < utf8.Length; i++)
        {
            byte[] changed = [.. utf8];
            changed[i] ^= (byte)random.Next(1, 256);
            yield return cell with { After = changed };
        }

        yield return cell with { After = (byte[])[.. utf8, 0] };
        yield return cell with { After = (byte[])[.. utf8, .. "x"u8] };
        if (utf8.Length > 0)
        {
            yield return cell with { After = utf8[..^1] };
        }

        if (cell.Column is "acting_as" or "campaign" or "subject" or "reason" or "before" or "after")
        {
            yield return cell with { After = null };
        }
    }

    /// <summary>One change of one cell.</summary>
    private sealed record Tampering(string Table, string Column, long RowId, long Sequence, object? Before, object? After, bool IsTextOfBytes)
    {
        public override string ToString() => RecordedLife.Text($"{Table}.{Column} of entry {Sequence}: {Shown(Before)} becomes {Shown(After)}");

        private static string Shown(object? value) => value switch { null => "NULL", byte[] bytes => Convert.ToHexStringLower(bytes), _ => RecordedLife.Text($"{value}") };
    }
}
