using Campaigns.App.Report.Document;
using Campaigns.App.Report.Html;
using Campaigns.App.Report.Markdown;
using Campaigns.App.Report.Sections;
using Campaigns.App.Wording;
using Campaigns.Catalog.Exporting;

namespace Campaigns.App.Report;

/// <summary>A report on its way into a file or a stream; commands and dashboard write it here.</summary>
internal static class ReportFile
{
    /// <summary>Whether the name of a file asks for Markdown.</summary>
    /// <param name="file">The file's name.</param>
    public static bool IsMarkdown(string file) => Path.GetExtension(file).ToUpperInvariant() is ".MD" or ".MARKDOWN";

    /// <summary>Writes a report into a file, whole or not at all.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="question">What is asked of it.</param>
    /// <param name="file">The file's name.</param>
    /// <param name="asMarkdown">Markdown; else one page for a browser.</param>
    /// <param name="force">Whether it may take the place of a file that is there.</param>
    /// <param name="cancel">Stops the work; what was there is then untouched.</param>
    /// <returns>What was written, in sentences.</returns>
    /// <exception cref="Campaigns.Domain.RefusedException">There is no such campaign or experiment, or the file cannot be written.</exception>
    public static IReadOnlyList<string> Write(Catalog.Catalog catalog, ReportQuestion question, string file, bool asMarkdown, bool force, CancellationToken cancel)
    {
        ReportData data = new ReportReader(catalog).Read(question);
        ReportDocument report = SectionList.Document(data);
        NewFile.Write(catalog, file, force, writer =>
        {
            Write(report, asMarkdown, writer);
            cancel.ThrowIfCancellationRequested();
        });
        return
        [
            FormattableString.Invariant($"Wrote the report of {report.Code} to '{file}': {new FileInfo(file).Length} bytes, {data.InFull.Count} {(data.InFull.Count == 1 ? "experiment" : "experiments")} in full."),
            LedgerText.HeadLine(data.Head),
        ];
    }

    /// <summary>Writes a report to a stream of text.</summary>
    /// <param name="report">The report.</param>
    /// <param name="asMarkdown">Markdown; else one page for a browser.</param>
    /// <param name="writer">Where it goes.</param>
    public static void Write(ReportDocument report, bool asMarkdown, TextWriter writer)
    {
        if (asMarkdown)
        {
            MarkdownPage.Write(report, writer);
        }
        else
        {
            HtmlPage.Write(report, writer);
        }
    }
}
