using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

/// <summary>exclude, from the command line to every output that must mention it.</summary>
public sealed class ExclusionTests : IDisposable
{
    private const string Why = "excluded: value 9.9 of group b (line 7 of week-01.csv), by A. Moss: panel dropped";

    private const string Data = """
        experiment,group,value,specimen
        E1,a,1.0,
        E1,a,1.1,
        E1,a,0.9,
        E1,b,2.0,
        E1,b,2.1,
        E1,b,9.9,
        E1,c,3.0,
        E1,c,3.1,
        E1,c,2.9,
        E2,a,1,s1
        E2,a,1.2,s1
        E2,a,1.5,s2
        E2,b,2.5,s3
        E2,b,2.6,s3
        E2,b,2.9,s4
        E3,a,1,
        E3,a,2,
        E3,b,3,

        """;

    private const string Plan = "experiment,unit,groups,control,test,follow_up,replicates\nE1,N,a|b|c,a,f,tukey-kramer,3\nE2,N,a|b,a,f,dunnett,\nE3,N,a|b,,kruskal-wallis,holm-pairs,\n";

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Excluding_testing_and_reviewing_changes_the_result_and_every_output_mentions_it()
    {
        _place.Run("run", _place.Campaign("C", Plan, Data)).Well();
        Assert.Equal("false", Results().Value("E1", "survives"));
        Ran said = Exclude("E1", 7, "panel dropped", "--format", "csv").Well();
        Assert.Equal(["without the excluded", "with the excluded"], said.Csv.Column("values"));
        Assert.Contains($"Recorded: {Why}.", said.Error, StringComparison.Ordinal);
        Assert.Equal(("ready", "", ""), (Results().Value("E1", "status"), Results().Value("E1", "p"), Results().Value("E1", "survives")));

        Again();
        CsvText results = Results();
        Assert.Equal(("8", "true", Why), (results.Value("E1", "observations"), results.Value("E1", "survives"), results.Value("E1", "amendments")));

        // By hand: group means 1, 2.05, 3; within 0.02 + 0.005 + 0.02 = 0.045 on 5; between 3 x 1 + 2 x 2.05^2 + 27 - 16.1^2/8 - ... = 6.00375 on 2.
        Assert.Equal(6.00375 / 2 / (0.045 / 5), CsvText.Number(results.Value("E1", "statistic")), 1e-10);
        Assert.Equal(Why, _place.Run("survivors", "C", "--format", "csv").Well().Csv.Value("E1", "amendments"));
        Assert.Contains($"Deviation from the plan: {Why}.", Unwrapped("show", "C", "E1"), StringComparison.Ordinal);
        foreach (string command in (string[])["results", "survivors", "comparisons", "corrections", "show"])
        {
            Assert.Contains("Deviations: 1 experiment.", Unwrapped(command, "C"), StringComparison.Ordinal);
        }

        using var json = JsonDocument.Parse(_place.Run("show", "C", "E1", "--format", "json").Well().Out);
        JsonElement line = Assert.Single(json.RootElement.GetProperty("exclusions").EnumerateArray());
        Assert.Equal(("week-01.csv", 7, "b", "panel dropped", "A. Moss"), (line.GetProperty("file").GetString(), line.GetProperty("line").GetInt32(), line.GetProperty("group").GetString(), line.GetProperty("reason").GetString(), line.GetProperty("by").GetString()));
        Assert.Equal(9.9, line.GetProperty("value").ValueKind == JsonValueKind.Number ? line.GetProperty("value").GetDouble() : CsvText.Number(line.GetProperty("value").GetString()!));
        HonestOutput.Of(_place, "C", "E1", "E2", "E3");
    }

    [Fact]
    public void Taking_back_gives_the_first_result_again_and_the_record_keeps_both_decisions()
    {
        _place.Run("run", _place.Campaign("C", Plan, Data)).Well();
        string before = Results().Value("E1", "p");
        Exclude("E1", 7, "panel dropped").Well();
        Again();
        Assert.NotEqual(before, Results().Value("E1", "p"));
        Exclude("E1", 7, "it was another panel", "--take-back").Well();
        Again();
        Assert.Equal((before, "9"), (Results().Value("E1", "p"), Results().Value("E1", "observations")));
        Assert.Equal($"{Why}; taken in again after an exclusion: value 9.9 of group b (line 7 of week-01.csv), by A. Moss: it was another panel", Results().Value("E1", "amendments"));
        Exclude("E1", 7, "no", "--take-back").Refused(3, "is not excluded, so there is nothing to take back; nothing was changed.");
    }

