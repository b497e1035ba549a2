using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

/// <summary>withdraw, and plan with a reason after the seal, from the command line to every output that must mention them.</summary>
public sealed class PlanChangeTests : IDisposable
{
    private const string Plan = "experiment,title,groups,replicates\nE1,first,a|b,3\nE2,second,a|b,2\nE3,third,a|b,2\n";

    private readonly Workplace _place = new() { Width = 1000 };

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Withdrawing_with_data_keeps_the_family_and_without_data_shrinks_it_and_every_output_says_so()
    {
        Open();
        Assert.Equal(("true", "3", "planned"), (Result("E1", "survives"), Result("E1", "family_size"), Result("E3", "status")));
        Ran gone = _place.Run("withdraw", "C", "E1", "E3", "--reason", " panel broke ", "--as", "A. Moss").Well();
        Assert.Contains("Recorded: E1 withdrawn after its data came, so that it counts with p = 1, by A. Moss: panel broke.", gone.Out, StringComparison.Ordinal);
        Assert.Contains("Recorded: E3 withdrawn before any data, so that it left the family, by A. Moss: panel broke.", gone.Out, StringComparison.Ordinal);
        Assert.Equal(["withdrawn", "tested", "withdrawn"], _place.Run("results", "C", "--format", "csv").Csv.Column("status"));
        Assert.Equal(("", "", "", "2"), (Result("E1", "p"), Result("E1", "adjusted_p"), Result("E1", "survives"), Result("E2", "family_size")));
        foreach (string[] command in (string[][])[["results", "C"], ["survivors", "C"], ["comparisons", "C"], ["show", "C"], ["show", "C", "E2"], ["bound", "C", "E2"], ["overall", "C"], ["risk", "C"], ["corrections", "C"], ["review", "C"]])
        {
            string said = _place.Run(command).Well().Out;
            Assert.Contains("Withdrawn after their data came: 1 experiment; it stays in the family and counts with p = 1.", said, StringComparison.Ordinal);
            Assert.Contains("it left the family, which had 3 and has 2. For 1 of them results of other experiments had been seen by then", said, StringComparison.Ordinal);
        }

        Assert.Contains("Deviation from the plan: withdrawn after its data came", _place.Run("show", "C", "E1").Well().Out, StringComparison.Ordinal);
        Assert.Contains("Deviation from the plan: withdrawn before any data, so that it left the family", _place.Run("show", "C", "E3").Well().Out, StringComparison.Ordinal);
        _place.Run("bound", "C", "E3").Refused(3, "was withdrawn before any data");
        Assert.Equal("0", _place.Run("list", "--format", "csv").Csv.Column("survivors").Single());
        Assert.Equal(["E1", "E3"], _place.Run("show", "C", "--withdrawals", "--format", "csv").Csv.Column("experiment"));

        _place.Run("withdraw", "C", "E1", "--take-back", "--reason", "found").Well();
        Assert.Contains("is out of date", _place.Run("results", "C").Out, StringComparison.Ordinal);
        _place.Run("test", "C").Well();
        Assert.Equal("true", Result("E1", "survives"));
    }

    [Fact]
    public void What_withdraw_cannot_do_it_refuses_in_a_sentence_and_changes_nothing()
    {
        Open();
        byte[] before = File.ReadAllBytes(_place.Catalog);
        _place.Run("withdraw", "C", "E1", "E9", "--reason", "r").Refused(3, "has no experiment 'E9'", "Nothing was changed.");
        _place.Run("withdraw", "C", "E1", "--take-back", "--reason", "r").Refused(3, "is not withdrawn");
        _place.Run("withdraw", "C", "E1").Refused(2, "--reason");
        _place.Run("withdraw", "C", "--reason", "r").Refused(2, "'campaigns withdraw' needs EXPERIMENT: the experiments");
        Assert.DoesNotContain("--reason", _place.Run("withdraw", "C").Refused(2, "'campaigns withdraw' needs EXPERIMENT").Error, StringComparison.Ordinal);
        _place.Run("show", "C", "-E1").Refused(2, "There is no option '-E1'", "a name that begins with a hyphen is typed after '--'");
        _place.Run("show", "C", "--", "-E1").Refused(3, "no experiment '-E1'");
        _place.Run("withdraw", "C", "E1", "--reason", " ").Refused(2, "--reason must not be empty");
        Assert.Equal(before, File.ReadAllBytes(_place.Catalog));
        _place.Run("withdraw", "C", "E3", "--reason", "r").Well();
        _place.Run("load", "C", _place.Write("more.csv", "experiment,group,value\nE3,a,1\nE3,b,2\n")).Refused(3, "line 2", "is withdrawn and takes no measurements");
    }

