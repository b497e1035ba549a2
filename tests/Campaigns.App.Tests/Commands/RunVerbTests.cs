namespace Campaigns.App.Tests.Commands;

public sealed class RunVerbTests : IDisposable
{
    private const string Plan = "experiment,title,response,unit,groups,control\nE1,First,strength,MPa,a|b,a\nE2,Second,strength,MPa,a|b,a\nE3,Not done,strength,MPa,a|b,a\n";

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void A_folder_is_done_whole_and_a_second_time_nothing_is_done_twice()
    {
        Ran first = _place.Run("run", Workplace.Demo).Well();
        Assert.Contains("Opened campaign adhesion-screen", first.Out, StringComparison.Ordinal);
        Assert.Contains("Sealed it", first.Out, StringComparison.Ordinal);
        Assert.Contains("Review 1 of adhesion-screen: 14 of 46 tested experiments survive, in a family of 48.", first.Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        string results = _place.Run("results", "adhesion-screen", "--format", "csv").Well().Out;

        _place.Clock.Advance(TimeSpan.FromDays(7));
        string second = _place.Run("run", Workplace.Demo).Well().Out.ReplaceLineEndings(" ");
        Assert.Contains("sealed already, and plan.csv says the same", second, StringComparison.Ordinal);
        Assert.Contains("12 files had been loaded before and were not loaded again", second, StringComparison.Ordinal);
        Assert.Contains("Nothing new to test", second, StringComparison.Ordinal);
        Assert.Contains("Nothing changed since review 1", second, StringComparison.Ordinal);
        Assert.DoesNotContain("Opened", second, StringComparison.Ordinal);
        Assert.Equal(results, _place.Run("results", "adhesion-screen", "--format", "csv").Well().Out);
        CsvText show = _place.Run("show", "adhesion-screen", "--format", "csv").Well().Csv;
        Assert.Equal(["12"], show.Column("files_loaded"));
        Assert.Equal(["1"], show.Column("reviews"));
        Assert.Equal(["2026-03-02T09:30:00Z"], show.Column("sealed_at"));
    }

    [Theory]
    [InlineData("csv")]
    [InlineData("json")]
    public void Scripts_get_the_survivors_alone_and_the_rest_goes_to_standard_error(string format)
    {
        Ran ran = _place.Run("run", Workplace.Demo, "--format", format).Well();
        Assert.Equal(_place.Run("survivors", "adhesion-screen", "--format", format).Well().Out, ran.Out);
        Assert.Contains("Loaded week-01.csv: 94 rows", ran.Error, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("0.01", "bh", "level: the catalog holds 0.05, campaign.json says 0.01")]
    [InlineData("0.05", "holm", "correction: the catalog holds bh, campaign.json says holm")]
    public void A_changed_description_is_refused(string level, string correction, string sentence)
    {
        _place.Run("run", _place.Campaign("C", Plan, Workplace.TwoExperiments)).Well();
        string before = _place.Run("results", "C", "--format", "csv").Well().Out;
        _place.Run("run", _place.Campaign("C", Plan, Workplace.TwoExperiments, level, correction), "--format", "csv").Refused(3, "another description", sentence, "nothing was changed");
        Assert.Equal(before, _place.Run("results", "C", "--format", "csv").Well().Out);
    }

    [Fact]
    public void A_changed_plan_is_refused_experiment_by_experiment()
    {
        _place.Run("run", _place.Campaign("C", Plan, Workplace.TwoExperiments)).Well();
        string changed = Plan.Replace("E2,Second,strength", "E2,Second,gloss", StringComparison.Ordinal).Replace("E3", "E4", StringComparison.Ordinal);
        _place.Run("run", _place.Campaign("C", changed, Workplace.TwoExperiments), "--format", "csv")
            .Refused(3, "plan.csv' differs from the sealed plan of 'C'", "E2: response 'strength' against 'gloss'", "E3: is in the plan", "E4: is not in the plan");
        Assert.Equal(["E1", "E2", "E3"], _place.Run("results", "C", "--format", "csv").Well().Csv.Column("experiment"));
    }

    [Fact]
    public void Without_a_plan_the_campaign_is_exploratory_and_every_output_says_so()
    {
        Ran run = _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        Assert.Contains("It is exploratory", run.Out, StringComparison.Ordinal);
        foreach (string[] arguments in (string[][])[["results", "C"], ["survivors", "C"], ["show", "C"], ["show", "C", "E1"]])
        {
            Assert.Contains("Exploratory: the experiments were taken from the data", _place.Run(arguments).Well().Out, StringComparison.Ordinal);
        }

        Assert.Equal(["true"], _place.Run("list", "--format", "csv").Well().Csv.Column("exploratory"));
        Assert.Equal(["true"], _place.Run("show", "C", "--format", "csv").Well().Csv.Column("exploratory"));
        Assert.Equal(["E1", "E2"], _place.Run("results", "C", "--format", "csv").Well().Csv.Column("experiment"));
    }

    [Fact]
    public void A_plan_that_comes_after_an_exploratory_run_is_refused()
    {
        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        _place.Run("run", _place.Campaign("C", Plan, null), "--format", "csv").Refused(3, "differs from the sealed plan");
    }

    [Fact]
    public void Folders_that_hold_no_campaign_are_refused_and_make_no_catalog()
    {
        Directory.CreateDirectory(_place.At("empty"));
        _place.Run("run", _place.At("empty")).Refused(3, "campaign.json is not there");
        _place.Run("run", _place.At("none")).Refused(3, "There is no folder");
        _place.Write("broken/campaign.json", "{\"code\": \"X\", \"level\": 0.05,,}");
        _place.Run("run", _place.At("broken"), "--format", "json").Refused(3, "campaign.json' was refused; nothing was changed", "line 1");
        _place.Write("typo/campaign.json", "{\"code\": \"X\", \"errorRate\": \"false-discovery\", \"levle\": 0.05}");
        _place.Run("run", _place.At("typo")).Refused(3, "levle", "did you mean \"level\"?");
        Assert.False(File.Exists(_place.Catalog));
    }

    [Fact]
    public void A_plan_without_measurements_is_registered_sealed_and_waits()
    {
        Ran ran = _place.Run("run", _place.Campaign("C", Plan, null)).Well();
        Assert.Contains("no folder 'measurements'", ran.Out, StringComparison.Ordinal);
        Assert.Contains("Nothing of C was tested yet, so there is nothing to review.", ran.Out, StringComparison.Ordinal);
        CsvText csv = _place.Run("results", "C", "--format", "csv").Well().Csv;
        Assert.All(csv.Column("p"), p => Assert.Equal("", p));
        Assert.All(csv.Column("survives"), s => Assert.Equal("", s));
        _place.Campaign("C", Plan, Workplace.TwoExperiments);
        Assert.Contains("1 of 2 tested experiments survive, in a family of 3", _place.Run("run", _place.At("C")).Well().Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
    }

    [Fact]
    public void Neither_plan_nor_data_is_refused() =>
        _place.Run("run", _place.Campaign("C", null, null), "--format", "csv").Refused(3, "neither a plan nor data");

    [Fact]
    public void An_empty_plan_is_refused() =>
        _place.Run("run", _place.Campaign("C", "experiment,title\n", Workplace.TwoExperiments), "--format", "csv").Refused(3, "plan");

    [Fact]
    public void A_bad_measurement_refuses_its_file_whole_with_line_and_column()
    {
        _place.Campaign("C", Plan, Workplace.TwoExperiments);
        _place.Write("C/measurements/week-02.csv", "experiment,group,value\nE3,a,1.0\nE3,b,1.O\n");
        Ran ran = _place.Run("run", _place.At("C"), "--format", "csv");
        ran.Refused(3, "week-02.csv", "line 3", "value", "1.O");
        Assert.Equal("0", _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E3", "observations"));
    }
}