    [Fact]
    public void Two_exclusions_count_together_and_one_cannot_be_made_twice()
    {
        _place.Run("run", _place.Campaign("C", Plan, Data)).Well();
        Exclude("E1", 7, "one").Well();
        Exclude("E1", 6, "two").Well();
        Exclude("E1", 7, "again").Refused(3, "is excluded already; nothing was changed.");
        Again();
        CsvText results = Results();
        Assert.Equal("7", results.Value("E1", "observations"));

        // By hand: means 1, 2, 3 of 3, 1, 3 values: between 6, within 0.04 on 4.
        Assert.Equal(300, CsvText.Number(results.Value("E1", "statistic")), 1e-10);
        HonestOutput.Of(_place, "C", "E1");
    }

    [Fact]
    public void Excluding_the_only_value_of_a_group_leaves_the_others_and_names_the_empty_one()
    {
        _place.Run("run", _place.Campaign("C", Plan, Data)).Well();
        Exclude("E3", 19, "broken").Well();
        Again();
        Assert.Equal(("too-few-groups", "1", "2", ""), (Results().Value("E3", "status"), Results().Value("E3", "groups"), Results().Value("E3", "observations"), Results().Value("E3", "p")));
        CsvText groups = _place.Run("show", "C", "E3", "--format", "csv").Well().Csv;
        Assert.Equal(["2", "0"], groups.Column("n"));
        Assert.Equal("", groups.Value("b", "mean"));
        foreach (int line in (int[])[17, 18])
        {
            Exclude("E3", line, "all of them").Well();
        }

        Again();
        Assert.Equal(("too-few-groups", "0"), (Results().Value("E3", "status"), Results().Value("E3", "observations")));
        HonestOutput.Of(_place, "C", "E3");
    }

    [Fact]
    public void Excluding_a_reading_moves_the_mean_of_its_specimen_and_excluding_all_its_readings_drops_it()
    {
        _place.Run("run", _place.Campaign("C", Plan, Data)).Well();
        Assert.Equal(("6", "4", "2"), (Results().Value("E2", "observations"), Results().Value("E2", "specimens"), Results().Value("E2", "df2")));
        Exclude("E2", 11, "smeared").Well();
        Again();
        Assert.Equal(("5", "4", "2"), (Results().Value("E2", "observations"), Results().Value("E2", "specimens"), Results().Value("E2", "df2")));

        // By hand: specimen means 1.2, 1.5 and 2.55, 2.9: between 1.375^2, within 0.045 + 0.06125 on 2.
        Assert.Equal(1.375 * 1.375 / (0.10625 / 2), CsvText.Number(Results().Value("E2", "statistic")), 1e-10);
        Exclude("E2", 12, "smeared too").Well();
        Again();
        Assert.Equal(("4", "3", "1"), (Results().Value("E2", "observations"), Results().Value("E2", "specimens"), Results().Value("E2", "df2")));
        HonestOutput.Of(_place, "C", "E2");
    }

    [Fact]
    public void A_campaign_without_a_plan_takes_exclusions_before_and_after_its_seal()
    {
        _place.Run("start", "X").Well();
        _place.Run("load", "X", _place.Write("week-01.csv", Data)).Well();
        _place.Run("exclude", "X", "E1", "--line", "7", "--reason", "panel dropped", "--as", "A. Moss").Well();
        Assert.Contains(Why, _place.Run("results", "X", "--format", "csv").Well().Csv.Value("E1", "amendments"), StringComparison.Ordinal);
        _place.Run("seal", "X").Well();
        _place.Run("test", "X").Well();
        _place.Run("review", "X").Well();
        CsvText results = _place.Run("results", "X", "--format", "csv").Well().Csv;
        Assert.Equal(("8", Why), (results.Value("E1", "observations"), results.Value("E1", "amendments")));
        _place.Run("exclude", "X", "E1", "--line", "6", "--reason", "too", "--as", "B").Well();
        Assert.Equal("ready", _place.Run("results", "X", "--format", "csv").Well().Csv.Value("E1", "status"));
        HonestOutput.Of(_place, "X", "E1", "E2", "E3");
    }

