using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Loading;

public sealed class PlanFileTests
{
    private static readonly KnownKeys Known = new(["f", "welch", "kruskal-wallis"], ["none", "dunnett", "tukey-kramer"], ["bh"]);
    private static readonly PlanDefaults Defaults = new("f", "none");

    [Fact]
    public void A_full_row_gives_every_part_of_the_plan()
    {
        PlanFileResult result = Read(
            "experiment,title,response,unit,groups,control,test,follow_up,replicates,smallest_effect,assumed_sd,weight,family\n"
            + "E1,Adhesion of primers,adhesion,MPa, ctrl | A|B ,ctrl,welch,dunnett,6,0.5,0.25,2,primers\n");

        Assert.True(result.Problems.IsEmpty);
        PlannedExperiment plan = Assert.Single(result.Experiments);
        Assert.Equal(["ctrl", "A", "B"], plan.Groups);
        Assert.Equal(
            new PlannedExperiment
            {
                Code = "E1",
                Title = "Adhesion of primers",
                Response = "adhesion",
                Unit = "MPa",
                Groups = plan.Groups,
                Control = "ctrl",
                Test = "welch",
                FollowUp = "dunnett",
                Replicates = 6,
                SmallestEffect = 0.5,
                AssumedStandardDeviation = 0.25,
                Weight = 2,
                Family = "primers",
            },
            plan);
    }

    [Fact]
    public void Only_the_experiment_is_required_and_the_rest_has_defaults()
    {
        PlanFileResult result = Read("Remark;EXPERIMENT;Weight\nx;E1;\n;E2;0\n");

        Assert.True(result.Problems.IsEmpty);
        Assert.Equal(["Remark"], result.IgnoredColumns);
        Assert.Equal(["E1", "E2"], result.Experiments.Select(e => e.Code));
        PlannedExperiment first = result.Experiments[0];
        Assert.Equal(("f", "none", null, null, null), (first.Test, first.FollowUp, first.Control, first.Replicates, first.Weight));
        Assert.Empty(first.Groups);
        Assert.Null(first.Family);
        Assert.Equal(0, result.Experiments[1].Weight);
    }

    [Fact]
    public void One_column_is_enough() => Assert.Equal(["E1", "E2"], Read("experiment\nE1\nE2\n").Experiments.Select(e => e.Code));

    [Theory]
    [InlineData("groups", "A", "too-few-groups")]
    [InlineData("groups", "A|", "empty-name")]
    [InlineData("groups", "A||B", "empty-name")]
    [InlineData("groups", "A|B|A", "duplicate-group")]
    [InlineData("groups", "A|\"B\u0007\"", "stray-quote")]
    [InlineData("test", "welsh", "unknown-test")]
    [InlineData("follow_up", "dunnet", "unknown-follow-up")]
    [InlineData("replicates", "1", "bad-replicates")]
    [InlineData("replicates", "2.5", "bad-replicates")]
    [InlineData("replicates", "-3", "bad-replicates")]
    [InlineData("replicates", "99999999999", "bad-replicates")]
    [InlineData("smallest_effect", "0", "out-of-range")]
    [InlineData("smallest_effect", "-1", "out-of-range")]
    [InlineData("smallest_effect", "5 mPa", "unit")]
    [InlineData("assumed_sd", "0.0", "out-of-range")]
    [InlineData("assumed_sd", "NaN", "not-finite")]
    [InlineData("weight", "-0.1", "out-of-range")]
    [InlineData("weight", "1e999", "too-large")]
    [InlineData("title", "a\u001B[2Jb", "control-character")]
    [InlineData("family", "x\u0001", "control-character")]
    public void A_wrong_cell_is_refused_at_its_place(string column, string cell, string code)
    {
        PlanFileResult result = Read($"experiment,{column}\nE1,\nE2,{cell}\n");

        Assert.Equal(["E1"], result.Experiments.Select(e => e.Code));
        Assert.Equal([code == "stray-quote" ? "stray-quote@3" : $"{code}@3:{column}"], Outcome.Codes(result.Problems));
    }

    [Fact]
    public void An_unknown_key_is_told_with_the_known_ones_and_the_nearest()
    {
        string sentence = Assert.Single(Read("experiment,test\nE1,welsh\n").Problems.Sentences());
        Assert.Contains("did you mean welch?", sentence, StringComparison.Ordinal);
        Assert.Contains("f, welch, kruskal-wallis", sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void The_control_is_one_of_the_groups()
    {
        PlanFileResult result = Read("experiment,groups,control\nE1,ctrl|A,Ctrl\nE2,,ctrl\n");
        Assert.Equal(["unknown-control@2:control"], Outcome.Codes(result.Problems));
        Assert.Equal("ctrl", Assert.Single(result.Experiments).Control);
    }

    [Fact]
    public void An_experiment_planned_twice_is_refused_with_both_lines()
    {
        PlanFileResult result = Read("experiment,replicates\nE1,3\n\nE2,3\nE1,4\n");
        ImportProblem problem = Assert.Single(result.Problems.Kept);
        Assert.Equal((5L, "duplicate-experiment"), (problem.Line, problem.Code));
        Assert.Contains("line 2", problem.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void All_problems_of_a_plan_are_collected()
    {
        PlanFileResult result = Read("experiment,test,replicates,weight\n,x,1,-1\nE1,f\nE2,f,many,1\nE2,f,2,1\n");
        Assert.Equal(
            [
                "empty-name@2:experiment", "unknown-test@2:test", "bad-replicates@2:replicates", "out-of-range@2:weight",
                "too-few-fields@3", "bad-replicates@4:replicates", "duplicate-experiment@5:experiment",
            ],
            Outcome.Codes(result.Problems));
        Assert.Empty(result.Experiments);
    }

    [Theory]
    [InlineData("", "empty-file@0")]
    [InlineData("experiment\n", "no-rows@0")]
    [InlineData("name,title\nE1,x\n", "missing-column@1:experiment")]
    [InlineData("experiment,test,test\nE1,f,f\n", "duplicate-column@1:test")]
    public void A_plan_without_its_column_or_rows_is_refused(string text, string expected) => Assert.Equal([expected], Outcome.Codes(Read(text).Problems));

    [Fact]
    public void A_plan_may_have_decimal_commas_and_be_UTF16()
    {
        using TestFile file = new([0xFF, 0xFE, .. Encoding.Unicode.GetBytes("experiment;assumed_sd\nPrüfung;0,5\n")]);
        PlanFileResult result = PlanFile.Read(file.Path, new DelimitedFileOptions { DecimalMark = DecimalMark.Comma }, Defaults, Known);
        Assert.Equal(("Prüfung", 0.5), (result.Experiments[0].Code, result.Experiments[0].AssumedStandardDeviation));
    }

    private static PlanFileResult Read(string text)
    {
        using TestFile file = new(text, "plan.csv");
        return PlanFile.Read(file.Path, DelimitedFileOptions.Default, Defaults, Known);
    }
}
