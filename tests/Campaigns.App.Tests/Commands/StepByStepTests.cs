using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

public sealed class StepByStepTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void A_campaign_goes_from_plan_to_survivors_command_by_command()
    {
        Assert.Contains("Opened campaign C: familywise error rate at 0.01 by Holm", _place.Run("start", "C", "--error-rate", "familywise", "--level", "0.01", "--title", "T").Well().Out, StringComparison.Ordinal);
        string plan = _place.Write("plan.csv", "experiment,replicates\nE1,3\nE2,3\nE3,3\n");
        Assert.Contains("3 experiments added, 0 changed, 0 as before", _place.Run("plan", "C", plan).Well().Out, StringComparison.Ordinal);
        Assert.Contains("0 experiments added, 0 changed, 3 as before", _place.Run("plan", "C", plan).Well().Out, StringComparison.Ordinal);
        Assert.Contains("Sealed C", _place.Run("seal", "C").Well().Out, StringComparison.Ordinal);
        _place.Run("seal", "C").Refused(3, "sealed already, since 2026-03-02");
        _place.Run("plan", "C", plan, "--format", "csv").Refused(3, "takes no changes");

        string file = _place.Write("week-01.csv", Workplace.TwoExperiments);
        Assert.Equal(["10"], _place.Run("load", "C", file, "--format", "csv").Well().Csv.Column("rows"));
        _place.Run("load", "C", file, "--format", "csv").Refused(3, "week-01.csv", "loaded");

        // E2 is short of its three planned replicates.
        CsvText tested = _place.Run("test", "C", "--format", "csv").Well().Csv;
        Assert.Equal(["C", "1", "0", "1"], tested.Rows[0]);
        Assert.Contains("Nothing new to test in C", _place.Run("test", "C").Well().Out, StringComparison.Ordinal);
        Assert.Equal(["C", "1", "2026-03-02T09:30:00Z", "holm", "0.01", "3", "1", "1", "false"], _place.Run("review", "C", "--format", "csv").Well().Csv.Rows[0]);
        Assert.Equal("true", _place.Run("review", "C", "--family", "tested", "--format", "csv").Well().Csv.Column("interim")[0]);
        Assert.Equal(["E1"], _place.Run("survivors", "C", "--format", "csv").Well().Csv.Column("experiment"));

        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        Assert.Equal(["experiment", "test", "groups", "observations", "statistic", "df1", "df2", "p", "adjusted_p", "survives", "status"], results.Columns[..11]);
        Assert.Equal(["E1", "E2", "E3"], results.Column("experiment"));
        Assert.Equal(["true", "", ""], results.Column("survives"));

        // F = 6 * 0.25 / 0.01 = 150 by hand; df 1 and 4; p = 2 * P(t4 > sqrt(150)).
        Assert.Equal(150, CsvText.Number(results.Value("E1", "statistic")), 1e-11);
        Assert.Equal(["1", "4"], [results.Value("E1", "df1"), results.Value("E1", "df2")]);
        Assert.Equal(3 * CsvText.Number(results.Value("E1", "p")), CsvText.Number(results.Value("E1", "adjusted_p")), 1e-18);

        Assert.Equal(["C", "1", "0", "0"], _place.Run("test", "C", "--incomplete", "--format", "csv").Well().Csv.Rows[0]);
        Assert.Equal("false", _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E2", "survives"));
    }

    [Fact]
    public void A_test_short_of_its_plan_is_told_in_every_output()
    {
        _place.Run("start", "C").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", "experiment,groups,replicates\nE1,a|b,3\n")).Well();
        _place.Run("seal", "C").Well();
        _place.Run("load", "C", _place.Write("short.csv", "experiment,group,value\nE1,a,1.0\nE1,a,1.1\nE1,b,5.0\nE1,b,5.1\n")).Well();
        _place.Run("test", "C", "--incomplete").Well();
        Assert.Equal("tested short of its plan, with 4 values where 3 in each group were planned", _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E1", "amendments"));
        Assert.Contains("Deviation from the plan: tested short", _place.Run("show", "C", "E1").Well().Out, StringComparison.Ordinal);
        Assert.Contains("Deviations: 1 experiment", _place.Run("survivors", "C").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void An_exploratory_campaign_is_exported_without_a_plan()
    {
        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        string folder = Path.Combine(Path.GetDirectoryName(_place.Write("x", ""))!, "exported");
        _place.Run("export", "C", "--out", folder).Well();
        Assert.True(File.Exists(Path.Combine(folder, "campaign.json")));
        Assert.False(File.Exists(Path.Combine(folder, "plan.csv")));
    }

    [Fact]
    public void Nothing_is_said_to_be_done_that_a_refusal_took_back()
    {
        Ran refused = _place.Run("run", _place.Campaign("C", "experiment,replicates\nE1,1\n", Workplace.TwoExperiments));
        refused.Refused(3, "plan.csv");
        Assert.DoesNotContain("Opened", refused.Out, StringComparison.Ordinal);
    }

    [Fact]
    public void Values_for_a_tested_experiment_need_a_reason_and_every_output_mentions_it()
    {
        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        string late = _place.Write("late.csv", "experiment,group,value\nE1,a,1.05\nE1,b,2.05\n");
        _place.Run("load", "C", late, "--format", "csv").Refused(3, "E1", "--amend");
        Assert.Equal(["E1"], _place.Run("load", "C", late, "--amend", "two panels found, dried late", "--format", "csv").Well().Csv.Column("amended"));
        Assert.Equal("two panels found, dried late", _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E1", "amendments"));
        Assert.Contains("Deviation from the plan: two panels found, dried late", _place.Run("show", "C", "E1").Well().Out, StringComparison.Ordinal);
        foreach (string verb in (string[])["results", "survivors", "show"])
        {
            Assert.Contains("Deviations: 1 experiment", _place.Run(verb, "C").Well().Out, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Of_several_files_those_before_a_bad_one_stay_and_are_told()
    {
        _place.Run("start", "C").Well();
        string good = _place.Write("good.csv", Workplace.TwoExperiments), bad = _place.Write("bad.csv", "experiment,group,value\nE3,a,x\n"), after = _place.Write("after.csv", "experiment,group,value\nE4,a,1\n");
        Ran ran = _place.Run("load", "C", good, bad, after, "--format", "csv");
        Assert.Equal(3, ran.Code);
        Assert.Equal(["good.csv"], ran.Csv.Column("file"));
        Assert.Contains("bad.csv line 2", ran.Error, StringComparison.Ordinal);
        Assert.Equal(["E1", "E2"], _place.Run("results", "C", "--format", "csv").Well().Csv.Column("experiment"));
        _place.Run("load", "C", bad, "--format", "csv").Refused(3, "bad.csv line 2");
    }

    [Fact]
    public void Other_headers_separators_and_decimal_commas_are_read_as_named()
    {
        _place.Run("start", "C").Well();
        string file = _place.Write("m.csv", "Reading;Code;experiment;remark\n1,5;a;E1;x\n2,5;b;E1;y\n");
        Ran ran = _place.Run("load", "C", file, "--decimal", "comma", "--separator", "semicolon", "--columns", "value=Reading,group=Code").Well();
        Assert.Contains("not used: remark", ran.Error, StringComparison.Ordinal);
        Assert.Equal("2", _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E1", "observations"));
    }

    [Fact]
    public void An_export_runs_again_and_gives_the_same_results()
    {
        _place.Run("run", Workplace.Demo).Well();
        string results = _place.Run("results", "adhesion-screen", "--format", "csv").Well().Out;
        _place.Run("export", "adhesion-screen", "--out", _place.At("out")).Well();
        Assert.Equal(results, File.ReadAllText(_place.At("out", "results.csv")));
        _place.Run("run", _place.At("out"), "--catalog", _place.At("second.db")).Well();
        Assert.Equal(results, _place.Run("results", "adhesion-screen", "--catalog", _place.At("second.db"), "--format", "csv").Well().Out);
        _place.Run("export", "adhesion-screen", "--out", _place.At("out"), "--format", "csv").Refused(3, "not an empty folder");
    }

    [Fact]
    public void Csv_and_json_of_every_command_say_the_same()
    {
        _place.Run("run", Workplace.Demo).Well();
        foreach (string[] arguments in (string[][])[["list"], ["results", "adhesion-screen"], ["survivors", "adhesion-screen"], ["corrections", "adhesion-screen"],
            ["corrections", "adhesion-screen", "--by-experiment"], ["risk"], ["risk", "adhesion-screen"], ["show", "adhesion-screen"], ["comparisons", "adhesion-screen"]])
        {
            Ran asCsv = _place.Run([.. arguments, "--format", "csv"]).Well(), asJson = _place.Run([.. arguments, "--format", "json"]).Well();
            Assert.Equal(("", ""), (asCsv.Error, asJson.Error));
            CsvText csv = asCsv.Csv;
            using var json = JsonDocument.Parse(asJson.Out);
            Assert.Equal(csv.Rows.Count, json.RootElement.GetArrayLength());
            foreach ((JsonElement row, string[] fields) in json.RootElement.EnumerateArray().Zip(csv.Rows))
            {
                Assert.Equal(csv.Columns, row.EnumerateObject().Select(p => p.Name));
                Assert.Equal(fields, row.EnumerateObject().Select(p => p.Value.ValueKind switch { JsonValueKind.Null => "", JsonValueKind.String => p.Value.GetString()!, _ => p.Value.GetRawText() }));
            }

            Assert.DoesNotContain("NaN", asCsv.Out, StringComparison.Ordinal);
            Assert.DoesNotContain("Infinity", asCsv.Out, StringComparison.Ordinal);
            Assert.DoesNotContain('∞', asCsv.Out);
        }
    }

    [Fact]
    public void Risk_of_the_programme_adds_up_its_campaigns()
    {
        _place.Run("run", _place.Campaign("A", null, Workplace.TwoExperiments)).Well();
        _place.Run("run", _place.Campaign("B", null, Workplace.TwoExperiments, "0.1")).Well();
        CsvText risk = _place.Run("risk", "--format", "csv").Well().Csv;
        Assert.Equal(["A", "B", "programme"], risk.Column("campaign"));

        // Two tests at 0.05 and two at 0.1: 0.3 expected, 1 - 0.95^2 * 0.9^2 = 0.268975 by hand.
        Assert.Equal(0.3, risk.Numbers("expected_false_positives")[2], 1e-15);
        Assert.Equal(0.268975, risk.Numbers("risk_independent")[2], 1e-15);
        Assert.Contains("What does not add up", _place.Run("risk").Well().Out, StringComparison.Ordinal);
        Assert.Single(_place.Run("risk", "A", "--format", "csv").Well().Csv.Rows);
    }
}