    [Fact]
    public void An_export_after_exclusions_lists_them_and_its_folder_runs_again_with_every_value()
    {
        string folder = _place.Campaign("C", Plan, Data);
        _place.Run("run", folder).Well();
        string all = Results().Value("E1", "p");
        Exclude("E1", 7, "=1+1, then \"quoted\"; =2").Well();
        Again();
        Ran exported = _place.Run("export", "C", "--out", _place.At("out")).Well();
        Assert.Contains("exclusions.csv", exported.Out + exported.Error, StringComparison.Ordinal);
        Assert.Contains("does not exclude them again", string.Join(' ', (exported.Out + exported.Error).Split()), StringComparison.Ordinal);
        var decisions = CsvText.Read(File.ReadAllText(_place.At("out", "exclusions.csv")));
        Assert.Equal(["E1", "week-01.csv", "7", "b", "9.9", "true"], Assert.Single(decisions.Rows)[..6]);
        var measurements = CsvText.Read(File.ReadAllText(_place.At("out", "measurements", "measurements.csv")));
        Assert.Equal(18, measurements.Rows.Count);

        _place.Run("run", _place.At("out"), "--catalog", _place.At("again.db")).Well();
        CsvText again = _place.Run("results", "C", "--catalog", _place.At("again.db"), "--format", "csv").Well().Csv;
        Assert.Equal((all, ""), (again.Value("E1", "p"), again.Value("E1", "amendments")));
        _place.Run("run", folder).Well();
        Assert.Equal("8", Results().Value("E1", "observations"));
    }

    [Theory]
    [InlineData(2, "'--reason' is required", "E1", "--line", "7", "--as", "B")]
    [InlineData(2, "'--line' is required", "E1", "--reason", "r", "--as", "B")]
    [InlineData(2, "--line takes a whole number from 1 to", "E1", "--line", "seven", "--reason", "r", "--as", "B")]
    [InlineData(2, "--line takes a whole number from 1 to", "E1", "--line", "0", "--reason", "r", "--as", "B")]
    [InlineData(2, "--line takes a whole number from 1 to", "E1", "--line", "99999999999", "--reason", "r", "--as", "B")]
    [InlineData(2, "--reason must not be empty", "E1", "--line", "7", "--reason", " ", "--as", "B")]
    [InlineData(2, "--as must not be empty", "E1", "--line", "7", "--reason", "r", "--as", "")]
    [InlineData(2, "There is no option '--why'", "E1", "--line", "7", "--why", "r")]
    [InlineData(3, "no experiment 'E9'", "E9", "--line", "7", "--reason", "r", "--as", "B")]
    [InlineData(3, "No value of experiment 'E1' stands on line 12", "E1", "--line", "12", "--reason", "r", "--as", "B")]
    [InlineData(3, "stands on line 7 of 'other.csv'", "E1", "--line", "7", "--file", "other.csv", "--reason", "r", "--as", "B")]
    public void What_cannot_be_excluded_is_refused_in_one_sentence_and_nothing_changes(int code, string words, params string[] arguments)
    {
        _place.Run("run", _place.Campaign("C", Plan, Data)).Well();
        string before = HonestOutput.Of(_place, "C", "E1");
        Ran refused = _place.Run(["exclude", "C", .. arguments]).Refused(code, words);
        Assert.Single(refused.Error.TrimEnd('\n').Split('\n'));
        Assert.Equal(before, HonestOutput.Of(_place, "C", "E1"));
    }

    private CsvText Results() => _place.Run("results", "C", "--format", "csv").Well().Csv;

    private Ran Exclude(string experiment, int line, string reason, params string[] more) =>
        _place.Run(["exclude", "C", experiment, "--line", FormattableString.Invariant($"{line}"), "--reason", reason, "--as", "A. Moss", .. more]);

    private void Again()
    {
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
    }

    private string Unwrapped(params string[] command) => string.Join(' ', _place.Run(command).Well().Out.Split((char[])[' ', '\n'], StringSplitOptions.RemoveEmptyEntries));
}
