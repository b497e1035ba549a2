using System.Globalization;
using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Torture.Incoming;

/// <summary>T15: encodings, line ends, separators and shapes of files, each with its exact outcome: values, or code, line and column of the refusal; and nothing is loaded of a refused file.</summary>
internal sealed class FileForms : TortureTest
{
    private const string Head = "experiment,group,value\n";
    private const string Good = Head + "E1,Größe,1.5\nE1,B,2\n";
    private const string Two = "E1/Größe=1.5 E1/B=2.0";
    private const int ManyRows = 1_000_000;
    private const int HugeField = 16 << 20;

    public override string Key => "T15";

    public override string What => "encodings and shapes of files";

    public override int Full => 60;

    public override int Short => 60;

    public override void Run(Tally tally, int tries, Random random)
    {
        foreach ((string name, byte[] bytes, string outcome) in Cases())
        {
            tally.Try(name, () =>
            {
                string became = Load(bytes);
                return became == outcome ? null : $"became '{became}' instead of '{outcome}'";
            });
        }

        tally.Try("a million rows", () => Load(Many()) is var became && became == FormattableString.Invariant($"{ManyRows} rows") ? null : $"became {became}");
    }

    private static IEnumerable<(string Name, byte[] Bytes, string Outcome)> Cases()
    {
        byte[] utf8 = Encoding.UTF8.GetBytes(Good);
        yield return ("UTF-8", utf8, Two);
        yield return ("UTF-8 with a mark", [0xEF, 0xBB, 0xBF, .. utf8], Two);
        yield return ("UTF-16 little-endian with a mark", [0xFF, 0xFE, .. Encoding.Unicode.GetBytes(Good)], Two);
        yield return ("UTF-16 big-endian with a mark", [0xFE, 0xFF, .. Encoding.BigEndianUnicode.GetBytes(Good)], Two);
        yield return ("UTF-16 without a mark", Encoding.Unicode.GetBytes(Good), "utf16-without-mark@1");
        yield return ("UTF-16 big-endian without a mark", Encoding.BigEndianUnicode.GetBytes(Good), "utf16-without-mark@1");
        yield return ("UTF-16 with half a character at its end", [0xFF, 0xFE, .. Encoding.Unicode.GetBytes(Good), 0x41], "not-utf16@4");
        yield return ("Latin-1", Encoding.Latin1.GetBytes(Good), "not-utf8@2");
        yield return ("a byte that is never UTF-8", [.. utf8, 0xFF], "not-utf8@4");
        yield return ("a longer form than needed", [.. utf8, 0xC0, 0x80], "not-utf8@4");
        yield return ("half a surrogate in UTF-8", [.. utf8, 0xED, 0xA0, 0x80], "not-utf8@4");
        yield return ("beyond Unicode", [.. utf8, 0xF4, 0x90, 0x80, 0x80], "not-utf8@4");
        yield return ("a cut character", [.. utf8, 0xE2, 0x82], "not-utf8@4");
        yield return ("NUL", [.. utf8, 0], "nul-byte@4");
        yield return ("NUL in the first line", Encoding.UTF8.GetBytes("experiment,group\0,value\nE1,A,1\n"), "nul-byte@1");
        yield return ("a workbook", [0x50, 0x4B, 3, 4, .. utf8], "not-text@0");
        yield return ("empty", [], "empty-file@0");
        yield return ("a mark alone", [0xEF, 0xBB, 0xBF], "empty-file@0");
        yield return ("blank lines alone", "\n\n\r\n"u8.ToArray(), "no-rows@0");
        yield return ("a header alone", Encoding.UTF8.GetBytes(Head), "no-rows@0");
        foreach ((string name, string end) in ((string, string)[])[("LF", "\n"), ("CRLF", "\r\n"), ("CR", "\r")])
        {
            yield return ($"lines ended by {name}", Encoding.UTF8.GetBytes(Good.Replace("\n", end, StringComparison.Ordinal)), Two);
            yield return ($"lines ended by {name}, the last one open", Encoding.UTF8.GetBytes(Good.Replace("\n", end, StringComparison.Ordinal).TrimEnd('\r', '\n')), Two);
        }

        yield return ("mixed line ends", "experiment,group,value\r\nE1,Größe,1.5\nE1,B,2\r"u8.ToArray(), Two);
        foreach ((string name, char separator) in ((string, char)[])[("semicolons", ';'), ("tabs", '\t')])
        {
            yield return (name, Encoding.UTF8.GetBytes(Good.Replace(',', separator)), Two);
            yield return ($"{name}, one after the last", Encoding.UTF8.GetBytes(Good.Replace(',', separator).Replace("\n", $"{separator}\n", StringComparison.Ordinal)), Two);
        }

        foreach ((string text, string outcome) in Texts)
        {
            yield return (text.Replace("\n", "|", StringComparison.Ordinal), Encoding.UTF8.GetBytes(text), outcome);
        }

        yield return ("a field of 16 MB", Encoding.UTF8.GetBytes($"{Head}E1,{new string('x', HugeField)},1\n"), "record-too-long@2");
        yield return ("a quoted field of 16 MB", Encoding.UTF8.GetBytes($"{Head}E1,\"{new string('x', HugeField)}\",1\n"), "record-too-long@2");
        yield return ("a header of 16 MB", Encoding.UTF8.GetBytes($"experiment,group,value,{new string('x', HugeField)}\nE1,A,1\n"), "record-too-long@1");
        yield return ("a note of 70 kB", Encoding.UTF8.GetBytes($"experiment,group,value,note\nE1,A,1,{new string('x', 70_000)}\n"), "field-too-long@2:note");
        yield return ("no line end in 16 MB", Encoding.UTF8.GetBytes(new string('x', HugeField)), "record-too-long@1");
    }