    [Fact]
    public void A_sealed_plan_is_amended_with_a_reason_and_every_output_says_so()
    {
        Open();
        string rows = _place.Run("show", "C", "--plan", "--format", "csv").Well().Out;
        string file = _place.Write("amended.csv", rows.Replace("second", "second, again", StringComparison.Ordinal).Replace(",second, again,", ",\"second, again\",", StringComparison.Ordinal) + "E4,,,,a|b,,f,none,2,,,,,,\n");
        _place.Run("plan", "C", file).Refused(3, "takes no changes", "--reason TEXT");
        Ran amended = _place.Run("plan", "C", file, "--reason", "new line of resins", "--as", "A. Moss").Well();
        Assert.Contains("1 experiment added, 1 changed, 2 as before. Recorded as an amendment", amended.Out, StringComparison.Ordinal);
        foreach (string[] command in (string[][])[["results", "C"], ["survivors", "C"], ["comparisons", "C"], ["show", "C"], ["review", "C"]])
        {
            Assert.Contains("The sealed plan was amended once: 1 experiment added, 1 changed", _place.Run(command).Well().Out, StringComparison.Ordinal);
        }

        Assert.Equal(("4", "second, again"), (Result("E1", "family_size"), Result("E2", "title")));
        Assert.Contains("title of the sealed plan changed from 'second' to 'second, again' (amendment 1), by A. Moss: new line of resins", Result("E2", "amendments"), StringComparison.Ordinal);
        CsvText list = _place.Run("show", "C", "--amendments", "--format", "csv").Well().Csv;
        Assert.Equal(["title", "added"], list.Column("field"));
        Assert.Equal(rows, _place.Run("show", "C", "--sealed-plan", "--format", "csv").Well().Out);
        Assert.Contains("is the one that the seal stored", Alone(_place.Run("show", "C", "--sealed-plan").Well().Out), StringComparison.Ordinal);
        using var json = JsonDocument.Parse(_place.Run("show", "C", "--format", "json").Well().Out);
        Assert.Equal(1, json.RootElement[0].GetProperty("plan_amendments").GetInt32());
        _place.Run("plan", "C", _place.Write("heavier.csv", "experiment,title,groups,replicates,weight\nE1,first,a|b,3,2\n"), "--reason", "r").Refused(3, "E1: weight stays empty, not '2'");
        Assert.Contains("Nothing was amended", _place.Run("plan", "C", file, "--reason", "again").Well().Out, StringComparison.Ordinal);
        _place.Run("show", "C", "--plan", "--amendments").Refused(2, "one thing at a time");
    }

    [Fact]
    public void A_folder_runs_again_with_the_plan_as_it_was_sealed_and_as_it_was_amended_and_with_no_other()
    {
        string folder = _place.Campaign("C", "experiment,replicates\nE1,3\nE2,2\n", Workplace.TwoExperiments);
        _place.Run("run", folder).Well();
        _place.Run("run", folder).Well();
        _place.Run("plan", "C", _place.Write("one-more.csv", "experiment,replicates\nE3,3\n"), "--reason", "r").Well();
        Assert.Contains("as it was sealed; its amendments stand", _place.Run("run", folder).Well().Out, StringComparison.Ordinal);
        _place.Write("C/plan.csv", "experiment,replicates\nE1,3\nE2,2\nE3,3\n");
        Assert.Contains("plan.csv says the same.", _place.Run("run", folder).Well().Out, StringComparison.Ordinal);
        _place.Write("C/plan.csv", "experiment,replicates\nE1,3\nE3,3\n");
        _place.Run("run", folder).Refused(3, "differs from the sealed plan", "--reason TEXT");
    }

    private void Open()
    {
        _place.Run("start", "C").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", Plan)).Well();
        _place.Run("seal", "C").Well();
        _place.Run("load", "C", _place.Write("week-01.csv", Workplace.TwoExperiments)).Well();
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
    }

    private string Result(string experiment, string column) => _place.Run("results", "C", "--format", "csv").Well().Csv.Value(experiment, column);

    private static string Alone(string text) => string.Join(' ', text.Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries));
}
