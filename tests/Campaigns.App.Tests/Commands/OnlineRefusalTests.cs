using Campaigns.App.Dashboard.Model;
using Campaigns.Catalog.Results;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Tests.Commands;

/// <summary>What a campaign that is judged as its experiments arrive refuses, reads from its folder, and survives.</summary>
public sealed class OnlineRefusalTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData("bh", "--lambda", "0.5", "--lambda belongs to addis-spending, saffron, addis; no such procedure is chosen")]
    [InlineData("lord", "--lambda", "0.5", "--lambda belongs to")]
    [InlineData("lord", "--initial-wealth", "0.06", "lord: The initial wealth")]
    [InlineData("saffron", "--lambda", "0", "saffron: Lambda lies above 0")]
    [InlineData("lond", "--horizon", "0", "--horizon takes a whole number from 1")]
    [InlineData("lonf", "--horizon", "5", "did you mean 'lond'?")]
    public void Options_that_do_not_fit_open_nothing(string key, string option, string value, string reason)
    {
        _place.Run("start", "C", "--correction", key, option, value).Refused(2, reason);
        Assert.False(File.Exists(_place.Catalog));
    }

    [Fact]
    public void Registering_is_refused_where_it_would_come_too_early_too_late_or_twice()
    {
        _place.Run("start", "C", "--correction", "lond").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", OnlineCampaign.Plan(4))).Well();
        _place.Run("register", "C", "E01").Refused(3, "not sealed");
        _place.Run("restream", "C", "--correction", "lord", "--reason", "x").Refused(3, "not sealed");
        _place.Run("seal", "C").Well();
        _place.Run("register", "C", "E01", "E09").Refused(3, "no experiment 'E09'", "Nothing was registered");
        _place.Run("register", "C", "E01", "E01").Refused(3, "named twice", "nothing was registered");
        _place.Run("register", "C").Refused(2);
        Assert.Empty(_place.Run("decisions", "C", "--format", "csv").Well().Csv.Rows);
        _place.Run("register", "C", "E02").Well();
        _place.Run("register", "C", "E02").Refused(3, "given its level already");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(1))).Well();
        _place.Run("test", "C").Well();
        _place.Run("register", "C", "E01").Refused(3, "given its level already");
        _place.Run("start", "B").Well();
        foreach (string command in (string[])["decisions", "register"])
        {
            _place.Run([command, "B", .. command == "register" ? (string[])["E1"] : []]).Refused(3, "judged by the correction 'bh'");
        }
    }

    [Fact]
    public void Families_have_no_place_in_a_stream()
    {
        _place.Run("start", "C", "--correction", "lord").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", OnlineCampaign.Plan(3, "primary"))).Refused(3, "LORD++", "family 'primary' of experiment 'E01'", "batch correction");
        Assert.Equal("0", _place.Run("show", "C", "--format", "csv").Well().Csv.Column("experiments")[0]);
    }

    [Fact]
    public void A_folder_names_its_procedure_and_settings_and_is_exported_with_them()
    {
        _place.Write("F/plan.csv", OnlineCampaign.Plan(6));
        _place.Write("F/measurements/m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 6)));
        _place.Write("F/campaign.json", """{"code": "F", "correction": "addis", "horizon": "none", "shape": "p2", "initialWealth": 0.01, "lambda": 0.2, "tau": 0.7}""");
        _place.Run("run", _place.At("F")).Well();
        CsvText first = _place.Run("decisions", "F", "--format", "csv").Well().Csv;
        Assert.Equal(6, first.Rows.Count);
        Assert.Contains("shape p2 without end, initial wealth 0.01, lambda 0.2, tau 0.7", _place.Run("results", "F").Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
        _place.Run("run", _place.At("F")).Well();
        Assert.Equal(first.Rows, _place.Run("decisions", "F", "--format", "csv").Well().Csv.Rows);
        _place.Write("F/campaign.json", """{"code": "F", "correction": "addis", "horizon": 9, "shape": "p2", "initialWealth": 0.01, "lambda": 0.2, "tau": 0.7}""");
        _place.Run("run", _place.At("F")).Refused(3, "horizon: the catalog holds none, campaign.json says 9");

        _place.Run("export", "F", "--out", _place.At("G")).Well();
        Assert.Equal(6, CsvText.Read(File.ReadAllText(_place.At("G", "decisions.csv"))).Rows.Count);
        Assert.Equal(["1", "addis", "0.05", "", "p2", "0.01", "0.2", "0.7"], CsvText.Read(File.ReadAllText(_place.At("G", "streams.csv"))).Rows[0][..8]);
        using var other = new Workplace();
        other.Run("run", _place.At("G")).Well();
        Assert.Equal(first.Rows.Select(r => string.Join(' ', r[..6])), other.Run("decisions", "F", "--format", "csv").Well().Csv.Rows.Select(r => string.Join(' ', r[..6])));
    }

    [Theory]
    [InlineData("\"correction\": \"bh\", \"tau\": 0.5", "\"tau\" belongs to procedures that decide as experiments arrive")]
    [InlineData("\"correction\": \"lord\", \"tau\": 0.5", "takes no tau")]
    [InlineData("\"correction\": \"lord\", \"horizon\": 2.5", "a horizon is a whole number of experiments from 1 to 10000000, or \"none\"")]
    [InlineData("\"correction\": \"lord\", \"horizon\": \"all\"", "a number of experiments or \"none\"")]
    [InlineData("\"correction\": \"lord\", \"shape\": \"jn\"", "did you mean jm?")]
    [InlineData("\"correction\": \"lond\", \"horizon\": \"none\", \"shape\": \"uniform\"", "needs a horizon")]
    [InlineData("\"correction\": \"lord\", \"initialWealth\": 0.06", "initial wealth lies above 0")]
    public void A_folder_with_settings_that_do_not_fit_is_refused(string members, string reason)
    {
        _place.Write("F/campaign.json", $$"""{"code": "F", {{members}}}""");
        _place.Run("run", _place.At("F")).Refused(3, reason);
    }

    [Fact]
    public void Without_a_plan_the_horizon_is_the_experiments_at_the_seal_and_what_comes_later_gets_nothing()
    {
        _place.Run("start", "C", "--correction", "alpha-spending", "--shape", "uniform").Well();
        _place.Run("load", "C", _place.Write("m1.csv", OnlineCampaign.Measurements(1, 2, 3, 4))).Well();
        _place.Run("seal", "C").Well();
        _place.Run("test", "C").Well();
        _place.Run("load", "C", _place.Write("m2.csv", OnlineCampaign.Measurements(8, 12))).Well();
        _place.Run("test", "C").Well();
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        Assert.Equal([0.0125, 0.0125, 0.0125, 0.0125, 0, 0], results.Numbers("standing_level"));
        Assert.Equal(["false", "false"], results.Column("survives")[4..]);
        Assert.Equal(["1", "1"], results.Column("adjusted_p")[4..]);
        foreach (string command in (string[])["results", "decisions"])
        {
            Assert.Contains("2 experiments came after the horizon and were given the level 0: they cannot survive.", _place.Run(command, "C").Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Two_programs_at_once_give_every_experiment_one_position()
    {
        OnlineCampaign.Open(_place, 24, "--correction", "saffron");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(13, 12)))).Well();
        List<string[]> commands = [["test", "C"], .. Enumerable.Range(1, 6).Select(i => (string[])["register", "C", OnlineCampaign.Code(i)])];
        while (commands.Count > 0)
        {
            (string[] Command, System.Diagnostics.Process Process)[] started = [.. commands.Select(c => (c, Executable.Start(_place.Catalog, c)))];
            commands.Clear();
            foreach ((string[] command, System.Diagnostics.Process process) in started)
            {
                // On a machine with much to do one may wait too long for the others, say so, and is started again.
                if (Executable.End(process) is { Code: 4 } waited)
                {
                    waited.Refused(4, "is locked by another program");
                    commands.Add(command);
                }
            }
        }

        CsvText decisions = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        Assert.Equal(Enumerable.Range(1, 18).Select(OnlineCampaignNumber), decisions.Column("position"));
        Assert.Equal(18, decisions.Column("experiment").Distinct().Count());
        Assert.Equal(12, decisions.Column("decided_at").Count(d => d.Length > 0));
    }

    [Fact]
    public void A_program_that_is_killed_leaves_all_decisions_of_its_run_or_none()
    {
        for (int milliseconds = 60; milliseconds <= 540; milliseconds += 120)
        {
            using var place = new Workplace();
            OnlineCampaign.Open(place, 60, "--correction", "lord");
            place.Run("load", "C", place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 60)))).Well();
            System.Diagnostics.Process process = Executable.Start(place.Catalog, "test", "C");
            if (!process.WaitForExit(milliseconds))
            {
                process.Kill();
            }

            Executable.End(process);
            int decided = place.Run("decisions", "C", "--format", "csv").Well().Csv.Rows.Count;
            Assert.Contains(decided, (int[])[0, 60]);
            Assert.Equal(decided, place.Run("results", "C", "--format", "csv").Well().Csv.Column("p").Count(p => p.Length > 0));
            place.Run("test", "C").Well();
            CsvText results = place.Run("results", "C", "--format", "csv").Well().Csv;
            string column = place.Write("p.csv", "p\n" + string.Join('\n', results.Column("p")) + "\n");
            Assert.Equal(place.Run("adjust", column, "--correction", "lord", "--format", "csv").Well().Csv.Column("lord_level"), results.Column("standing_level"));
        }
    }

    [Fact]
    public void The_dashboard_says_what_is_held_and_lists_decisions()
    {
        OnlineCampaign.Open(_place, 6, "--correction", "lord");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(1, 2, 3, 4))).Well();
        _place.Run("test", "C").Well();
        using var catalog = Catalog.Catalog.Open(_place.Catalog, _place.Clock);
        Domain.CampaignStanding standing = new StandingReader(catalog).Read("C");
        var heading = new CampaignHeading(standing, OnlineRegistry.Find("lord"));
        Assert.StartsWith("Each experiment is decided when it arrives, and its decision stands. The expected share", heading.Meaning, StringComparison.Ordinal);
        Assert.Equal("supposes independent tests", heading.ValidUnder);
        Assert.Contains("LORD++", heading.Held);
        Assert.False(new Ranking(standing, OnlineRegistry.Find("lord")).HasBoundary);
    }

    private static string OnlineCampaignNumber(int i) => i.ToString(System.Globalization.CultureInfo.InvariantCulture);
}
