using AngleSharp.Dom;
using AngleSharp.Html.Dom;
using AngleSharp.Html.Dom.Events;
using AngleSharp.Html.Parser;

namespace Campaigns.App.Tests.Report;

/// <summary>A report read back as a browser reads it: any fault of its HTML is an error.</summary>
internal sealed class ReadPage
{
    private ReadPage(IHtmlDocument document) => Document = document;

    public IHtmlDocument Document { get; }

    public string Text => Document.Body!.TextContent;

    public IReadOnlyList<string> Sections => [.. Document.QuerySelectorAll("main > section").Select(s => s.Id!)];

    public static ReadPage Of(string html)
    {
        var faults = new List<string>();
        var parser = new HtmlParser();
        parser.Error += (_, e) => Note(html, (HtmlErrorEvent)e, faults);
        IHtmlDocument document = parser.ParseDocument(html);
        Assert.Empty(faults);
        return new ReadPage(document);
    }

    /// <summary>The parser takes the end of clipPath for a mistake, since it compares it with the name in small letters; HTML says to compare both in small letters (section 13.2.6.5).</summary>
    private static void Note(string html, HtmlErrorEvent fault, List<string> faults)
    {
        int at = fault.Position.Index;
        string around = html[Math.Max(0, at - 30)..Math.Min(html.Length, at + 30)];
        if (!around.Contains("</clipPath>", StringComparison.Ordinal))
        {
            faults.Add($"{fault.Message} ({fault.Code}) near: {around}");
        }
    }

    public IElement Section(string anchor) => Document.QuerySelector($"main > section#{anchor}") ?? throw new InvalidOperationException($"The report has no section '{anchor}'.");

    /// <summary>The table whose caption begins so, in a section or an element of it.</summary>
    public static ReadTable Table(IElement within, string caption) =>
        ReadTable.Of(within.QuerySelectorAll("table").Single(t => t.QuerySelector("caption")!.TextContent.StartsWith(caption, StringComparison.Ordinal)));

    public ReadTable Table(string section, string caption) => Table(Section(section), caption);

    /// <summary>The exact value, else the text, of what stands beside a name in a list of facts.</summary>
    public string Fact(string section, string name)
    {
        IElement value = Section(section).QuerySelectorAll("dl > div").Single(d => d.QuerySelector("dt")!.TextContent == name).QuerySelector("dd")!;
        return value.GetAttribute("data-value") ?? value.TextContent;
    }
}

/// <summary>A table of a report: of each cell the exact value where it has one, else its text.</summary>
internal sealed record ReadTable(IReadOnlyList<string> Headings, IReadOnlyList<IReadOnlyList<string>> Rows, IReadOnlyList<IReadOnlyList<string>> Shown)
{
    public static ReadTable Of(IElement table)
    {
        IElement[] rows = [.. table.QuerySelectorAll("tbody > tr")];
        return new ReadTable(
            [.. table.QuerySelectorAll("thead th").Select(h => h.TextContent)],
            [.. rows.Select(r => (IReadOnlyList<string>)[.. r.Children.Select(c => c.GetAttribute("data-value") ?? c.TextContent)])],
            [.. rows.Select(r => (IReadOnlyList<string>)[.. r.Children.Select(c => c.TextContent)])]);
    }

    public IReadOnlyList<string> Column(string heading)
    {
        int at = Headings.ToList().IndexOf(heading);
        Assert.True(at >= 0, $"no column '{heading}' among {string.Join(", ", Headings)}");
        return [.. Rows.Select(r => r[at])];
    }
}
