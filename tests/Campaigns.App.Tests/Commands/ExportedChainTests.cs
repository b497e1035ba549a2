using System.Buffers.Binary;
using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

/// <summary>The chain of the ledger recomputed from an export alone, by what DEVELOPERS.md says of it and without the program's own code for it.</summary>
public sealed class ExportedChainTests : IDisposable
{
    private const string Zeros = "0000000000000000000000000000000000000000000000000000000000000000";

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Every_hash_of_the_chain_comes_out_of_the_export_alone()
    {
        Live();
        _place.Run("export", "C", "--out", _place.At("out")).Well();
        List<string> faults = Faults(_place.At("out"), out int entries);
        Assert.Empty(faults);

        // The campaign D came between; its entry is left out, and the hash before the next one stands in its place.
        Assert.InRange(entries, 12, 40);
        string[] sequences = Table("ledger.csv").Column("sequence");
        Assert.Contains(sequences.Zip(sequences[1..]), s => int.Parse(s.Second, CultureInfo.InvariantCulture) == int.Parse(s.First, CultureInfo.InvariantCulture) + 2);
        Assert.Contains(Table("ledger_changes.csv").Rows, r => r[3] == "false" && r[5] == "true");
        using var record = JsonDocument.Parse(File.ReadAllText(_place.At("out", "record.json")));
        Assert.Equal(record.RootElement.GetProperty("ledger_head").GetString(), $"{sequences[^1]}:{Table("ledger.csv").Column("hash")[^1]}");
    }

    [Theory]
    [InlineData("ledger.csv", "a further resin", "a better resin")]
    [InlineData("ledger.csv", ",lab,", ",Lab,")]
    [InlineData("ledger_changes.csv", ",first,", ",fisrt,")]
    [InlineData("ledger_changes.csv", ",false,,true,", ",true,,true,")]
    [InlineData("ledger_evidence.csv", ",load,1,", ",load,2,")]
    public void What_is_changed_in_the_export_no_longer_gives_its_hash(string file, string old, string other)
    {
        Live();
        _place.Run("export", "C", "--out", _place.At("out")).Well();
        string text = File.ReadAllText(_place.At("out", file));
        Assert.Contains(old, text, StringComparison.Ordinal);
        _place.Write($"out/{file}", text.Replace(old, other, StringComparison.Ordinal));
        Assert.NotEmpty(Faults(_place.At("out"), out _));
    }

    [Fact]
    public void Reviews_and_withdrawals_go_out_with_what_stood_behind_them()
    {
        Live();
        _place.Run("export", "C", "--out", _place.At("out")).Well();
        CsvText reviews = Table("reviews.csv"), listed = _place.Run("reviews", "C", "--format", "csv").Well().Csv;
        string[] columns = ["plan_version", "files", "rows", "program_version", "ledger_sequence"];
        foreach (string[] line in reviews.Rows)
        {
            Assert.Equal(columns.Select(c => listed.Value(line[0], c)), line[^5..]);
        }

        Assert.Equal(columns, reviews.Columns[^5..]);
        Assert.Equal(["0", "1"], reviews.Column("plan_version").Distinct());
        Assert.Equal(["false", "true"], Table("withdrawals.csv").Column("after_results"));
    }

    /// <summary>A campaign in which everything was done that the ledger has fields for, with names that are guarded on their way out.</summary>
    private void Live()
    {
        _place.Run("start", "C", "--title", "=One").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", "experiment,title,groups\nE1,first,a|b\nE2,,a|b\nE0,never,a|b\n")).Well();
        _place.Run("seal", "C", "--as", "A. Møss").Well();
        _place.Run("withdraw", "C", "E0", "--reason", "=no resin", "--as", "-B").Well();
        _place.Run("start", "D").Well();
        _place.Run("load", "C", _place.Write("week-01.csv", Workplace.TwoExperiments)).Well();
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
        _place.Clock.AdjustTime(Workplace.Now.AddMicroseconds(-1_234_567));
        _place.Run("plan", "C", _place.Write("more.csv", "experiment,title,groups\nE1,\"\",a|b\nE2,\"a, \"\"b\"\"\",a|b\nE3,third,a|b\n"), "--reason", "a further resin").Well();
        _place.Run("withdraw", "C", "E2", "--reason", "torn").Well();
        _place.Run("exclude", "C", "E1", "--line", "2", "--reason", "dropped").Well();
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
    }

