using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

public sealed class AdjustOnlineTests : IDisposable
{
    private static readonly string[] Stream =
        ["0.21", "0.0003", "0.74", "0.018", "0.00009", "0.5", "0.25", "0.0021", "0.98", "0.36", "0.0000007", "0.044", "0.0011", "0.61", "0.29", "1", "0", "0.0049", "0.083", "0.00052"];

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    private string Column(params IEnumerable<string> p) => _place.Write("p.csv", $"p\n{string.Join('\n', p)}\n");

    [Fact]
    public void Every_stream_of_the_reference_comes_out_of_the_command()
    {
        string file = Column(Stream);
        string[] lines = [.. File.ReadLines(Path.Combine(Workplace.Repository(), "tests", "reference", "campaign", "online_traces.csv")).Where(l => !l.StartsWith('#'))];
        IGrouping<string, string[]>[] streams = [.. lines.Skip(1).Select(l => l.Split(',')).GroupBy(r => string.Join(',', r[..6]))];
        Assert.True(streams.Length > 100, $"{streams.Length} streams");
        foreach (IGrouping<string, string[]> stream in streams)
        {
            string[][] rows = [.. stream];
            string[] settings = rows[0];
            List<string> typed = ["adjust", file, "--correction", settings[0], "--shape", settings[1], "--horizon", settings[2].Length > 0 ? settings[2] : "none", "--format", "csv"];
            foreach ((string name, string value) in new[] { ("--initial-wealth", settings[3]), ("--lambda", settings[4]), ("--tau", settings[5]) }.Where(o => o.Item2.Length > 0))
            {
                typed.AddRange([name, value]);
            }

            CsvText csv = _place.Run([.. typed]).Well().Csv;
            Assert.Equal(["p", settings[0] + "_level", settings[0] + "_survives"], csv.Columns);
            Assert.Equal(rows.Select(r => r[9] == "1" ? "true" : "false"), csv.Column(settings[0] + "_survives"));
            double[] levels = csv.Numbers(settings[0] + "_level");
            for (int t = 0; t < rows.Length; t++)
            {
                double expected = CsvText.Number(rows[t][8]);
                Assert.True(Math.Abs(levels[t] - expected) <= 1e-15 * expected, $"{stream.Key} {t + 1}: {levels[t]:R} for {expected:R}");
            }
        }
    }

    [Fact]
    public void Batch_and_online_columns_stand_in_the_order_of_the_keys()
    {
        CsvText csv = _place.Run("adjust", Column(Stream), "--correction", "saffron,bh,lond", "--format", "csv").Well().Csv;
        Assert.Equal(["p", "saffron_level", "saffron_survives", "bh", "lond_level", "lond_survives"], csv.Columns);

        using JsonDocument json = JsonDocument.Parse(_place.Run("adjust", Column(Stream), "--correction", "saffron,bh,lond", "--format", "json").Well().Out);
        JsonElement second = json.RootElement[1];
        Assert.Equal(JsonValueKind.True, second.GetProperty("saffron_survives").ValueKind);
        Assert.Equal(csv.Numbers("lond_level")[1], second.GetProperty("lond_level").GetDouble());
    }

    [Fact]
    public void Without_a_choice_no_online_procedure_runs()
    {
        CsvText csv = _place.Run("adjust", Column(Stream), "--format", "csv").Well().Csv;
        Assert.DoesNotContain(csv.Columns, c => c.EndsWith("_level", StringComparison.Ordinal));
        _place.Run("adjust", Column(Stream), "--shape", "jm").Refused(2, "--shape belongs to alpha-spending", "lord", "no such procedure is chosen");
    }

    [Fact]
    public void The_usual_horizon_is_the_rows_of_the_file_and_a_row_without_p_takes_no_step()
    {
        Ran ran = _place.Run("adjust", Column("0.5", "NA", "0.001", ""), "--correction", "alpha-spending", "--shape", "uniform", "--format", "csv").Well();
        Assert.Equal(["0.5", "NA", "0.001"], ran.Csv.Column("p"));
        Assert.Equal(["0.016666666666666666", "", "0.016666666666666666"], ran.Csv.Column("alpha-spending_level"));
        Assert.Equal(["false", "", "true"], ran.Csv.Column("alpha-spending_survives"));
        Assert.Contains("1 row has no p-value. In an online procedure it takes no step, and its cells stay empty.", ran.Error, StringComparison.Ordinal);

        CsvText larger = _place.Run("adjust", Column("0.5", "0.001"), "--correction", "alpha-spending,bonferroni", "--shape", "uniform", "--family-size", "10", "--format", "csv").Well().Csv;
        Assert.Equal([0.005, 0.005], larger.Numbers("alpha-spending_level"));
        Assert.Equal([1, 0.01], larger.Numbers("bonferroni"));
    }