    private static readonly (string Text, string Outcome)[] Texts =
    [
        ("sep=;\nexperiment;group;value\nE1;Größe;1.5\nE1;B;2\n", Two),
        ("value,GROUP, Experiment \n1.5,Größe,E1\n2,B,E1\n", Two),
        (Head + Head + "E1,B,2\n", "not-a-number@2:value"),
        ("E1,B,2\nE1,B,3\n", "missing-column@1:experiment missing-column@1:group missing-column@1:value"),
        ("experiment,group\nE1,B\n", "missing-column@1:value"),
        ("experiment,group,value,Value\nE1,B,2,3\n", "duplicate-column@1:value"),
        ("experiment,group,value,note,operator\nE1,Größe,1.5,x,y\nE1,B,2,,\n", Two),
        (Head + "E1,B\n", "too-few-fields@2"),
        (Head + "E1,B,1,5\n", "too-many-fields@2"),
        (Head + "\"E1,B,2\nE1,B,3\n", "open-quote@2"),
        (Head + "E1,B\"x,2\n", "stray-quote@2"),
        (Head + "\"E1\"x,B,2\n", "text-after-quote@2"),
        (Head + ",B,2\n", "empty-name@2:experiment"),
        (Head + "E1,,2\n", "empty-name@2:group"),
        (Head + "E1,\"B\nC\",2\n", "control-character@2:group"),
        (Head + "E1,B\u001B[2J,2\n", "control-character@2:group"),
        (Head + "E1,B\u0085,2\n", "E1/B=2"),
        (Head + "E1,B\u009BX,2\n", "control-character@2:group"),
        (Head + "E1,B,2\n\n\nE1,B,x\n", "not-a-number@5:value"),
        (Head + "E1,\"B, \"\"thin\"\"\",2\n", "E1/B, \"thin\"=2"),
        (Head + "E1,Gro\u0308ße,1.5\nE1,B,2\n", Two),
        ("experiment,group,value,order\nE1,B,2,first\n", "not-an-integer@2:order"),
    ];

    /// <summary>Loads a file into a new catalog, and says what is in it, or why it was refused; a refused file leaves nothing.</summary>
    private static string Load(byte[] bytes)
    {
        using var bench = new Workbench();
        string path = bench.Write("m.csv", bytes);
        using (Catalog.Catalog catalog = Catalog.Catalog.OpenOrCreate(bench.Catalog, bench.Clock))
        {
            new CampaignStore(catalog).Open(new Campaign { Code = "C", ErrorRate = ErrorRate.FalseDiscovery, Level = new SignificanceLevel(0.05), Correction = "bh", OpenedAt = bench.Clock.GetUtcNow() });
            try
            {
                new MeasurementLoader(catalog).Load("C", path, new LoadOptions(DelimitedFileOptions.Default), _ => { }, default);
            }
            catch (RefusedException)
            {
                return catalog.Context.Experiments.Any() || catalog.Context.Measurements.Any() || catalog.Context.Loads.Any() ? "refused, and something was left" : Codes(path);
            }
        }

        string folder = bench.At("out");
        bench.Run("export", "C", "--out", folder);
        List<string[]> rows = [.. File.ReadLines(Path.Combine(folder, "measurements", "measurements.csv")).Skip(1).Take(10).Select(Fields)];
        return bytes.Length > 10_000_000
            ? FormattableString.Invariant($"{File.ReadLines(Path.Combine(folder, "measurements", "measurements.csv")).Count() - 1} rows")
            : string.Join(' ', rows.Select(r => $"{r[0]}/{r[1]}={r[2]}"));
    }

    private static string[] Fields(string line)
    {
        // The export quotes what needs it; the cases above have one such name.
        return line.Contains('"', StringComparison.Ordinal) ? ["E1", "B, \"thin\"", line.Split("\",")[1].Split(',')[0]] : line.Split(',');
    }

    private static string Codes(string path)
    {
        using MeasurementFile file = MeasurementFile.Open(path, DelimitedFileOptions.Default);
        while (file.Read(out _))
        {
        }

        return string.Join(' ', file.Problems.Kept.Select(p => FormattableString.Invariant($"{p.Code}@{p.Line}{(p.Column.Length > 0 ? ":" + p.Column : "")}")));
    }

    private static byte[] Many()
    {
        var text = new StringBuilder(Head, ManyRows * 16);
        for (int i = 0; i < ManyRows; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"E{i / 100},{(char)('A' + (i % 4))},{i % 97}.5\n");
        }

        return Encoding.UTF8.GetBytes(text.ToString());
    }
}
