using Campaigns.App.Tests.Dashboard;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Commands;

/// <summary>Campaigns that are judged as their experiments arrive: levels, decisions, and what every command says of them.</summary>
public sealed class OnlineCampaignTests : IDisposable
{
    private readonly Workplace _place = new();

    public static TheoryData<string> Keys => [.. OnlineRegistry.All.Select(p => p.Key)];

    public void Dispose() => _place.Dispose();

    [Theory]
    [MemberData(nameof(Keys))]
    public void Levels_and_decisions_are_those_of_a_stream_in_memory(string key)
    {
        OnlineCampaign.Open(_place, 20, "--correction", key);
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 20)))).Well();
        _place.Run("test", "C").Well();
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        OnlineProcedure procedure = OnlineRegistry.Find(key)!;
        OnlineStream stream = procedure.Start(OnlineSettings.For(procedure, new SignificanceLevel(0.05), 20));
        double[] p = results.Numbers("p");
        double[] levels = results.Numbers("standing_level");
        double[] adjusted = results.Numbers("adjusted_p");
        for (int i = 0; i < 20; i++)
        {
            OnlineLevel given = stream.Register();
            bool survives = stream.Report(given.Position, PValue.FromValue(p[i]));
            Assert.Equal((given.Level, survives ? "true" : "false"), (levels[i], results.Column("survives")[i]));
            Assert.Equal(survives, adjusted[i] <= 0.05);
            Assert.Equal(Math.Min(1, p[i] * 0.05 / given.Level), adjusted[i], 1e-14);
        }

        Assert.InRange(stream.Rejections, 2, 12);
        CsvText decisions = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        Assert.Equal(["stream", "position", "experiment", "level", "p", "survives", "registered_at", "decided_at", "overlaps", "withdrawn"], decisions.Columns);
        Assert.Equal(results.Column("standing_level"), decisions.Column("level"));
        Assert.Equal(results.Column("p"), decisions.Column("p"));
        Assert.Equal(results.Column("survives"), decisions.Column("survives"));
        Assert.All(decisions.Column("overlaps"), o => Assert.Equal("false", o));
        Assert.Equal(results.Column("experiment").Where((_, i) => results.Column("survives")[i] == "true").Order(StringComparer.Ordinal), _place.Run("survivors", "C", "--format", "csv").Well().Csv.Column("experiment").Order(StringComparer.Ordinal));

        // The batch view is the batch correction, Holm's or Benjamini and Hochberg's, of the same p-values.
        string column = _place.Write("p.csv", "p\n" + string.Join('\n', results.Column("p")) + "\n");
        Assert.Equal(_place.Run("adjust", column, "--correction", "bh", "--format", "csv").Well().Csv.Column("bh"), results.Column("batch_adjusted_p"));
    }

    [Fact]
    public void Experiments_that_overlap_get_their_levels_from_what_is_known_then()
    {
        OnlineCampaign.Open(_place, 12, "--correction", "lord", "--shape", "p1.6", "--initial-wealth", "0.03");
        OnlineProcedure lord = OnlineRegistry.Find("lord")!;
        OnlineStream stream = lord.Start(OnlineSettings.For(lord, new SignificanceLevel(0.05), 12, "p1.6", 0.03));
        var position = new Dictionary<string, int>();
        void Register(params string[] codes)
        {
            CsvText given = _place.Run(["register", "C", .. codes, "--format", "csv"]).Well().Csv;
            foreach (string code in codes)
            {
                OnlineLevel level = stream.Register();
                position[code] = level.Position;
                Assert.Equal(level.Level, CsvText.Number(given.Rows.Single(r => r[2] == code)[3]));
            }
        }

        void Test(params int[] experiments)
        {
            _place.Run("load", "C", _place.Write($"m{experiments[0]}.csv", OnlineCampaign.Measurements(experiments))).Well();
            _place.Run("test", "C").Well();
            CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
            foreach (string code in experiments.Order().Select(OnlineCampaign.Code))
            {
                if (!position.TryGetValue(code, out int at))
                {
                    OnlineLevel level = stream.Register();
                    at = position[code] = level.Position;
                    Assert.Equal(level.Level, CsvText.Number(results.Value(code, "standing_level")));
                }

                bool survives = stream.Report(at, PValue.FromValue(CsvText.Number(results.Value(code, "p"))));
                Assert.Equal(survives ? "true" : "false", results.Value(code, "survives"));
            }
        }

        Register("E08", "E03");
        Test(4, 8);
        Register("E01");
        Test(2);
        Register("E12", "E06");
        Test(12, 1, 5);
        Test(3, 7, 9, 10);
        CsvText decisions = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        Assert.Equal(["E08", "E03", "E04", "E01", "E02", "E12", "E06", "E05", "E07", "E09", "E10"], decisions.Column("experiment"));
        Assert.Equal("true", decisions.Rows[0][8]);
        Assert.Equal("", decisions.Rows[6][5]);
        Assert.Equal("true", decisions.Rows[^1][8]);
        string text = _place.Run("decisions", "C").Well().Out.Replace('\n', ' ');
        Assert.Contains("Overlaps: ran at the same time", text, StringComparison.Ordinal);
        Assert.Contains("11 of 12 experiments were given a level, 10 are decided", text, StringComparison.Ordinal);
        Assert.Contains("given before its p-value is seen; not decided yet", _place.Run("show", "C", "E06").Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
    }

    [Fact]
    public void A_review_while_a_decided_experiment_awaits_a_new_test_holds_what_has_a_result_and_comes_out_again()
    {
        OnlineCampaign.Open(_place, 8, "--correction", "lond");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 8)))).Well();
        _place.Run("test", "C").Well();
        CsvText decisions = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        int survivors = decisions.Rows.Count(r => r[5] == "true");
        string survivor = decisions.Rows.First(r => r[5] == "true")[2];
        string line = ((int.Parse(survivor[1..], System.Globalization.CultureInfo.InvariantCulture) - 1) * 10 + 2).ToString(System.Globalization.CultureInfo.InvariantCulture);
        _place.Run("exclude", "C", survivor, "--line", line, "--reason", "dropped").Well();
        Assert.Contains("by standing decisions", _place.Run("survivors", "C").Well().Out, StringComparison.Ordinal);
        foreach (string command in (string[])["decisions", "results", "survivors", "review"])
        {
            string said = _place.Run(command, "C").Well().Out.Replace('\n', ' ');
            Assert.Contains("1 decided experiment awaits a new test: decisions, results and survivors keep its decision, a review counts only what has a result and is without it until 'campaigns test C' tests it.", said, StringComparison.Ordinal);
            Assert.True(command == "review" || said.Contains("withdrawing a survivor afterwards decides by results, and is outside it.", StringComparison.Ordinal), command);
        }

        CsvText review = _place.Run("reviews", "C", "--format", "csv").Well().Csv;
        Assert.Equal(["7", (survivors - 1).ToString(System.Globalization.CultureInfo.InvariantCulture)], [review.Column("tested")[0], review.Column("survivors")[0]]);
        Assert.Contains("the same to the byte", _place.Run("reviews", "C", "--rerun", "all").Well().Out, StringComparison.Ordinal);
        _place.Run("ledger", "verify").Well();
    }

    [Fact]
    public void A_decision_stands_when_values_are_left_out_and_tested_again_and_every_output_says_so()
    {
        OnlineCampaign.Open(_place, 8, "--correction", "lond");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 8)))).Well();
        _place.Run("test", "C").Well();
        CsvText before = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        string survivor = before.Rows.First(r => r[5] == "true")[2];
        string adjusted = _place.Run("results", "C", "--format", "csv").Well().Csv.Value(survivor, "adjusted_p");
        string line = ((int.Parse(survivor[1..], System.Globalization.CultureInfo.InvariantCulture) - 1) * 10 + 2).ToString(System.Globalization.CultureInfo.InvariantCulture);
        _place.Run("exclude", "C", survivor, "--line", line, "--reason", "dropped", "--as", "A. Moss").Well();
        foreach (bool again in (bool[])[false, true])
        {
            if (again)
            {
                Assert.Contains("Tested 1 experiment of C.", _place.Run("test", "C").Well().Out, StringComparison.Ordinal);
            }

            Assert.Equal(before.Rows, _place.Run("decisions", "C", "--format", "csv").Well().Csv.Rows);
            CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
            Assert.Equal(("true", adjusted), (results.Value(survivor, "survives"), results.Value(survivor, "adjusted_p")));
            Assert.Contains("its decision was made on p = ", results.Value(survivor, "amendments"), StringComparison.Ordinal);
            Assert.Contains(survivor, _place.Run("survivors", "C", "--format", "csv").Well().Csv.Column("experiment"));
            foreach (string[] command in (string[][])[["results", "C"], ["survivors", "C"], ["decisions", "C"], ["comparisons", "C"], ["corrections", "C"], ["show", "C"], ["show", "C", survivor], ["risk", "C"]])
            {
                string text = _place.Run(command).Well().Out.Replace('\n', ' ');
                Assert.True(text.Contains("Deviations: 1 experiment.", StringComparison.Ordinal) || text.Contains("Deviation from the plan", StringComparison.Ordinal), string.Join(' ', command) + text);
            }

            foreach (string command in (string[])["results", "survivors"])
            {
                Assert.Contains($"{survivor} was made on p = ", _place.Run(command, "C").Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
            }

            if (again)
            {
                string shown = _place.Run("show", "C", survivor).Well().Out.Replace('\n', ' ');
                Assert.Contains("It survives by a decision that was made on p = ", shown, StringComparison.Ordinal);
                Assert.DoesNotContain("evidence against the hypothesis", shown, StringComparison.Ordinal);
            }

            Assert.Contains("its decision was made on p = ", _place.Run("show", "C", survivor).Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
        }

        Assert.Contains("review", _place.Run("review", "C").Well().Out, StringComparison.OrdinalIgnoreCase);
    }

    [Fact]
    public void Every_command_carries_procedure_settings_and_guarantee()
    {
        OnlineCampaign.Open(_place, 10, "--correction", "addis", "--horizon", "15", "--tau", "0.6");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 9)))).Well();
        Assert.Matches("9 decided as they arrived: [0-9]+ survives?\\. The decisions stand\\.", _place.Run("test", "C").Well().Out.Replace('\n', ' '));
        _place.Run("review", "C").Well();
        foreach (string[] command in (string[][])[["results", "C"], ["survivors", "C"], ["decisions", "C"], ["comparisons", "C"], ["show", "C"], ["show", "C", "E02"]])
        {
            string text = _place.Run(command).Well().Out.Replace('\n', ' ');
            Assert.Contains("ADDIS at 0.05 decides each experiment when it arrives", text, StringComparison.Ordinal);
            Assert.Contains("shape p1.6 over 15 experiments, initial wealth 0.025, lambda 0.25, tau 0.6", text, StringComparison.Ordinal);
            Assert.Contains("uniformly conservative", text, StringComparison.Ordinal);
            Assert.DoesNotContain("count as p = 1", text, StringComparison.Ordinal);
        }

        Assert.Contains("uniformly conservative", _place.Run("risk", "C").Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
        CsvText corrections = _place.Run("corrections", "C", "--format", "csv").Well().Csv;
        Assert.Equal("addis", corrections.Rows.Single(r => r[Array.IndexOf(corrections.Columns, "sealed")] == "true")[0]);
        Assert.Equal("addis", _place.Run("list", "--format", "csv").Well().Csv.Column("correction")[0]);
        foreach (string[] command in (string[][])[["results", "C"], ["survivors", "C"], ["comparisons", "C"], ["corrections", "C", "--by-experiment"], ["show", "C"], ["show", "C", "E02"], ["decisions", "C"], ["risk", "C"], ["review", "C"], ["list"]])
        {
            HonestOutput.Of(_place, command);
        }
    }

    [Fact]
    public void Comparisons_inside_a_survivor_are_judged_at_its_own_level()
    {
        OnlineCampaign.Open(_place, 12, "--correction", "saffron");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 12)))).Well();
        _place.Run("test", "C").Well();
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        CsvText comparisons = _place.Run("comparisons", "C", "--format", "csv").Well().Csv;
        int claimed = 0;
        foreach (string[] row in comparisons.Rows)
        {
            double level = CsvText.Number(results.Value(row[0], "standing_level"));
            bool selected = results.Value(row[0], "survives") == "true";
            bool survives = selected && CsvText.Number(row[7]) <= level;
            claimed += survives ? 1 : 0;
            Assert.Equal(survives ? "true" : "false", row[9]);
            Assert.Equal(selected ? Math.Min(1, CsvText.Number(row[7]) * 0.05 / level) : double.NaN, row[8].Length > 0 ? CsvText.Number(row[8]) : double.NaN, 1e-14);
        }

        Assert.InRange(claimed, 1, 11);
        Assert.Contains("no rate over the comparisons of the campaign", _place.Run("comparisons", "C").Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
    }

    [Fact]
    public void A_new_stream_takes_what_has_no_level_yet_and_earlier_decisions_stand()
    {
        OnlineCampaign.Open(_place, 16, "--correction", "alpha-spending");
        _place.Run("register", "C", "E16").Well();
        _place.Run("load", "C", _place.Write("m1.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 8)))).Well();
        _place.Run("test", "C").Well();
        CsvText before = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        _place.Run("restream", "C", "--correction", "saffron").Refused(2, "--reason");
        _place.Run("restream", "C", "--correction", "saffron", "--reason", " ").Refused(2, "--reason must not be empty");
        _place.Run("restream", "C", "--correction", "bh", "--reason", "x").Refused(2, "--correction takes");
        _place.Run("restream", "C", "--correction", "lond", "--tau", "0.5", "--reason", "x").Refused(2, "--tau belongs to");
        Ran started = _place.Run("restream", "C", "--correction", "saffron", "--reason", "the rest counts as screening", "--format", "csv").Well();
        Assert.Equal(["C", "2", "saffron", "0.05", "7", "p1.6", "0.025", "0.5", ""], started.Csv.Rows[0][..9]);
        _place.Run("load", "C", _place.Write("m2.csv", OnlineCampaign.Measurements(Enumerable.Range(9, 8)))).Well();
        _place.Run("test", "C").Well();
        CsvText after = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        Assert.Equal(before.Rows.Where(r => r[2] != "E16"), after.Rows.Take(9).Where(r => r[2] != "E16"));

        // E16 was registered in the first stream, and is decided at the level that it got there.
        Assert.Equal(("1", before.Rows[0][3]), (after.Rows[0][0], after.Rows[0][3]));
        Assert.NotEqual("", after.Rows[0][7]);
        OnlineProcedure saffron = OnlineRegistry.Find("saffron")!;
        OnlineStream stream = saffron.Start(OnlineSettings.For(saffron, new SignificanceLevel(0.05), 7));
        foreach (string[] row in after.Rows.Skip(9))
        {
            OnlineLevel given = stream.Register();
            Assert.Equal(("2", given.Level), (row[0], CsvText.Number(row[3])));
            Assert.Equal(row[5] == "true", stream.Report(given.Position, PValue.FromValue(CsvText.Number(row[4]))));
        }

        _place.Run("risk", "C").Well();
        _place.Run("risk").Well();
        string text = _place.Run("results", "C").Well().Out.Replace('\n', ' ');
        Assert.Contains("Stream 1 since 2026-03-02 09:30 UTC: Alpha-spending, shape jm over 16 experiments.", text, StringComparison.Ordinal);
        Assert.Contains("(reason: the rest counts as screening)", text, StringComparison.Ordinal);
        Assert.Contains("they do not add up to one for all", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Decisions_read_well()
    {
        OnlineCampaign.Open(_place, 9, "--correction", "lord", "--horizon", "6");
        _place.Run("register", "C", "E05", "E02").Well();
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 8)))).Well();
        _place.Run("test", "C").Well();
        Golden.Match("decisions", _place.Run("decisions", "C").Well().Out);
        Golden.Match("results-online", _place.Run("results", "C").Well().Out);
    }
}
