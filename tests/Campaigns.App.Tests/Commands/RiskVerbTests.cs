using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Tests.Commands;

public sealed class RiskVerbTests : IDisposable
{
    private readonly Workplace _place = new() { Width = 80 };

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Further_columns_follow_those_that_scripts_know()
    {
        _place.Run("run", Workplace.Demo).Well();
        CsvText risk = Csv("risk", "adhesion-screen");
        Assert.Equal(
            ["campaign", "tests", "level", "expected_false_positives", "risk_independent", "risk_at_least", "risk_at_most", "uncorrected_hits", "survivors", "correction", "guarantee", "true_null_share", "expected_false_survivors", "false_survivors_at_most"],
            risk.Columns[..14]);

        // Storey (2002) from the printed results: W of the 46 p-values above one half, W / 23 of them true nulls, each with a chance of the largest surviving p.
        CsvText results = Csv("results", "adhesion-screen");
        (double P, string Survives)[] tested = [.. results.Rows.Where(r => r[Array.IndexOf(results.Columns, "p")].Length > 0).Select(r => (CsvText.Number(r[Array.IndexOf(results.Columns, "p")]), r[Array.IndexOf(results.Columns, "survives")]))];
        int above = tested.Count(t => t.P > 0.5);
        Assert.Equal(above / 23.0, risk.Numbers("true_null_share").Single(), 1e-15);
        Assert.Equal(2 * above * tested.Where(t => t.Survives == "true").Max(t => t.P), risk.Numbers("expected_false_survivors").Single(), 1e-12);
        Assert.Equal(Csv("bound", "adhesion-screen", "--all-survivors").Numbers("false_at_most"), risk.Numbers("false_survivors_at_most"));

        // Benjamini and Hochberg over 48, 46 of them tested, nothing real: exactly 46/48 of the level.
        Assert.Equal(0.05 * 46 / 48, risk.Numbers("corrected_risk").Single(), 1e-15);
        Assert.Equal("exact", risk.Column("corrected_risk_is").Single());
    }

    [Fact]
    public void The_curve_follows_the_order_of_testing_and_ends_at_the_risk_of_the_campaign()
    {
        _place.Run("start", "LATER").Well();
        _place.Run("plan", "LATER", _place.Write("plan.csv", "experiment,replicates\nA,2\nB,2\nC,2\nD,2\n")).Well();
        _place.Run("seal", "LATER").Well();
        _place.Run("load", "LATER", _place.Write("first.csv", "experiment,group,value\nC,x,1\nC,x,2\nC,y,11\nC,y,12.5\nD,x,1\nD,x,2\nD,y,1.2\nD,y,2.1\n")).Well();
        _place.Run("test", "LATER").Well();
        _place.Run("load", "LATER", _place.Write("second.csv", "experiment,group,value\nA,x,1\nA,x,2\nA,y,1\nA,y,2.5\n")).Well();
        _place.Run("test", "LATER").Well();
        CsvText curve = Csv("risk", "LATER", "--curve");
        Assert.Equal(["C", "D", "A"], curve.Column("experiment"));
        Assert.Equal([1, 2, 3], curve.Numbers("tests"));
        Assert.Equal(["1", "1", "2"], curve.Column("test_run"));

        // 1 - 0.95^k by hand.
        double[] byHand = [0.05, 0.0975, 0.142625];
        Assert.All(curve.Numbers("risk_independent").Zip(byHand), pair => Assert.Equal(pair.Second, pair.First, 1e-15));
        CsvText risk = Csv("risk", "LATER");
        foreach (string column in (string[])["risk_independent", "risk_at_least", "risk_at_most", "expected_false_positives", "uncorrected_hits", "survivors", "corrected_risk"])
        {
            Assert.Equal(risk.Column(column).Single(), curve.Column(column)[^1]);
        }
    }