    [Fact]
    public void What_comes_after_the_horizon_is_told()
    {
        Ran ran = _place.Run("adjust", Column("0.5", "0.5", "0", "0.001"), "--correction", "alpha-spending", "--horizon", "2", "--top", "0").Well();
        string text = ran.Out.Replace("\n", " ", StringComparison.Ordinal);
        Assert.Contains("2 of the p-values come after the horizon of 2; 2 of them have the level 0 and cannot survive", text, StringComparison.Ordinal);
        Assert.Contains("alpha-spending 0 survive", text, StringComparison.Ordinal);
        CsvText csv = _place.Run("adjust", Column("0.5", "0.5", "0", "0.001"), "--correction", "alpha-spending", "--horizon", "2", "--format", "csv").Well().Csv;
        Assert.Equal(["0", "0"], csv.Column("alpha-spending_level")[2..]);
        Assert.Equal(["false", "false"], csv.Column("alpha-spending_survives")[2..]);
    }

    [Fact]
    public void People_read_settings_order_and_guarantee()
    {
        string text = _place.Run("adjust", Column(Stream), "--correction", "addis", "--level", "0.1").Well().Out.Replace("\n", " ", StringComparison.Ordinal);
        Assert.Contains("addis: ADDIS, shape p1.6 over 20 experiments, initial wealth 0.05, lambda 0.25, tau 0.5, in the order of the rows, which must be that in which the experiments started.", text, StringComparison.Ordinal);
        Assert.Contains("uniformly conservative", text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("lord", "--lambda", "0.5", "--lambda belongs to addis-spending, saffron, addis; no such procedure is chosen")]
    [InlineData("lord,bh", "--initial-wealth", "0.06", "lord: The initial wealth lies above 0 and is at most the level 0.05; 0.06 does not")]
    [InlineData("saffron", "--lambda", "1", "saffron: Lambda lies above 0 and below 1")]
    [InlineData("addis", "--tau", "0.2", "addis: Lambda lies above 0 and below tau")]
    [InlineData("addis", "--tau", "half", "--tau takes a number, for example 0.25, not 'half'")]
    [InlineData("lond", "--horizon", "0", "--horizon takes a whole number from 1 to 2147483647, or none, not '0'")]
    [InlineData("lond", "--horizon", "2000000000", "lond: A horizon is a number of experiments from 1 to 10000000")]
    [InlineData("lond", "--shape", "jn", "--shape takes jm", "did you mean 'jm'?")]
    [InlineData("lords", "--shape", "jm", "There is no correction 'lords' (did you mean 'lord'?)")]
    public void What_does_not_fit_is_refused(string corrections, string option, string value, params string[] reasons) =>
        _place.Run("adjust", Column(Stream), "--correction", corrections, option, value).Refused(2, reasons);

    [Fact]
    public void An_option_reaches_those_that_take_it()
    {
        CsvText csv = _place.Run("adjust", Column(Stream), "--correction", "lond,saffron", "--lambda", "0.25", "--format", "csv").Well().Csv;
        CsvText usual = _place.Run("adjust", Column(Stream), "--correction", "lond,saffron", "--format", "csv").Well().Csv;
        Assert.Equal(usual.Column("lond_level"), csv.Column("lond_level"));
        Assert.NotEqual(usual.Column("saffron_level"), csv.Column("saffron_level"));
    }

    [Fact]
    public void A_column_that_would_come_twice_is_refused()
    {
        string file = _place.Write("q.csv", "p,lord_level\n0.1,0.2\n");
        _place.Run("adjust", file, "--correction", "lord").Refused(3, "two columns 'lord_level'");
        _place.Run("adjust", file, "--correction", "lond").Well();
    }

    [Fact]
    public void A_file_without_any_p_value_gives_empty_cells()
    {
        CsvText csv = _place.Run("adjust", Column("NA", "NA"), "--correction", "lord,saffron", "--format", "csv").Well().Csv;
        Assert.Equal(["", ""], csv.Column("lord_level"));
        Assert.Equal(["", ""], csv.Column("saffron_survives"));
    }
}
