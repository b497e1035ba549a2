namespace Campaigns.App.Tests.Commands;

public sealed class OverallVerbTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Rows_follow_the_definitions_on_the_printed_p_values()
    {
        _place.Run("run", Workplace.Demo).Well();
        CsvText overall = Csv("overall", "adhesion-screen");
        Assert.Equal(["test", "statistic", "p", "assumes", "source"], overall.Columns[..5]);
        Assert.Equal(["simes-any", "simes", "cauchy", "fisher", "stouffer"], overall.Column("test"));
        double[] p = [.. Csv("results", "adhesion-screen").Column("p").Where(t => t.Length > 0).Select(CsvText.Number).Order()];

        // Simes (1986) over the 48 planned; Fisher (1932) over the 46 tested, its tail with 92 degrees of freedom as a finite sum (Abramowitz and Stegun 1964, 26.4.21); Liu and Xie (2020) as a mean of tangents.
        double simes = p.Select((v, i) => 48 * v / (i + 1)).Min();
        Assert.Equal(simes, Value(overall, "simes", "p"), 1e-12 * simes);
        Assert.Equal(simes * Enumerable.Range(1, 48).Sum(k => 1.0 / k), Value(overall, "simes-any", "p"), 1e-12 * simes);
        double x = -p.Sum(Math.Log);
        Assert.Equal(2 * x, Value(overall, "fisher", "statistic"), 1e-10);
        double term = 1;
        double sum = 1;
        for (int k = 1; k < 46; k++)
        {
            term *= x / k;
            sum += term;
        }

        Assert.Equal(1, Value(overall, "fisher", "p") / (sum * Math.Exp(-x)), 1e-10);
        Assert.Equal(1, Value(overall, "cauchy", "statistic") / (p.Sum(v => Math.Tan((0.5 - v) * Math.PI)) / 46), 1e-6);
        Assert.Equal(["48", "48", "46", "46", "46"], overall.Column("experiments"));
    }

    [Fact]
    public void People_are_told_that_it_supports_no_single_experiment_and_what_enters()
    {
        _place.Run("run", Workplace.Demo).Well();
        string text = _place.Run("overall", "adhesion-screen").Well().Out.ReplaceLineEndings(" ");
        Assert.Contains("It supports no single experiment", text, StringComparison.Ordinal);
        Assert.Contains("Simes' tests count all 48 planned ones, the untested as p = 1; the others take the 46 tested ones alone", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Without_a_result_the_reason_stands_in_place_of_a_p_value()
    {
        _place.Run("start", "NEW").Well();
        CsvText overall = Csv("overall", "NEW");
        Assert.All(overall.Column("p"), Assert.Empty);
        Assert.All(overall.Column("reason"), reason => Assert.Equal("no experiment has a p-value yet", reason));
        Assert.Contains("No p-value by", _place.Run("overall", "NEW").Well().Out, StringComparison.Ordinal);
    }

    private static double Value(CsvText csv, string test, string column) => CsvText.Number(csv.Value(test, column));

    private CsvText Csv(params string[] arguments) => _place.Run([.. arguments, "--format", "csv"]).Well().Csv;
}
