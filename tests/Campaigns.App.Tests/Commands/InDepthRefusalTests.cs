namespace Campaigns.App.Tests.Commands;

/// <summary>Designs that an experiment's follow-up, test or specimens cannot bear are refused before they can do harm; wrong commands say so in one sentence.</summary>
public sealed class InDepthRefusalTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData("E1,a|b,,f,dunnett", "p.csv line 2, column control: the follow-up dunnett holds every group against the control")]
    [InlineData("E1,a|b,c,f,dunnett", "p.csv line 2, column control: \"c\" is none of the groups")]
    [InlineData("E1,a|b,a,block-f,games-howell", "p.csv line 2, column follow_up: games-howell uses the variance of each group alone")]
    [InlineData("E1,a|b,a,f-test,none", "p.csv line 2, column test: \"f-test\" is no test")]
    [InlineData("E1,a|b,a,f,tukey", "p.csv line 2, column follow_up: \"tukey\" is no follow-up")]
    public void A_plan_that_its_follow_up_cannot_bear_is_refused_with_file_line_and_column(string row, string words)
    {
        _place.Run("start", "C").Well();
        string plan = _place.Write("p.csv", $"experiment,groups,control,test,follow_up\n{row}\n");
        _place.Run("plan", "C", plan).Refused(3, "was refused; nothing was changed", words);
        Assert.Equal("0", _place.Run("list", "--format", "csv").Well().Csv.Column("experiments")[0]);
    }

    [Fact]
    public void A_default_follow_up_that_cannot_work_within_blocks_is_refused_where_the_plan_names_the_blocks()
    {
        _place.Run("start", "C", "--follow-up", "games-howell").Well();
        _place.Run("plan", "C", _place.Write("p.csv", "experiment,groups,test\nE1,a|b,block-f\n")).Refused(3, "line 2", "games-howell uses the variance of each group alone");
        _place.Run("plan", "C", _place.Write("q.csv", "experiment,groups,test,follow_up\nE1,a|b,block-f,holm-pairs\n")).Well();
    }

    [Fact]
    public void A_specimen_in_two_groups_is_refused_at_loading_with_file_and_line()
    {
        _place.Run("start", "C").Well();
        string bad = _place.Write("bad.csv", "experiment,group,value,specimen\nE1,a,1,s1\nE1,a,2,s2\nE1,b,3,s1\nE2,b,3,s1\n");
        Ran refused = _place.Run("load", "C", bad).Refused(3, "bad.csv line 4, column specimen", "stands in group \"b\" here and in group \"a\" before");
        Assert.Contains("Problems: 1.", refused.Error, StringComparison.Ordinal);
        string good = _place.Write("good.csv", "experiment,group,value,specimen\nE1,a,1,s1\nE1,a,2,s2\nE2,b,3,s1\n");
        _place.Run("load", "C", good).Well();
        string later = _place.Write("later.csv", "experiment,group,value,specimen\nE2,b,3,s1\nE1,b,3,s1\n");
        _place.Run("load", "C", later).Refused(3, "later.csv line 3, column specimen");
    }

    [Theory]
    [InlineData(2, "'campaigns comparisons' needs CODE", "comparisons")]
    [InlineData(2, "--format takes table, csv or json, not 'xml'", "comparisons", "C", "--format", "xml")]
    [InlineData(2, "There is no option '--all'", "comparisons", "C", "--all")]
    [InlineData(3, "There is no campaign 'D'", "comparisons", "D")]
    [InlineData(3, "There is no campaign 'D'", "exclude", "D", "E1", "--line", "2", "--reason", "r", "--as", "B")]
    [InlineData(3, "has no experiment 'E9'", "show", "C", "E9")]
    [InlineData(3, "has no experiment 'E9'", "show", "C", "E9", "--format", "json")]
    public void A_wrong_command_is_told_in_one_sentence(int code, string words, params string[] command)
    {
        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        Ran refused = _place.Run(command).Refused(code, words);
        Assert.Single(refused.Error.TrimEnd('\n').Split('\n'));
    }

    [Fact]
    public void Reading_commands_never_make_a_catalog_and_exclude_neither()
    {
        foreach (string[] command in (string[][])[["comparisons", "C"], ["show", "C", "E1"], ["exclude", "C", "E1", "--line", "2", "--reason", "r", "--as", "B"]])
        {
            _place.Run(command).Refused(4, "There is no catalog");
            Assert.False(File.Exists(_place.Catalog));
        }
    }

    [Fact]
    public void Without_a_control_and_without_a_plan_dunnett_makes_no_comparison_and_says_so()
    {
        _place.Write("C/campaign.json", """{"code": "C", "title": "T", "purpose": "T", "errorRate": "false-discovery", "level": 0.05, "correction": "bh", "test": "f", "followUp": "dunnett"}""");
        _place.Write("C/measurements/w.csv", Workplace.TwoExperiments);
        _place.Run("run", _place.At("C")).Well();
        Assert.Empty(_place.Run("comparisons", "C", "--format", "csv").Well().Csv.Rows);
        Assert.Contains("There is no comparison", _place.Run("comparisons", "C").Well().Out, StringComparison.Ordinal);
        HonestOutput.Of(_place, "C", "E1", "E2");
    }
}
