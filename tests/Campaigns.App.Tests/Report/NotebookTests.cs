using Campaigns.App.Report.Markdown;
using Campaigns.App.Tests.Commands;
using Markdig;
using Markdig.Extensions.Tables;
using Markdig.Syntax;
using Markdig.Syntax.Inlines;

namespace Campaigns.App.Tests.Report;

/// <summary>The report as Markdown, read back by a library that reads Markdown.</summary>
public sealed class NotebookTests(ShippedReports shipped) : IClassFixture<ShippedReports>
{
    private static readonly MarkdownPipeline Reading = new MarkdownPipelineBuilder().UseAdvancedExtensions().Build();

    public static TheoryData<string> Shipped => [.. ShippedReports.Codes];

    [Theory]
    [MemberData(nameof(Shipped))]
    public void It_has_the_sections_and_the_tables_of_the_page(string code)
    {
        MarkdownDocument notes = Markdig.Markdown.Parse(shipped.Place.Run("report", code, "--format", "markdown").Well().Out, Reading);
        ReadPage page = shipped.Page(code);
        Assert.Equal(page.Document.QuerySelectorAll("main h2").Select(h => h.TextContent), notes.OfType<HeadingBlock>().Where(h => h.Level == 2).Select(h => Text(h.Inline)));
        Table[] tables = [.. notes.OfType<Table>()];
        ReadTable[] expected = [.. page.Document.QuerySelectorAll("table").Select(ReadTable.Of)];
        Assert.Equal(expected.Length, tables.Length);
        for (int t = 0; t < tables.Length; t++)
        {
            string[][] rows = [.. tables[t].OfType<TableRow>().Select(r => (string[])[.. r.OfType<TableCell>().Select(c => string.Concat(c.OfType<LeafBlock>().Select(b => Text(b.Inline))))])];
            Assert.Equal(expected[t].Headings, rows[0]);
            Assert.Equal(expected[t].Shown, rows[1..]);
        }
    }

    [Fact]
    public void Names_that_try_to_be_markup_stay_names()
    {
        using var place = new Workplace();
        HostileCampaign.Run(place);
        MarkdownDocument notes = Markdig.Markdown.Parse(place.Run("report", "H", "--format", "markdown").Well().Out, Reading);
        Assert.Empty(notes.Descendants<HtmlBlock>());
        Assert.Empty(notes.Descendants<HtmlInline>());
        Assert.Empty(notes.Descendants<LinkInline>());
        Assert.Empty(notes.Descendants<AutolinkInline>());
        Assert.Empty(notes.Descendants<CodeInline>());
        string[] cells = [.. notes.Descendants<TableCell>().Select(c => string.Concat(c.OfType<LeafBlock>().Select(b => Text(b.Inline))))];
        Assert.Contains(HostileCampaign.Script, cells);
        Assert.Contains(HostileCampaign.Bars, cells);
        Assert.Contains("1. - # E2", cells);
    }

    [Theory]
    [InlineData("# no heading")]
    [InlineData("- no item")]
    [InlineData("+ no item")]
    [InlineData("12. no item")]
    [InlineData("3) no item")]
    [InlineData("> no quotation")]
    [InlineData("---")]
    [InlineData("===")]
    [InlineData("    no code")]
    [InlineData("```no code")]
    [InlineData("~~~ no code")]
    [InlineData("a ~~b~~ ==c== ++d++ ^e^ ~f~ ::g::")]
    [InlineData("https://evil.example and www.evil.example and mailto:a@b.example and a@b.example")]
    [InlineData("[a]: http://evil.example")]
    [InlineData("![a](b) [^1] &lt; $x$ {.c} :smile: \\*")]
    [InlineData("<!-- gone --> <b> & <a@b.example>")]
    [InlineData("a | b")]
    public void Any_text_comes_back_as_it_was(string text)
    {
        MarkdownDocument read = Markdig.Markdown.Parse($"{MarkdownText.Escape(text)}\n", Reading);
        ParagraphBlock paragraph = Assert.IsType<ParagraphBlock>(Assert.Single(read));
        Assert.Equal(text.Trim(), Text(paragraph.Inline));
        Assert.All(paragraph.Inline!, inline => Assert.True(inline is LiteralInline, inline.GetType().Name));
    }

    private static string Text(ContainerInline? inline) => inline is null ? "" : string.Concat(inline.Descendants<LeafInline>().Select(l => l switch
    {
        LiteralInline literal => literal.Content.ToString(),
        HtmlEntityInline entity => entity.Transcoded.ToString(),
        _ => "",
    }));
}
