using System.CommandLine;
using Campaigns.App.Report;
using Campaigns.App.Report.Document;
using Campaigns.App.Report.Html;
using Campaigns.App.Report.Markdown;
using Campaigns.App.Report.Sections;
using Campaigns.App.Wording;
using Campaigns.Catalog.Exporting;

namespace Campaigns.App.Commands;

/// <summary>report: everything about a campaign as one file, for the manager, for the auditor, for the notebook.</summary>
internal sealed class ReportVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<string?> _out = TypedOptions.NotBlank(new Option<string?>("--out") { Description = "The file to write; without it the report goes to standard output.", HelpName = "FILE" });
    private readonly Option<string?> _format = TypedOptions.Word("--format", "One page for a browser, or Markdown for a notebook (else by the file's name: .md is Markdown).", "html|markdown", "html", "markdown");
    private readonly Option<bool> _force = new("--force") { Description = "Take the place of a file that is there." };
    private readonly Option<int> _most = TypedOptions.Whole("--most", 0, "Experiments to show in full with their figures, survivors first.", ReportQuestion.UsualInFull);
    private readonly Option<string[]> _experiments = TypedOptions.NotBlank(new Option<string[]>("--experiment")
    {
        Description = "Experiments to show in full besides the survivors (else all that have values, if there is room for all of them).",
        HelpName = "EXPERIMENT ...",
        AllowMultipleArgumentsPerToken = true,
    });

    public override Command Build() => new("report", Describe("The report of a campaign as one file that needs nothing else: a page for the manager first, then the full record with figures, methods and the head of the ledger.",
        "report PRIMERS --out primers.html"))
    {
        _code, _out, _format, _force, _experiments, _most,
    };

    public override int Run(Session session)
    {
        string? file = session.Get(_out);
        bool asMarkdown = (session.Get(_format) ?? (file is not null && Path.GetExtension(file).ToUpperInvariant() is ".MD" or ".MARKDOWN" ? "markdown" : "html")) == "markdown";
        if (session.Get(_force) && file is null)
        {
            throw new UsageException("--force goes with --out: standard output takes the place of nothing.");
        }

        var question = new ReportQuestion(session.Get(_code), session.Get(_experiments) is { Length: > 0 } named ? named : null, session.Get(_most));
        using Catalog.Catalog catalog = session.OpenCatalog();
        ReportData data = new ReportReader(catalog).Read(question);
        ReportDocument report = SectionList.Document(data);
        if (file is null)
        {
            Write(report, asMarkdown, session.Host.Out);
            return ExitCode.Done;
        }

        NewFile.Write(catalog, file, session.Get(_force), writer => Write(report, asMarkdown, writer));
        session.Say(FormattableString.Invariant($"Wrote the report of {report.Code} to '{file}': {new FileInfo(file).Length} bytes, {data.InFull.Count} {(data.InFull.Count == 1 ? "experiment" : "experiments")} in full."));
        session.Say(LedgerText.HeadLine(data.Head));
        return ExitCode.Done;
    }

    private static void Write(ReportDocument report, bool asMarkdown, TextWriter writer)
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
