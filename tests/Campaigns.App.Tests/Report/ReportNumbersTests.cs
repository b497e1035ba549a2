using System.Globalization;
using System.Text.Json;
using AngleSharp.Dom;
using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Report;

/// <summary>Every number of a report is the one that the commands give, to the last bit.</summary>
public sealed class ReportNumbersTests(ShippedReports shipped) : IClassFixture<ShippedReports>
{
    public static TheoryData<string> Shipped => [.. ShippedReports.Codes];

    [Theory]
    [MemberData(nameof(Shipped))]
    public void The_results_are_those_of_the_catalog(string code)
    {
        ReadTable table = shipped.Page(code).Table("results", "Results");
        CsvText csv = shipped.Csv("results", code);
        Same(csv, table, ("experiment", "experiment"), ("test", "test"), ("groups", "groups"), ("observations", "values"), ("statistic", "statistic"), ("df1", "df1"), ("p", "p"), ("adjusted_p", "adjusted p"), ("eta_squared", "eta squared"), ("status", "status"), ("title", "title"));
        Assert.Equal(csv.Column("survives").Select(YesNo), table.Column("survives"));
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Survivors_and_what_is_claimed_inside_them_are_those_of_the_catalog(string code)
    {
        CsvText survivors = shipped.Csv("survivors", code);
        Same(survivors, shipped.Page(code).Table("survivors", "Survivors"), ("experiment", "experiment"), ("p", "p"), ("adjusted_p", "adjusted p"), ("highest_group", "highest"), ("lowest_group", "lowest"), ("difference", "gap"), ("unit", "unit"),
            ("selected_lower", "selected lower"), ("selected_upper", "selected upper"), ("eta_squared", "eta squared"), ("eta_squared_lower", "eta squared lower"), ("eta_squared_upper", "eta squared upper"));
        CsvText comparisons = shipped.Csv("comparisons", code);
        int claimed = comparisons.Column("survives").Count(s => s == "true");
        if (claimed == 0)
        {
            Assert.DoesNotContain(shipped.Page(code).Section("survivors").QuerySelectorAll("caption"), c => c.TextContent.StartsWith("Comparisons", StringComparison.Ordinal));
            return;
        }

        string[] order = survivors.Column("experiment");
        ReadTable table = shipped.Page(code).Table("survivors", "Comparisons claimed");
        int[] kept = [.. Enumerable.Range(0, comparisons.Rows.Count).Where(i => comparisons.Column("survives")[i] == "true").OrderBy(i => Array.IndexOf(order, comparisons.Rows[i][0]))];
        foreach ((string column, string heading) in new[] { ("experiment", "experiment"), ("group_a", "group a"), ("group_b", "group b"), ("difference", "b - a"), ("lower", "lower"), ("upper", "upper"), ("p", "p"), ("adjusted_p", "adjusted p"), ("selected_lower", "selected lower"), ("selected_upper", "selected upper") })
        {
            Assert.Equal(kept.Select(i => comparisons.Column(column)[i]), table.Column(heading));
        }
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void The_page_names_the_survivors_and_by_how_much_with_the_intervals_of_the_catalog(string code)
    {
        CsvText survivors = shipped.Csv("survivors", code), comparisons = shipped.Csv("comparisons", code);
        ReadTable page = shipped.Page(code).Table("summary", "What survives");
        Assert.InRange(page.Rows.Count, Math.Min(9, survivors.Rows.Count), survivors.Rows.Count);
        for (int i = 0; i < page.Rows.Count; i++)
        {
            string experiment = survivors.Column("experiment")[i];
            Assert.StartsWith(experiment, page.Column("experiment")[i], StringComparison.Ordinal);
            Assert.Equal(survivors.Column("adjusted_p")[i], page.Column("adjusted p")[i]);
            string[][] claimed = [.. comparisons.Rows.Where(r => r[0] == experiment && r[Array.IndexOf(comparisons.Columns, "survives")] == "true")];
            string[]? leading = claimed.MaxBy(r => Math.Abs(CsvText.Number(r[Array.IndexOf(comparisons.Columns, "difference")])));
            string Of(string column) => leading![Array.IndexOf(comparisons.Columns, column)];
            Assert.Equal(leading is null ? survivors.Column("difference")[i] : Of("difference"), page.Column("difference")[i]);
            Assert.Equal(leading is null ? survivors.Column("selected_lower")[i] : Of("selected_lower"), page.Column("from")[i]);
            Assert.Equal(leading is null ? survivors.Column("selected_upper")[i] : Of("selected_upper"), page.Column("to")[i]);
            Assert.Contains(leading is null ? "no pair claimed" : $"{Of("group_b")} less {Of("group_a")}", page.Column("largest difference claimed")[i], StringComparison.Ordinal);
        }
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Corrections_and_risk_are_those_of_the_catalog(string code)
    {
        ReadPage page = shipped.Page(code);
        Same(shipped.Csv("corrections", code), page.Table("corrections", "Survivors under"), ("correction", "key"), ("name", "name"), ("survivors", "survivors"), ("level", "level"), ("family_size", "family"));
        CsvText risk = shipped.Csv("risk", code);
        foreach ((string column, string name) in new[]
        {
            ("tests", "Tests"), ("expected_false_positives", "Expected false"), ("risk_independent", "Risk"), ("risk_at_least", "At least"), ("risk_at_most", "At most"),
            ("uncorrected_hits", "Hits"), ("survivors", "Survive"), ("false_survivors_at_most", "False at most"),
        })
        {
            Assert.Equal(risk.Column(column)[0], page.Fact("risk", name));
        }
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Every_experiment_in_full_shows_the_groups_tests_effects_and_comparisons_of_the_catalog(string code)
    {
        ReadPage page = shipped.Page(code);
        foreach (string experiment in shipped.Csv("results", code).Rows.Where(r => r[3] != "0").Select(r => r[0]))
        {
            using JsonDocument json = JsonDocument.Parse(shipped.Place.Run("show", code, experiment, "--format", "json").Well().Out);
            JsonElement shown = json.RootElement;
            Same(shown, "groups", Table(page, $"{experiment}: groups"), ("group", "group"), ("n", "n"), ("mean", "mean"), ("lower", "lower"), ("upper", "upper"));
            Same(shown, "variation", Table(page, $"{experiment}: table of variation"), ("source", "source"), ("sum_of_squares", "sum of squares"), ("df", "df"), ("mean_square", "mean square"), ("f", "F"));
            Same(shown, "tests", Table(page, $"{experiment}: test"), ("statistic", "statistic"), ("p", "p"));
            Same(shown, "effects", Table(page, $"{experiment}: effects"), ("effect", "effect"), ("value", "value"), ("lower", "lower"), ("upper", "upper"));
            Same(shown, "comparisons", Table(page, $"{experiment}: comparisons"), ("group_a", "group a"), ("group_b", "group b"), ("difference", "b - a"), ("lower", "lower"), ("upper", "upper"), ("p", "p"), ("adjusted_p", "adjusted p"));
            foreach (JsonElement check in shown.GetProperty("checks").EnumerateArray())
            {
                Assert.Contains(page.Section("in-full").QuerySelectorAll("li"), li => li.TextContent.Contains(check.GetProperty("saw").GetString()!, StringComparison.Ordinal));
            }
        }
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Files_seal_and_head_are_those_of_the_catalog(string code)
    {
        ReadPage page = shipped.Page(code);
        CsvText show = shipped.Csv("show", code);
        Assert.Contains($"is the one that the seal stored: {show.Column("plan_digest")[0]}", page.Section("plan").TextContent, StringComparison.Ordinal);
        Assert.Equal(show.Column("ledger_head")[0], page.Fact("record", "Head of the ledger"));
        Assert.Contains(show.Column("ledger_head")[0], page.Section("summary").TextContent, StringComparison.Ordinal);
        ReadTable files = page.Table("files", "Loaded files");
        string[] on = [.. Directory.GetFiles(Path.Combine(Workplace.Repository(), "campaigns", code, "measurements")).Order(StringComparer.Ordinal)];
        Assert.Equal(on.Select(f => Path.GetFileName(f)).Order(StringComparer.Ordinal), files.Column("file").Order(StringComparer.Ordinal));
        Assert.Equal(on.Select(f => Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(File.ReadAllBytes(f)))).Order(StringComparer.Ordinal), files.Column("SHA-256").Order(StringComparer.Ordinal));
        Assert.Equal(show.Column("rows_loaded")[0], files.Column("rows").Sum(r => long.Parse(r, CultureInfo.InvariantCulture)).ToString(CultureInfo.InvariantCulture));
        Assert.All(files.Column("by"), by => Assert.Equal(Workplace.Account, by));
        Assert.Equal(shipped.Csv("ledger", code).Rows.Count.ToString(CultureInfo.InvariantCulture), page.Fact("record", "Entries about this campaign"));
    }

    [Fact]
    public void What_is_shown_of_a_number_is_the_exact_one_rounded()
    {
        foreach (IElement cell in shipped.Page("adhesion-screen").Document.QuerySelectorAll("[data-value]"))
        {
            double exact = CsvText.Number(cell.GetAttribute("data-value")!), shown = CsvText.Number(cell.TextContent);
            Assert.True(Math.Abs(exact - shown) <= 5.1e-3 * Math.Abs(exact) + 5e-5, $"{cell.TextContent} for {exact:R}");
        }
    }

    private static string YesNo(string word) => word switch { "true" => "yes", "false" => "no", _ => "" };

    private static ReadTable? Table(ReadPage page, string caption) =>
        page.Section("in-full").QuerySelectorAll("table").FirstOrDefault(t => t.QuerySelector("caption")!.TextContent is var c && (c == caption || c.StartsWith(caption + ",", StringComparison.Ordinal))) is { } found ? ReadTable.Of(found) : null;

    private static void Same(CsvText csv, ReadTable table, params (string Column, string Heading)[] pairs)
    {
        foreach ((string column, string heading) in pairs.Where(c => table.Headings.Contains(c.Heading) || csv.Column(c.Column).Any(v => v.Length > 0)))
        {
            Assert.Equal(csv.Column(column), table.Column(heading));
        }
    }

    /// <summary>A column without any value is left out of the page.</summary>
    private static void Same(JsonElement shown, string part, ReadTable? table, params (string Name, string Heading)[] pairs)
    {
        JsonElement[] rows = [.. shown.GetProperty(part).EnumerateArray()];
        Assert.Equal(rows.Length, table?.Rows.Count ?? 0);
        foreach ((string name, string heading) in pairs)
        {
            string[] values = [.. rows.Select(r => r.GetProperty(name) is { ValueKind: not JsonValueKind.Null } v ? v.ToString() : "")];
            if (values.Any(v => v.Length > 0) || (table?.Headings.Contains(heading) ?? false))
            {
                Assert.Equal(values.Select(Number), table!.Column(heading).Select(Number));
            }
        }
    }

    private static string Number(string text) => double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out double number) ? number.ToString("R", CultureInfo.InvariantCulture) : text;
}
