using System.Security.Cryptography;
using System.Text;
using AngleSharp.Dom;

namespace Campaigns.App.Tests.Report;

/// <summary>The page as a page: its sections, its landmarks, its tables and figures, and that it asks for nothing.</summary>
public sealed class ReportShapeTests(ShippedReports shipped) : IClassFixture<ShippedReports>
{
    private static readonly string[] Always = ["summary", "plan", "results", "survivors", "in-full", "corrections", "ranking", "risk", "reviews", "files", "methods", "record", "cautions"];

    public static TheoryData<string> Shipped => [.. ShippedReports.Codes];

    [Theory]
    [MemberData(nameof(Shipped))]
    public void It_has_every_section_and_the_contents_lead_to_them(string code)
    {
        ReadPage page = shipped.Page(code);
        Assert.Equal(Always, page.Sections);
        Assert.Equal(page.Sections.Select(s => "#" + s), page.Document.QuerySelectorAll("nav a").Select(a => a.GetAttribute("href")));
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Ids_are_unique_and_every_link_leads_to_one(string code)
    {
        IDocument page = shipped.Page(code).Document;
        string[] ids = [.. page.QuerySelectorAll("[id]").Select(e => e.Id!)];
        Assert.Equal(ids.Length, ids.Distinct().Count());
        Assert.All(page.QuerySelectorAll("a"), a => Assert.Contains(a.GetAttribute("href")![1..], ids));
        Assert.All(page.QuerySelectorAll("[aria-labelledby]").SelectMany(e => e.GetAttribute("aria-labelledby")!.Split(' ')), id => Assert.Contains(id, ids));
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void It_loads_nothing_and_its_policy_forbids_it(string code)
    {
        IDocument page = shipped.Page(code).Document;
        Assert.Empty(page.QuerySelectorAll("[src], [srcset], link, iframe, object, embed, base, form, image, use, [style]"));
        Assert.DoesNotContain(page.QuerySelectorAll("*").SelectMany(e => e.Attributes), a => a.Name.StartsWith("on", StringComparison.Ordinal));
        string script = page.QuerySelectorAll("script").Single().TextContent, style = page.QuerySelectorAll("style").Single().TextContent;
        Assert.DoesNotContain("url(", style, StringComparison.Ordinal);
        Assert.DoesNotContain("@import", style, StringComparison.Ordinal);
        Assert.Equal(
            $"default-src 'none'; style-src '{Digest(style)}'; script-src '{Digest(script)}'; base-uri 'none'; form-action 'none'",
            page.QuerySelector("meta[http-equiv=Content-Security-Policy]")!.GetAttribute("content"));
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Headings_go_down_one_step_at_a_time_and_landmarks_are_there_once(string code)
    {
        IDocument page = shipped.Page(code).Document;
        int before = 0;
        foreach (int level in page.QuerySelectorAll("h1, h2, h3, h4, h5, h6").Select(h => h.TagName[1] - '0'))
        {
            Assert.InRange(level, 1, before + 1);
            before = level;
        }

        Assert.All((string[])["h1", "body > header", "nav", "main", "body > footer", "title"], one => Assert.Single(page.QuerySelectorAll(one == "title" ? "head > title" : one)));
        Assert.Equal("en", page.DocumentElement.GetAttribute("lang"));
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Tables_have_captions_and_scopes_and_as_many_cells_as_heads(string code)
    {
        foreach (IElement table in shipped.Page(code).Document.QuerySelectorAll("table"))
        {
            Assert.NotEqual("", table.QuerySelector("caption")!.TextContent);
            int columns = table.QuerySelectorAll("thead th[scope=col]").Length;
            Assert.Equal(columns, table.QuerySelectorAll("thead th").Length);
            Assert.All(table.QuerySelectorAll("tbody > tr"), row => Assert.Equal((columns, "row"), (row.Children.Length, row.Children[0].GetAttribute("scope"))));
        }
    }

    [Theory]
    [MemberData(nameof(Shipped))]
    public void Figures_have_a_title_and_words_and_every_experiment_with_values_has_one_or_the_reason_why_not(string code)
    {
        IElement[] figures = [.. shipped.Page(code).Document.QuerySelectorAll("figure > svg")];
        Assert.All(figures, f => Assert.True(f.GetAttribute("role") == "img" && f.QuerySelector("title")!.TextContent.Length > 5 && f.QuerySelector("desc")!.TextContent.Any(char.IsAsciiDigit)));
        int withValues = shipped.Csv("results", code).Column("observations").Count(n => n != "0");
        int without = shipped.Page(code).Section("in-full").QuerySelectorAll("p.empty").Count(p => p.TextContent.Contains("by group. No picture: the values of", StringComparison.Ordinal));
        Assert.Equal(code == "nist-one-way" ? 3 : 0, without);
        Assert.Equal(withValues - without, figures.Count(f => f.QuerySelector("title")!.TextContent.EndsWith("by group", StringComparison.Ordinal)));
    }

    [Fact]
    public void The_same_record_gives_the_same_bytes_whenever_it_is_asked()
    {
        string first = shipped.Place.Run("report", "adhesion-screen").Well().Out;
        shipped.Place.Clock.Advance(TimeSpan.FromDays(40));
        Assert.Equal(first, shipped.Place.Run("report", "adhesion-screen").Well().Out);
        string notes = shipped.Place.Run("report", "adhesion-screen", "--format", "markdown").Well().Out;
        Assert.Equal(notes, shipped.Place.Run("report", "adhesion-screen", "--format", "markdown").Well().Out);
    }

    [Fact]
    public void Methods_name_what_was_used_with_the_sources_and_nothing_else()
    {
        string methods = shipped.Page("adhesion-screen").Section("methods").TextContent;
        Assert.All((string[])["R. A. Fisher, Statistical Methods for Research Workers, 1925.", "Y. Benjamini and Y. Hochberg (1995)", "C. W. Dunnett (1955)", "S. S. Shapiro and M. B. Wilk", "J. D. Storey (2002)"], source => Assert.Contains(source, methods, StringComparison.Ordinal));
        Assert.All((string[])["Kruskal", "Games", "alpha-spending"], other => Assert.DoesNotContain(other, methods, StringComparison.Ordinal));
        Assert.Contains("Kruskal", shipped.Page("published-designs").Section("methods").TextContent, StringComparison.Ordinal);
    }

    private static string Digest(string text) => $"sha256-{Convert.ToBase64String(SHA256.HashData(Encoding.UTF8.GetBytes(text)))}";
}
