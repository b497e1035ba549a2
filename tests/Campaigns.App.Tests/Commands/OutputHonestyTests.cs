using System.Globalization;
using System.Text;
using System.Text.Json;
using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Tests.Commands;

/// <summary>Numbers that read back, names that stay harmless, lines that fit, bytes that do not depend on order or culture.</summary>
public sealed class OutputHonestyTests : IDisposable
{
    private static readonly string[] Hostile =
    [
        "=cmd|' /C calc'!A0", "+1+1", "-2+3", "@SUM(A1)", "a,b", "say \"x\"", "semi;colon", "tab\\t", "{0}", "[red]x[/]", "%s", "../../etc", "<script>", "日本語の名前", "e\u0301tude", "'; DROP TABLE campaigns; --",
    ];

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void A_p_value_below_the_range_of_doubles_is_written_in_decimals_and_never_as_nought()
    {
        var text = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < 400; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"E1,a,{(i % 2 == 0 ? "1.0000001" : "0.9999999")}\nE1,b,{(i % 2 == 0 ? "2.0000001" : "1.9999999")}\n");
        }

        Ran run = _place.Run("run", _place.Campaign("C", null, text.ToString())).Well();
        string p = _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E1", "p");
        Assert.Matches(@"^[1-9]\.\d+E-\d{4}$", p);

        // F = 400 * 2 * 0.25 / s2 with s2 = 1e-14 * 800/798 by hand; for large F the tail is close to its power law, so ln p is about -399 ln F.
        double expected = -399 * Math.Log10(200 / (1e-14 * 800 / 798) / 798);
        double power = -double.Parse(p[(p.IndexOf("E-", StringComparison.Ordinal) + 2)..], CultureInfo.InvariantCulture);
        Assert.InRange(power, expected - 3, expected + 3);
        using var json = JsonDocument.Parse(_place.Run("results", "C", "--format", "json").Well().Out);
        Assert.Equal(p, json.RootElement[0].GetProperty("p").GetRawText());
        Assert.Contains($"e-{-power}", run.Out, StringComparison.Ordinal);
        Assert.DoesNotMatch(@"\b0\.0000\b|\b0e|p = 0\b", run.Out + _place.Run("show", "C", "E1").Well().Out);
    }

    [Fact]
    public void Numbers_read_back_as_the_same_doubles_and_none_is_nan_or_infinite()
    {
        _place.Run("run", Workplace.Demo).Well();
        foreach (string[] arguments in (string[][])[["results", "adhesion-screen"], ["survivors", "adhesion-screen"], ["corrections", "adhesion-screen", "--by-experiment"], ["show", "adhesion-screen", "GS-04"], ["risk"]])
        {
            foreach (string field in _place.Run([.. arguments, "--format", "csv"]).Well().Csv.Rows.SelectMany(r => r))
            {
                if (double.TryParse(field, NumberStyles.Float, CultureInfo.InvariantCulture, out double number) && field.Any(char.IsAsciiDigit))
                {
                    Assert.True(double.IsFinite(number), field);
                    Assert.Equal(field, number.ToString("R", CultureInfo.InvariantCulture));
                }
            }
        }
    }

    [Fact]
    public void Hostile_names_stand_exactly_in_files_and_harmlessly_on_screens()
    {
        // The groups of a plan are separated by "|", so names with that sign come with the data alone.
        var plan = new StringBuilder("experiment,title,unit\n");
        var data = new StringBuilder("experiment,group,value\n");
        foreach (string name in Hostile)
        {
            plan.Append(CultureInfo.InvariantCulture, $"{Quoted(name)},{Quoted("T " + name)},{Quoted(name)}\n");
            for (int i = 0; i < 6; i++)
            {
                data.Append(CultureInfo.InvariantCulture, $"{Quoted(name)},{Quoted(i % 2 == 0 ? name + "1" : name + "2")},{i}\n");
            }
        }

        _place.Run("run", _place.Campaign("C", plan.ToString(), data.ToString())).Well();
        string[] stored = [.. Hostile.Select(n => n.Replace("e\u0301", "é", StringComparison.Ordinal))];
        Assert.Equal(stored, _place.Run("results", "C", "--format", "csv").Well().Csv.Column("experiment"));
        using var json = JsonDocument.Parse(_place.Run("results", "C", "--format", "json").Well().Out);
        Assert.Equal(stored, json.RootElement.EnumerateArray().Select(r => r.GetProperty("experiment").GetString()));
        foreach (string name in stored)
        {
            Assert.Equal([name + "1", name + "2"], _place.Run("show", "C", "--format", "csv", "--", name).Well().Csv.Column("group").Order(StringComparer.Ordinal));
            AssertHarmless(_place.Run("show", "C", "--", name).Well().Out);
        }

        string table = _place.Run("results", "C").Well().Out;
        AssertHarmless(table);
        Assert.Contains("[red]x[/]", table, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("\u001b[2J")]
    [InlineData("\u009b2J")]
    [InlineData("\u0007")]
    [InlineData("a\nb")]
    [InlineData("a\u202egpj")]
    [InlineData("a\u2066b")]
    public void Signs_that_command_a_terminal_are_refused_or_escaped(string sign)
    {
        Ran run = _place.Run("run", _place.Campaign("C", null, $"experiment,group,value\n\"{sign}\",a,1\n\"{sign}\",b,2\n\"{sign}\",a,3\n\"{sign}\",b,4\n"));
        AssertHarmless(run.Out + run.Error);
        if (run.Code == 0)
        {
            AssertHarmless(_place.Run("results", "C").Well().Out);
            Assert.Equal([sign], _place.Run("results", "C", "--format", "csv").Well().Csv.Column("experiment"));
        }
        else
        {
            Assert.Equal(3, run.Code);
            Assert.Contains("line", run.Error, StringComparison.Ordinal);
        }

        // What is typed comes back in sentences, too.
        foreach (string[] arguments in (string[][])[[sign], ["results", sign], ["list", "--" + sign], ["list", "--format", sign], ["adjust", sign], ["run", sign], ["list", "--catalog", _place.At("x" + sign)]])
        {
            Ran ran = _place.Run(arguments);
            Assert.InRange(ran.Code, 2, 4);
            AssertHarmless(ran.Out + ran.Error);
        }
    }

    [Theory]
    [InlineData(40)]
    [InlineData(80)]
    [InlineData(120)]
    public void No_line_is_wider_than_the_terminal(int width)
    {
        using var place = new Workplace { Width = width };
        place.Run("run", Workplace.Demo).Well();
        string[][] commands =
        [
            ["run", Workplace.Demo], ["results", "adhesion-screen"], ["survivors", "adhesion-screen"], ["corrections", "adhesion-screen"], ["corrections", "adhesion-screen", "--by-experiment"],
            ["risk"], ["risk", "--pooled"], ["risk", "adhesion-screen", "--curve"], ["bound", "adhesion-screen", "--all-survivors"], ["bound", "adhesion-screen", "--curve"], ["overall", "adhesion-screen"],
            ["list"], ["show", "adhesion-screen"], ["show", "adhesion-screen", "GS-04"], ["show", "adhesion-screen", "GS-48"],
        ];
        foreach (string[] arguments in commands)
        {
            string text = place.Run(arguments).Well().Out;
            Assert.All(text.Split('\n'), line => Assert.True(CellText.Width(line) <= width, $"{string.Join(' ', arguments)}: {line}"));
        }

        string results = place.Run("results", "adhesion-screen").Well().Out;
        Assert.Equal(width < 120, results.Contains("No room for: ", StringComparison.Ordinal));
        Assert.Contains("GS-01 ", results, StringComparison.Ordinal);
        Assert.Contains("0.0002", results, StringComparison.Ordinal);
    }

    [Fact]
    public void Text_is_cut_with_an_ellipsis_and_numbers_never()
    {
        using var place = new Workplace { Width = 60 };
        string file = place.Write("p.csv", $"name,p\n{new string('n', 90)},0.000012345678901234\n");
        string[] lines = place.Run("adjust", file, "--correction", "holm").Well().Out.Split('\n');
        Assert.Contains("…", lines[1], StringComparison.Ordinal);
        Assert.EndsWith(" 1.2e-5", lines[1], StringComparison.Ordinal);
    }

    [Fact]
    public void Terminals_get_a_bold_heading_and_others_nothing_of_the_kind()
    {
        foreach ((bool isTerminal, string variable, string value, bool isStyled) in (ReadOnlySpan<(bool, string, string, bool)>)[
            (true, "TERM", "xterm", true), (true, "NO_COLOR", "1", false), (true, "TERM", "dumb", false), (true, "NO_COLOR", "", true), (false, "TERM", "xterm", false)])
        {
            using var place = new Workplace { IsTerminal = isTerminal };
            place.Variables[variable] = value;
            place.Run("start", "A").Well();
            Assert.Equal(isStyled, place.Run("list").Well().Out.Contains('\u001b'));
            Assert.DoesNotContain('\u001b', place.Run("list", "--format", "csv").Well().Out);
        }
    }

    [Theory]
    [InlineData("de-DE", ",", ".", "-")]
    [InlineData("tr-TR", ",", ".", "-")]
    [InlineData("ar-SA", "\u066b", "\u066c", "\u061c-")]
    [InlineData("fa-IR", "\u066b", "\u066c", "\u200e\u2212")]
    [InlineData("fr-FR", ",", "\u202f", "-")]
    public void The_culture_of_the_thread_changes_no_byte(string name, string mark, string group, string minus)
    {
        string invariant = Everything();
        CultureInfo before = CultureInfo.CurrentCulture;
        try
        {
            // The program runs without culture data, so the signs of the culture are put in by hand.
            var culture = (CultureInfo)CultureInfo.InvariantCulture.Clone();
            culture.NumberFormat = new NumberFormatInfo
            {
                NumberDecimalSeparator = mark,
                NumberGroupSeparator = group,
                NegativeSign = minus,
                PositiveSign = "\u200e+",
                NaNSymbol = name,
            };
            culture.DateTimeFormat.DateSeparator = "٫";
            culture.DateTimeFormat.TimeSeparator = ".";
            CultureInfo.CurrentCulture = CultureInfo.CurrentUICulture = culture;
            Assert.Equal("1" + mark + "5", 1.5.ToString("0.0", null));
            Assert.Equal(invariant, Everything());
        }
        finally
        {
            CultureInfo.CurrentCulture = CultureInfo.CurrentUICulture = before;
        }
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void The_order_of_rows_changes_no_byte_of_the_results(bool isPlanned)
    {
        string[] rows = [.. Directory.GetFiles(Path.Combine(Workplace.Demo, "measurements")).Where(f => !f.EndsWith("week-07.csv", StringComparison.Ordinal)).Order(StringComparer.Ordinal).SelectMany(Tidy)];
        string[] shuffled = [.. rows];
        new Random(4711).Shuffle(shuffled);
        string? plan = isPlanned ? File.ReadAllText(Path.Combine(Workplace.Demo, "plan.csv")) : null;
        Assert.Equal(Results("straight.db", rows), Results("shuffled.db", shuffled));

        string Results(string catalog, string[] lines)
        {
            string folder = _place.Campaign("C", plan, "experiment,group,value\n" + string.Join('\n', lines) + "\n");
            _place.Run("run", folder, "--catalog", _place.At(catalog)).Well();
            CsvText csv = _place.Run("results", "C", "--catalog", _place.At(catalog), "--format", "csv").Well().Csv;
            Assert.True(csv.Rows.Count >= 43);
            return isPlanned ? string.Join('\n', csv.Rows.Select(r => string.Join(',', r))) : string.Join('\n', csv.Rows.Select(r => string.Join(',', r)).Order(StringComparer.Ordinal));
        }
    }

    private static IEnumerable<string> Tidy(string file)
    {
        string[] lines = File.ReadAllLines(file);
        string[] header = lines[0].Split(',');
        int[] places = [Array.IndexOf(header, "experiment"), Array.IndexOf(header, "group"), Array.IndexOf(header, "value")];
        return lines.Skip(1).Select(l => l.Split(',')).Select(f => string.Join(',', places.Select(i => f[i])));
    }

    private static void AssertHarmless(string text) => Assert.All(
        text.EnumerateRunes(),
        rune => Assert.False(rune.Value != '\n' && (Rune.IsControl(rune) || rune.Value is 0x202E or (>= 0x2066 and <= 0x2069)), $"U+{rune.Value:X4} in {text}"));

    private static string Quoted(string name) => "\"" + name.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";

    private static string Everything()
    {
        using var place = new Workplace();
        string p = place.Write("p.csv", "p\n0.0012\n1e-400\n0.5\n");
        string[][] commands =
        [
            ["run", Workplace.Demo], ["results", "adhesion-screen"], ["results", "adhesion-screen", "--format", "csv"], ["results", "adhesion-screen", "--format", "json"],
            ["survivors", "adhesion-screen"], ["corrections", "adhesion-screen"], ["risk"], ["risk", "--format", "csv"],
            ["risk", "adhesion-screen", "--curve"], ["risk", "--pooled"], ["bound", "adhesion-screen", "--all-survivors"], ["bound", "adhesion-screen", "--curve", "--format", "csv"], ["overall", "adhesion-screen", "--format", "json"], ["list"], ["show", "adhesion-screen"],
            ["show", "adhesion-screen", "GS-04"], ["show", "adhesion-screen", "GS-04", "--format", "csv"], ["review", "adhesion-screen", "--family", "tested", "--format", "csv"], ["adjust", p, "--format", "csv"], ["adjust", p],
            ["export", "adhesion-screen", "--out", place.At("out")],
        ];
        string text = string.Concat(commands.Select(c => place.Run(c)).Select(r => r.Code + r.Out + r.Error));
        text += string.Concat(Directory.GetFiles(place.At("out"), "*", SearchOption.AllDirectories).Order(StringComparer.Ordinal).Select(File.ReadAllText));
        return text.Replace(place.Folder, "FOLDER", StringComparison.Ordinal);
    }
}