    [Fact]
    public void The_picture_fits_eighty_columns_and_shows_the_numbers_of_its_rows()
    {
        _place.Run("run", Workplace.Demo).Well();
        string text = _place.Run("risk", "adhesion-screen", "--curve").Well().Out;
        Assert.All(text.Split('\n'), line => Assert.True(CellText.Width(line) <= 80, line));
        CsvText curve = Csv("risk", "adhesion-screen", "--curve");
        string[] picture = [.. text.Split('\n').Skip(1).TakeWhile(l => !l.Contains('┬', StringComparison.Ordinal))];
        Assert.Equal(15, picture.Length);
        foreach (string line in picture)
        {
            string[] words = line.Split(' ', StringSplitOptions.RemoveEmptyEntries);
            int row = int.Parse(words[0], System.Globalization.CultureInfo.InvariantCulture) - 1;
            Assert.Equal(100 * curve.Numbers("risk_independent")[row], CsvText.Number(words[^2]), 0.00501);
            Assert.Equal(100 * curve.Numbers("corrected_risk")[row], CsvText.Number(words[^1]), 0.00501);
        }

        Assert.StartsWith("1", picture[0].TrimStart(), StringComparison.Ordinal);
        Assert.StartsWith("46", picture[^1].TrimStart(), StringComparison.Ordinal);
        string ascii = _place.Run("risk", "adhesion-screen", "--curve", "--ascii").Well().Out;
        Assert.DoesNotContain(ascii.Split("\n\n")[0], c => c > '~');
        Assert.Equal(text.Split('\n').Length, ascii.Split('\n').Length);
    }

    [Fact]
    public void A_campaign_with_nothing_tested_has_an_empty_curve()
    {
        _place.Run("start", "NEW").Well();
        Assert.Contains("No experiment has a result yet.", _place.Run("risk", "NEW", "--curve").Well().Out, StringComparison.Ordinal);
        Assert.Empty(Csv("risk", "NEW", "--curve").Rows);
        Assert.Equal("0", Csv("risk", "NEW").Column("corrected_risk").Single());
    }

    [Fact]
    public void Pooled_campaigns_are_corrected_as_one_family()
    {
        _place.Run("run", Workplace.Demo).Well();
        _place.Run("run", Path.Combine(Workplace.Repository(), "campaigns", "published-classics")).Well();
        CsvText pooled = Csv("risk", "--pooled", "--correction", "holm", "--level", "0.01");
        Assert.Equal(["adhesion-screen", "published-classics", "programme"], pooled.Column("campaign"));

        // The same p-values in one file, corrected by the command that knows no campaigns.
        string[] all = [.. Csv("results", "adhesion-screen").Column("p"), .. Csv("results", "published-classics").Column("p")];
        CsvText adjusted = Csv("adjust", _place.Write("all.csv", "p,row\n" + string.Concat(all.Select((p, i) => FormattableString.Invariant($"{p},{i}\n")))), "--correction", "holm");
        int[] survive = [.. adjusted.Column("holm").Select(a => a.Length > 0 && CsvText.Number(a) <= 0.01 ? 1 : 0)];
        Assert.Equal([survive.Take(48).Sum(), survive.Skip(48).Sum(), survive.Sum()], pooled.Numbers("pooled_survivors").Select(n => (int)n));
        Assert.All(pooled.Rows, row => Assert.Equal(
            CsvText.Number(row[Array.IndexOf(pooled.Columns, "survivors")]) + CsvText.Number(row[Array.IndexOf(pooled.Columns, "gained")]) - CsvText.Number(row[Array.IndexOf(pooled.Columns, "lost")]),
            CsvText.Number(row[Array.IndexOf(pooled.Columns, "pooled_survivors")])));
        Assert.Contains("An exploration", _place.Run("risk", "--pooled").Well().Out, StringComparison.Ordinal);
        Assert.Contains("--pooled", _place.Run("risk").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void Options_that_do_not_go_together_are_refused()
    {
        _place.Run("start", "A").Well();
        _place.Run("risk", "--curve").Refused(2, "--curve shows the tests of one campaign");
        _place.Run("risk", "A", "--pooled").Refused(2, "--pooled takes the experiments of all campaigns");
        _place.Run("risk", "A", "--correction", "holm").Refused(2, "belong to --pooled");
        _place.Run("risk", "--pooled", "--correction", "hulm").Refused(2, "did you mean 'holm'?");
    }

    private CsvText Csv(params string[] arguments) => _place.Run([.. arguments, "--format", "csv"]).Well().Csv;
}
