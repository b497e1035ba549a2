using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Html;

/// <summary>Writes a report as one page that needs nothing but a browser: no other file, no network.</summary>
internal static class HtmlPage
{
    /// <summary>Writes the page.</summary>
    /// <param name="report">The report.</param>
    /// <param name="writer">Where to; lines end with a line feed.</param>
    public static void Write(ReportDocument report, TextWriter writer)
    {
        Head(report, writer);
        Opening(report, writer);
        Contents(report, writer);
        writer.Write("<main id=\"report\">\n");
        var blocks = new HtmlBlocks(writer);
        foreach (DocumentSection section in report.Sections)
        {
            writer.Write($"<section id=\"{section.Anchor}\" aria-labelledby=\"{section.Anchor}-title\"{(section.IsPage ? " class=\"sheet\"" : "")}>\n<h2 id=\"{section.Anchor}-title\">{HtmlText.Escape(section.Title)}</h2>\n");
            foreach (Block block in section.Blocks)
            {
                blocks.Write(block);
            }

            writer.Write("</section>\n");
        }

        writer.Write("</main>\n");
        writer.Write($"<footer><p>{HtmlText.Escape(report.Writer)}. {HtmlText.Escape(report.AsOf)}</p></footer>\n");
        writer.Write($"<script>{PageResources.Script}</script>\n</body>\n</html>\n");
    }

    private static void Head(ReportDocument report, TextWriter writer)
    {
        writer.Write("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n");
        writer.Write($"<meta http-equiv=\"Content-Security-Policy\" content=\"{PageResources.Policy}\">\n");
        writer.Write("<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n<meta name=\"color-scheme\" content=\"light dark\">\n<meta name=\"referrer\" content=\"no-referrer\">\n");
        writer.Write($"<meta name=\"generator\" content=\"{HtmlText.Escape(report.Writer)}\">\n");
        writer.Write($"<title>{HtmlText.Escape(report.Code == report.Title ? report.Code : $"{report.Code}: {report.Title}")} - report</title>\n");
        writer.Write($"<style>{PageResources.Style}</style>\n</head>\n<body>\n");
    }

    private static void Opening(ReportDocument report, TextWriter writer)
    {
        writer.Write("<a class=\"skip\" href=\"#report\">Skip to the report</a>\n<header>\n");
        writer.Write($"<p class=\"code\">Campaign {HtmlText.Escape(report.Code)}</p>\n<h1>{HtmlText.Escape(report.Title)}</h1>\n<p class=\"as-of\">{HtmlText.Escape(report.AsOf)}</p>\n</header>\n");
    }

    private static void Contents(ReportDocument report, TextWriter writer)
    {
        writer.Write("<nav aria-label=\"Contents\">\n<ol>\n");
        foreach (DocumentSection section in report.Sections)
        {
            writer.Write($"<li><a href=\"#{section.Anchor}\">{HtmlText.Escape(section.Title)}</a></li>\n");
        }

        writer.Write("</ol>\n</nav>\n");
    }
}
