using System.Text.RegularExpressions;
using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Report;

/// <summary>Campaigns in every state: what a report says of them, and that it never says what is not so.</summary>
public sealed partial class ReportCasesTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void An_open_campaign_without_anything_has_a_report_that_says_so()
    {
        _place.Run("start", "C").Well();
        ReadPage page = Page("C");
        Assert.Equal(["summary", "plan", "results", "reviews", "files", "methods", "record", "cautions"], page.Sections);
        Says(page, "summary", "Nothing has a result yet", "The plan is not sealed yet");
        Says(page, "plan", "not sealed");
        Says(page, "results", "The campaign has no experiments yet.");
        Says(page, "files", "No file was loaded yet.");
        Says(page, "reviews", "No review was taken yet");
    }

    [Fact]
    public void A_sealed_campaign_without_a_test_shows_its_plan_and_its_values_and_no_p()
    {
        _place.Run("start", "C").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", "experiment,title,groups\nE1,One,a|b\nE2,Two,a|b\n")).Well();
        _place.Run("seal", "C").Well();
        _place.Run("load", "C", _place.Write("week.csv", Workplace.TwoExperiments)).Well();
        ReadPage page = Page("C");
        Assert.DoesNotContain("corrections", page.Sections);
        Says(page, "cautions", "Without a result: 2 of 2 experiments");
        Assert.Equal(["ready", "ready"], page.Table("results", "Results").Column("status"));
        Assert.DoesNotContain("p", page.Table("results", "Results").Headings);
        Assert.Equal(2, page.Document.QuerySelectorAll("#in-full h3").Length);
        Assert.DoesNotContain(page.Document.QuerySelectorAll("#in-full caption"), c => c.TextContent.EndsWith(": test", StringComparison.Ordinal));
        Assert.DoesNotContain("adjusted p =", page.Section("in-full").TextContent, StringComparison.Ordinal);
    }

    [Fact]
    public void An_exploratory_campaign_is_called_one_on_the_page_in_the_plan_and_in_the_cautions()
    {
        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        ReadPage page = Page("C");
        Assert.All((string[])["summary", "plan", "cautions"], section => Says(page, section, "Exploratory: the experiments were taken from the data"));
    }

    [Fact]
    public void Nothing_that_survives_is_said_to_show_no_difference_and_not_that_there_is_none()
    {
        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments, level: "0.00000001")).Well();
        Says(Page("C"), "summary", "None of 2 tested experiments survives", "no difference shown, which is not the same as no difference");
    }

    [Fact]
    public void Decisions_on_arrival_stand_in_the_order_of_the_stream()
    {
        OnlineCampaign.Open(_place, 12, "--correction", "lord");
        _place.Run("load", "C", _place.Write("week.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 8)))).Well();
        _place.Run("test", "C").Well();
        ReadPage page = Page("C");
        CsvText csv = _place.Run("decisions", "C", "--format", "csv").Well().Csv;
        ReadTable table = page.Table("decisions", "Levels given");
        Assert.Equal(csv.Column("experiment"), table.Column("experiment"));
        Assert.Equal(csv.Column("level"), table.Column("level given"));
        Assert.Equal(csv.Column("p"), table.Column("p"));
        Says(page, "summary", "LORD");
        Says(page, "cautions", "4 of 12 experiments. They are not decided yet");
    }

    [Theory]
    [InlineData(0.0, "closed")]
    [InlineData(0.8, "open")]
    public void Families_stand_with_their_levels_and_gates(double shift, string state)
    {
        _place.Run("run", ThreeFamilies.Folder(_place, shift)).Well();
        ReadPage page = Page("F");
        CsvText csv = _place.Run("families", "F", "--format", "csv").Well().Csv;
        ReadTable table = page.Table("families", "Families");
        Assert.Equal(csv.Column("family"), table.Column("family"));
        Assert.Equal(csv.Column("level"), table.Column("level"));
        Assert.Equal(csv.Column("survivors"), table.Column("survivors"));
        Assert.Equal(state == "open" ? ["yes", "yes", "yes"] : ["yes", "yes", "no"], table.Column("open"));
        Assert.Equal(state == "closed", page.Section("cautions").TextContent.Contains("The family extra is closed", StringComparison.Ordinal));
    }

    [Fact]
    public void Deviations_stand_with_their_reasons_and_names_in_the_plan_and_on_the_page()
    {
        _place.Run("run", _place.Campaign("C", "experiment,title,groups\nE1,One,a|b\nE2,Two,a|b\nE3,Three,a|b\n", Workplace.TwoExperiments)).Well();
        _place.Run("exclude", "C", "E1", "--line", "4", "--reason", "panel dropped", "--as", "A. Moss").Well();
        _place.Run("withdraw", "C", "E3", "--reason", "resin no longer made", "--as", "B. Fern").Well();
        _place.Run("plan", "C", _place.Write("more.csv", "experiment,title,groups\nE1,One,a|b\nE2,Two anew,a|b\nE3,Three,a|b\nE4,Four,a|b\n"), "--reason", "asked for by the bench", "--as", "C. Hale").Well();
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
        ReadPage page = Page("C");
        Assert.Equal(["panel dropped"], page.Table("plan", "Observations left out").Column("reason"));
        Assert.Equal(["A. Moss"], page.Table("plan", "Observations left out").Column("by"));
        Assert.Equal(["resin no longer made"], page.Table("plan", "Experiments withdrawn").Column("reason"));
        Says(page, "plan", "by C. Hale: asked for by the bench");
        Assert.Contains("Two anew", page.Table("plan", "Amendments").Column("after"));
        Says(page, "summary", "Left out of the analysis", "1 observation, of E1", "Withdrawn before any data: 1");
        Assert.Equal(["1", "2"], page.Table("reviews", "Reviews").Column("review"));
        Assert.Contains("review 1 to review 2", page.Section("reviews").TextContent, StringComparison.OrdinalIgnoreCase);
    }

    private ReadPage Page(string code)
    {
        string html = _place.Run("report", code).Well().Out;
        ReadPage page = ReadPage.Of(html);
        string text = string.Join('\n', page.Document.QuerySelectorAll("p, li, td, th, dt, dd, h1, h2, h3, text, desc").Select(e => e.TextContent));
        Match match = Dishonest().Match(text);
        Assert.False(match.Success, $"'{match.Value}' in {text[Math.Max(0, match.Index - 60)..Math.Min(text.Length, match.Index + 60)]}");
        Assert.StartsWith("# ", _place.Run("report", code, "--format", "markdown").Well().Out, StringComparison.Ordinal);
        return page;
    }

    private static void Says(ReadPage page, string section, params string[] words) =>
        Assert.All(words, word => Assert.Contains(word, page.Section(section).TextContent, StringComparison.Ordinal));

    [GeneratedRegex(@"\bNaN\b|[Ii]nfinity|∞|\bp = 0(?![.\d])|[ (]-?0(\.0+)?e[+-]?\d|1\.79\d*e308|\(\)|: \.|\. \.|\bin \.|, ,|\{\d")]
    private static partial Regex Dishonest();
}
