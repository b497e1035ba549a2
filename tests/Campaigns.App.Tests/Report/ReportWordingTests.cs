using System.Globalization;
using Campaigns.App.Tests.Commands;
using Campaigns.App.Wording;

namespace Campaigns.App.Tests.Report;

/// <summary>What stands beside the numbers: reasons for what is not there, names in place of keys, the next step that there is.</summary>
public sealed class ReportWordingTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void A_group_whose_values_are_alike_or_that_has_one_has_no_interval_and_the_reason_is_said()
    {
        _place.Run("run", _place.Campaign("C", null, "experiment,group,value\nE1,alike,5\nE1,alike,5\nE1,alike,5\nE1,b,1.0\nE1,b,1.2\nE1,b,1.1\nE1,single,3\n")).Well();
        ReadPage page = Page("C");
        ReadTable groups = page.Table("in-full", "E1: groups");
        int alike = groups.Column("group").ToList().IndexOf("alike"), other = groups.Column("group").ToList().IndexOf("b");
        Assert.Equal(("", "", "0"), (groups.Column("lower")[alike], groups.Column("upper")[alike], groups.Column("sd")[alike]));
        Assert.NotEqual("", groups.Column("lower")[other]);
        Assert.Contains("No interval for alike: all values alike", page.Section("in-full").TextContent, StringComparison.Ordinal);
        Assert.Contains("No interval for single: a single value", page.Section("in-full").TextContent, StringComparison.Ordinal);

        // One interval is a line and its two ends.
        Assert.Equal(3, page.Document.QuerySelectorAll("#in-full svg")[0].QuerySelectorAll("[data-series=interval] path").Length);
    }

    [Fact]
    public void The_purpose_of_the_campaign_stands_on_the_first_page()
    {
        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        Assert.Equal("Purpose: Test", Page("C").Section("summary").QuerySelector("p")!.TextContent);
    }

    [Fact]
    public void The_plan_names_its_procedures_with_the_keys_in_brackets()
    {
        _place.Run("run", _place.Campaign("C", "experiment,groups,control,test,follow_up\nE1,a|b,a,welch,dunnett\nE2,a|b,,,tukey-kramer\n", Workplace.TwoExperiments)).Well();
        ReadPage page = Page("C");
        Assert.Equal("One-way analysis of variance, F test (f)", page.Fact("plan", "Usual test"));
        Assert.Equal("no comparisons (none)", page.Fact("plan", "Usual follow-up"));
        Assert.Equal("Benjamini-Hochberg (bh)", page.Fact("plan", "Correction"));
        ReadTable plan = page.Table("plan", "The plan");
        Assert.EndsWith(" (welch)", plan.Column("test")[0], StringComparison.Ordinal);
        Assert.Equal(["Dunnett (dunnett)", "Tukey-Kramer (tukey-kramer)"], plan.Column("follow up"));
    }

    [Fact]
    public void A_survivor_without_a_selected_interval_is_named_with_the_reason()
    {
        string values = string.Concat(Enumerable.Range(0, 6).Select(i => FormattableString.Invariant($"E1,a,{10 + (i * 0.1)}\nE1,b,{20 + (i * 0.1)}\nE1,c,{5 + (i * 0.1)}\nE2,a,{1 + (i * 0.1)}\nE2,b,{9 + (i * 0.1)}\nE3,a,{1 + (i * 0.1)}\nE3,b,{9 + (i * 0.1)}\n")));
        _place.Run("run", _place.Campaign("C", "experiment,groups,control,follow_up\nE1,a|b|c,a,dunnett\nE2,a|b,,none\nE3,a|b,,holm-pairs\n", "experiment,group,value\n" + values)).Well();
        string text = Page("C").Section("survivors").TextContent;
        Assert.Contains("No selected interval of the gap: E1 (Dunnett does not compare these two groups).", text, StringComparison.Ordinal);
        Assert.Contains("No selected interval of the gap: E2 (no follow-up was planned).", text, StringComparison.Ordinal);
    }

    [Fact]
    public void What_is_not_tested_yet_is_to_be_tested_and_not_reviewed()
    {
        _place.Run("start", "C").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", "experiment,groups\nE1,a|b\n")).Well();
        Assert.Contains("'campaigns seal C'", Page("C").Section("summary").TextContent, StringComparison.Ordinal);
        _place.Run("seal", "C").Well();
        string sealedPage = Page("C").Section("summary").TextContent;
        Assert.Contains("'campaigns test C'", sealedPage, StringComparison.Ordinal);
        Assert.DoesNotContain("'campaigns review C'", sealedPage, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(14, 6, "Of the 14 survivors at most 6 are false (95 % confidence)")]
    [InlineData(4, 1, "Of the 4 survivors at most 1 is false (95 % confidence)")]
    [InlineData(4, 0, "Of the 4 survivors none is false (95 % confidence)")]
    [InlineData(1, 0, "The one survivor is not false (95 % confidence)")]
    [InlineData(1, 1, "The one survivor may be false: the bound does not exclude it (95 % confidence)")]
    public void The_bound_of_the_survivors_reads_well_for_every_number(int survivors, int falseAtMost, string expected) =>
        Assert.Equal(expected, BoundWording.OfSurvivors(survivors, falseAtMost, 0.95));

    [Fact]
    public void Times_of_withdrawals_stand_left_as_text_does_in_a_notebook()
    {
        _place.Run("run", _place.Campaign("C", "experiment,groups\nE1,a|b\nE2,a|b\nE3,a|b\n", Workplace.TwoExperiments)).Well();
        _place.Run("withdraw", "C", "E3", "--reason", "resin no longer made").Well();
        string[] lines = _place.Run("report", "C", "--format", "markdown").Well().Out.Split('\n');
        int caption = Array.FindIndex(lines, l => l.StartsWith("**Experiments withdrawn", StringComparison.Ordinal));
        Assert.EndsWith("| at |", lines[caption + 2], StringComparison.Ordinal);
        Assert.DoesNotContain("---:", lines[caption + 3], StringComparison.Ordinal);
    }

    [Fact]
    public void The_first_page_says_how_many_survivors_it_leaves_to_the_record()
    {
        _place.Run("run", ManySurvivors.Folder(_place)).Well();
        ReadPage page = Page("many");
        string caption = page.Section("summary").QuerySelector("caption")!.TextContent;
        int shown = page.Table("summary", "What survives").Rows.Count;
        Assert.InRange(shown, 8, ManySurvivors.Count - 1);
        Assert.Contains(string.Create(CultureInfo.InvariantCulture, $"the {shown} of {ManySurvivors.Count} with the smallest p; the other {ManySurvivors.Count - shown} stand under Survivors"), caption, StringComparison.Ordinal);
    }

    private ReadPage Page(string code) => ReadPage.Of(_place.Run("report", code, "--most", "3").Well().Out);
}
