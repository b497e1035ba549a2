using AngleSharp.Dom;
using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Report;

/// <summary>Names that try to be markup stay names, in the page and in the notebook.</summary>
public sealed class ReportEscapingTests : IDisposable
{
    private readonly Workplace _place = new();

    public ReportEscapingTests() => HostileCampaign.Run(_place);

    public void Dispose() => _place.Dispose();

    [Fact]
    public void The_page_has_no_element_and_no_attribute_that_a_name_brought()
    {
        ReadPage page = ReadPage.Of(_place.Run("report", "H").Well().Out);
        Assert.Single(page.Document.QuerySelectorAll("script"));
        Assert.Single(page.Document.QuerySelectorAll("style"));
        Assert.Empty(page.Document.QuerySelectorAll("img, b, u, [onerror], [src]"));
        Assert.All(page.Document.QuerySelectorAll("a"), a => Assert.StartsWith("#", a.GetAttribute("href"), StringComparison.Ordinal));
        Assert.Equal($"{HostileCampaign.Script} & title", page.Document.QuerySelector("h1")!.TextContent);
    }

    [Fact]
    public void Every_name_is_shown_as_it_is_and_marks_of_direction_as_their_codes()
    {
        ReadPage page = ReadPage.Of(_place.Run("report", "H").Well().Out);
        ReadTable results = page.Table("results", "Results");
        Assert.Equal([HostileCampaign.Script, "1. - # E2"], results.Column("experiment"));
        Assert.Equal([HostileCampaign.Bars, "abc\\u{202E}gpj\\u{2066}x"], results.Column("title"));
        Assert.Contains(HostileCampaign.Image, page.Table("plan", "Observations left out").Column("by"));
        Assert.Contains("</td></tr>|*b*", page.Table("survivors", "Comparisons claimed").Column("group b").Concat(page.Table("survivors", "Comparisons claimed").Column("group a")));
        Assert.Contains("\\u{FFFE}", page.Text, StringComparison.Ordinal);
        Assert.DoesNotContain(page.Text, c => c is '\u202e' or '\u2066' or '\uFFFE' || (char.IsControl(c) && c != '\n'));
    }

    [Fact]
    public void A_link_leads_to_the_experiment_of_its_name()
    {
        IDocument page = ReadPage.Of(_place.Run("report", "H").Well().Out).Document;
        IElement link = page.QuerySelectorAll("#results th > a").Single(a => a.TextContent == HostileCampaign.Script);
        Assert.StartsWith(HostileCampaign.Script + ":", page.QuerySelector(link.GetAttribute("href")!)!.TextContent, StringComparison.Ordinal);
    }
}