    private CsvText Table(string file) => CsvText.Read(File.ReadAllText(_place.At("out", file)));

    /// <summary>Entries whose hash does not come out, or that do not follow the one before.</summary>
    private static List<string> Faults(string folder, out int entries)
    {
        CsvText ledger = Read("ledger.csv");
        ILookup<string, string[]> changes = Read("ledger_changes.csv").Rows.ToLookup(r => r[0]), evidence = Read("ledger_evidence.csv").Rows.ToLookup(r => r[0]);
        var faults = new List<string>();
        (string sequence, string hash) before = ("0", Zeros);
        foreach (string[] e in ledger.Rows)
        {
            string previous = e[11];
            if (Whole(e[0]) == Whole(before.sequence) + 1 && previous != before.hash)
            {
                faults.Add($"{e[0]} does not follow {before.sequence}");
            }

            var bytes = new MemoryStream();
            bytes.WriteByte(0);
            Text(bytes, "campaigns ledger 1");
            Text(bytes, previous);
            Number(bytes, Whole(e[0]));
            Number(bytes, Microseconds(e[1]));
            Text(bytes, e[2]);
            Text(bytes, OrNull(e[3]));
            Text(bytes, e[4]);
            Text(bytes, e[5]);
            Text(bytes, OrNull(e[6]));
            Text(bytes, OrNull(e[7]));
            Text(bytes, OrNull(e[8]));
            Number(bytes, changes[e[0]].Count());
            foreach (string[] c in changes[e[0]].OrderBy(c => Whole(c[1])))
            {
                Text(bytes, c[2]);
                Text(bytes, c[3] == "true" ? c[4] : null);
                Text(bytes, c[5] == "true" ? c[6] : null);
            }

            Number(bytes, evidence[e[0]].Count());
            foreach (string[] d in evidence[e[0]].OrderBy(d => Whole(d[1])))
            {
                Text(bytes, d[2]);
                Number(bytes, Whole(d[3]));
                Number(bytes, Whole(d[4]));
                Number(bytes, Whole(d[5]));
                Text(bytes, d[6]);
            }

            if (Convert.ToHexStringLower(SHA256.HashData(bytes.ToArray())) != e[10])
            {
                faults.Add($"{e[0]} has another hash");
            }

            before = (e[0], e[10]);
        }

        entries = ledger.Rows.Count;
        return faults;

        CsvText Read(string file)
        {
            CsvText read = CsvText.Read(File.ReadAllText(Path.Combine(folder, file)));
            return read with { Rows = [.. read.Rows.Select(r => r.Select(Unguarded).ToArray())] };
        }
    }

    /// <summary>One apostrophe is taken off a text in which, after any number of them, of blanks and of quotes, the sign of a formula stands.</summary>
    private static string Unguarded(string text) => text.StartsWith('\'') && "=+-@".Contains((text.TrimStart('\'', ' ', '"') + " ")[0], StringComparison.Ordinal) ? text[1..] : text;

    private static string? OrNull(string text) => text.Length == 0 ? null : text;

    private static long Whole(string text) => long.Parse(text, CultureInfo.InvariantCulture);

    private static long Microseconds(string at) => (DateTime.Parse(at, CultureInfo.InvariantCulture, DateTimeStyles.AdjustToUniversal) - DateTime.UnixEpoch).Ticks / 10;

    private static void Number(MemoryStream to, long value)
    {
        Span<byte> eight = stackalloc byte[8];
        BinaryPrimitives.WriteInt64LittleEndian(eight, value);
        to.Write(eight);
    }

    private static void Text(MemoryStream to, string? text)
    {
        to.WriteByte((byte)(text is null ? 0 : 1));
        if (text is not null)
        {
            byte[] utf8 = Encoding.UTF8.GetBytes(text);
            Number(to, utf8.Length);
            to.Write(utf8);
        }
    }
}
