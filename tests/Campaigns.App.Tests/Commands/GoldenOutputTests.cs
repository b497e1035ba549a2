using System.Globalization;
using System.Text.RegularExpressions;
using Campaigns.App.Tests.Dashboard;

namespace Campaigns.App.Tests.Commands;

/// <summary>What people read of the demo at a width of 100, kept beside the tests (CAMPAIGNS_UPDATE_GOLDEN=1 writes it anew), and its numbers held against those of the files for scripts.</summary>
public sealed partial class GoldenOutputTests : IDisposable
{
    private readonly Workplace _place = new();
    private readonly string _run;

    public GoldenOutputTests() => _run = _place.Run("run", Workplace.Demo).Well().Out;

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Run()
    {
        Golden.Match("run", _run);
        AssertRows(_run, Csv("survivors", "adhesion-screen"), "p", "adjusted_p", "difference");
    }

    [Fact]
    public void Results() => AssertRows(Kept("results", "results", "adhesion-screen"), Csv("results", "adhesion-screen"), "statistic", "df1", "df2", "p", "adjusted_p");

    [Fact]
    public void Survivors() => AssertRows(Kept("survivors", "survivors", "adhesion-screen"), Csv("survivors", "adhesion-screen"), "p", "adjusted_p", "difference");

    [Fact]
    public void Corrections() => AssertRows(Kept("corrections", "corrections", "adhesion-screen"), Csv("corrections", "adhesion-screen"), "survivors");

    [Fact]
    public void Risk() => AssertRows(
        Kept("risk", "risk"), Csv("risk"), "tests", "level", "expected_false_positives", "risk_independent", "risk_at_least", "risk_at_most", "uncorrected_hits", "survivors");

    [Fact]
    public void Risk_curve() => Golden.Match("risk-curve", _place.Run("risk", "adhesion-screen", "--curve", "--top", "3").Well().Out);

    [Fact]
    public void Bound()
    {
        string text = Kept("bound", "bound", "adhesion-screen", "GS-09", "GS-04", "GS-30", "GS-48");
        CsvText csv = Csv("bound", "adhesion-screen", "GS-09", "GS-04", "GS-30", "GS-48");
        string line = text.Split('\n').Single(l => l.StartsWith(' '));
        Assert.All(new[] { "marked", "real_at_least", "false_at_most", "confidence", "level", "family_size" }, column => Assert.True(Shows(line, csv.Numbers(column)[0]), $"{column}: {line}"));
    }

    [Fact]
    public void Overall() => AssertRows(Kept("overall", "overall", "adhesion-screen"), Csv("overall", "adhesion-screen"), "statistic", "p", "experiments");

    [Fact]
    public void List() => AssertRows(Kept("list", "list"), Csv("list"), "level", "experiments", "tested", "survivors");

    [Fact]
    public void Show()
    {
        string text = Kept("show", "show", "adhesion-screen");
        CsvText csv = Csv("show", "adhesion-screen");
        foreach (string fact in (string[])["level", "experiments", "tested", "survivors"])
        {
            Assert.Contains(text.Split('\n'), line => line.StartsWith(fact + "  ", StringComparison.Ordinal) && Shows(line, csv.Numbers(fact)[0]));
        }
    }

    [Fact]
    public void Show_experiment()
    {
        string text = Kept("show-experiment", "show", "adhesion-screen", "GS-04");
        CsvText csv = Csv("show", "adhesion-screen", "GS-04");
        AssertRows(text, csv, "n", "mean", "standard_deviation", "standard_error", "lower", "upper");
        (string Line, string[] Columns)[] table =
        [
            ("between groups", ["between_sum_of_squares", "between_mean_square", "df1", "statistic", "p"]), ("within groups", ["within_sum_of_squares", "within_mean_square", "df2"]), ("total", ["total_sum_of_squares"]),
            ("p = ", ["p", "adjusted_p"]), ("eta squared", ["eta_squared"]), ("omega squared", ["omega_squared"]), ("Residual", ["residual_standard_deviation"]),
        ];
        foreach ((string start, string[] columns) in table)
        {
            string line = text.Split('\n').Single(l => l.StartsWith(start, StringComparison.Ordinal));
            Assert.All(columns, column => Assert.True(Shows(line, csv.Numbers(column)[0]), $"{column}: {line}"));
        }
    }

    private string Kept(string name, params string[] arguments)
    {
        string text = _place.Run(arguments).Well().Out;
        Golden.Match(name, text);
        return text;
    }

    private CsvText Csv(params string[] arguments) => _place.Run([.. arguments, "--format", "csv"]).Well().Csv;

    /// <summary>Every row of the file stands in the table, and its numbers read back within half a unit of the last digit shown.</summary>
    private static void AssertRows(string text, CsvText csv, params string[] columns)
    {
        string[] lines = text.Split('\n');
        Assert.NotEmpty(csv.Rows);
        foreach (string[] row in csv.Rows)
        {
            string line = lines.First(l => l.StartsWith(row[0] + " ", StringComparison.Ordinal));
            foreach (string field in columns.Select(c => row[Array.IndexOf(csv.Columns, c)]).Where(f => f.Length > 0))
            {
                Assert.True(Shows(line[row[0].Length..], CsvText.Number(field)), $"{field} is not in: {line}");
            }
        }
    }

    private static bool Shows(string line, double value) => NumberPattern().Matches(line).Any(match =>
    {
        string shown = match.Value;
        int exponent = shown.IndexOf('e', StringComparison.Ordinal) is >= 0 and int e ? int.Parse(shown[(e + 1)..], CultureInfo.InvariantCulture) : 0;
        string digits = shown.Split('e')[0];
        int decimals = digits.Contains('.', StringComparison.Ordinal) ? digits.Length - digits.IndexOf('.', StringComparison.Ordinal) - 1 : 0;
        return Math.Abs(CsvText.Number(shown) - value) <= 0.5000001 * Math.Pow(10, exponent - decimals);
    });

    [GeneratedRegex(@"(?<![\w.+-])-?\d+(\.\d+)?(e-?\d+)?(?![\w])")]
    private static partial Regex NumberPattern();
}
