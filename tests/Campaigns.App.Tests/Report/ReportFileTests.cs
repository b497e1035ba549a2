using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Report;

/// <summary>The file that a report becomes, and what is refused.</summary>
public sealed class ReportFileTests : IDisposable
{
    private readonly Workplace _place = new();

    public ReportFileTests() => _place.Run("run", _place.Campaign("C", "experiment,title\nE1,First\nE2,Second\n", Workplace.TwoExperiments)).Well();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void A_file_holds_what_standard_output_would_and_the_sentence_names_the_head()
    {
        Ran said = _place.Run("report", "C", "--out", _place.At("c.html")).Well();
        Assert.Equal(_place.Run("report", "C").Well().Out, File.ReadAllText(_place.At("c.html")));
        Assert.Contains("2 experiments in full", said.Out, StringComparison.Ordinal);
        Assert.Contains("ledger head", said.Out, StringComparison.Ordinal);
        Assert.Equal(["C", "c.html", "campaigns.db"], Directory.GetFileSystemEntries(_place.Folder).Select(f => Path.GetFileName(f)!).Order(StringComparer.Ordinal));
    }

    [Fact]
    public void A_file_named_md_is_Markdown_unless_html_is_asked_for()
    {
        _place.Run("report", "C", "--out", _place.At("c.md")).Well();
        Assert.Equal(_place.Run("report", "C", "--format", "markdown").Well().Out, File.ReadAllText(_place.At("c.md")));
        _place.Run("report", "C", "--out", _place.At("d.md"), "--format", "html").Well();
        Assert.StartsWith("<!DOCTYPE html>", File.ReadAllText(_place.At("d.md")), StringComparison.Ordinal);
    }

    [Fact]
    public void A_file_that_is_there_stays_unless_it_is_to_give_way()
    {
        string file = _place.Write("c.html", "mine");
        _place.Run("report", "C", "--out", file).Refused(3, "exists", "--force");
        Assert.Equal("mine", File.ReadAllText(file));
        _place.Run("report", "C", "--out", file, "--force").Well();
        Assert.StartsWith("<!DOCTYPE html>", File.ReadAllText(file), StringComparison.Ordinal);
    }

    [Fact]
    public void The_catalog_is_never_written_over_nor_a_folder_nor_a_place_that_is_not_there()
    {
        byte[] before = File.ReadAllBytes(_place.Catalog);
        _place.Run("report", "C", "--out", _place.Catalog, "--force").Refused(3, "is the catalog itself");
        _place.Run("plot", "C", "--out", _place.Catalog, "--force").Refused(3, "is the catalog itself");
        Assert.All(new[] { "-journal", "-wal", "-shm" }, ending => Assert.Equal(3, _place.Run("plot", "C", "--out", _place.Catalog + ending, "--force").Code));
        Assert.Equal(before, File.ReadAllBytes(_place.Catalog));
        _place.Run("report", "C", "--out", _place.Folder).Refused(3, "folder");
        _place.Run("report", "C", "--out", _place.At("nowhere", "c.html")).Refused(3, "there is no folder", "nowhere", "make it");
        _place.Run("plot", "C", "--out", _place.At("nowhere", "c.svg")).Refused(3, "there is no folder", "nowhere", "make it");
        _place.Run("dashboard", "C", "--page", "RANKING", "--picture", _place.At("nowhere", "c.svg")).Refused(3, "there is no folder", "nowhere", "make it");
        _place.Run("report", "C", "--out", _place.At("campaigns.db", "c.html")).Refused(3, "is a file and no folder");
        _place.Run("report", "C", "--force").Refused(2, "--out");
    }

    [Fact]
    public void An_unknown_campaign_or_experiment_is_refused_and_leaves_no_file()
    {
        _place.Run("report", "X", "--out", _place.At("x.html")).Refused(3, "'X'");
        _place.Run("report", "C", "--experiment", "E3", "--out", _place.At("x.html")).Refused(3, "no experiment 'E3'", "may be meant");
        _place.Run("report", "C", "--format", "csv").Refused(2, "html or markdown");
        Assert.False(File.Exists(_place.At("x.html")));
    }

    [Theory]
    [InlineData("--most 0", "")]
    [InlineData("--most 1", "E1")]
    [InlineData("--most 2", "E1 E2")]
    [InlineData("--most 0 --experiment E2", "E2")]
    [InlineData("--experiment E2", "E1 E2")]
    [InlineData("--experiment E2 E2 --most 0", "E2")]
    public void Survivors_are_shown_in_full_and_what_is_asked_for(string options, string shown)
    {
        ReadPage page = ReadPage.Of(_place.Run(["report", "C", .. options.Split(' ')]).Well().Out);
        string[] inFull = [.. page.Document.QuerySelectorAll("#in-full h3").Select(h => h.TextContent.Split(':')[0])];
        Assert.Equal(shown.Split(' ', StringSplitOptions.RemoveEmptyEntries), inFull);
        Assert.Equal(["E1", "E2"], page.Table("results", "Results").Column("experiment"));
    }

    [Theory]
    [InlineData("risk")]
    [InlineData("Risk")]
    [InlineData("RISK")]
    public void The_name_of_a_page_may_be_typed_in_small_letters_or_capitals(string name) =>
        Assert.Contains("the page Risk", _place.Run("dashboard", "C", "--page", name, "--picture", _place.At(name + ".svg")).Well().Out, StringComparison.Ordinal);

    [Fact]
    public void A_terminal_gets_neither_HTML_nor_SVG_but_Markdown()
    {
        using Workplace desk = new() { IsTerminal = true };
        desk.Variables["CAMPAIGNS_CATALOG"] = _place.Catalog;
        desk.Run("report", "C").Refused(2, "--out", "--format markdown");
        desk.Run("plot", "C").Refused(2, "--out");
        Assert.StartsWith("# ", desk.Run("report", "C", "--format", "markdown").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void Help_shows_the_formats_of_a_report_alone()
    {
        string help = _place.Run("report", "--help").Well().Out;
        Assert.Contains("--format <html|markdown>", help, StringComparison.Ordinal);
        Assert.DoesNotContain("table|csv|json", help, StringComparison.Ordinal);
        Assert.Contains("table|csv|json", _place.Run("results", "--help").Well().Out, StringComparison.Ordinal);
    }
}
