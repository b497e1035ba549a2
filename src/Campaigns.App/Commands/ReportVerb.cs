using System.CommandLine;
using Campaigns.App.Report;
using Campaigns.App.Report.Sections;

namespace Campaigns.App.Commands;

/// <summary>report: everything about a campaign as one file, for the manager, for the auditor, for the notebook.</summary>
internal sealed class ReportVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<string?> _out = TypedOptions.NotBlank(new Option<string?>("--out") { Description = "The file to write; without it the report goes to standard output, a page of HTML only into a pipe or a file.", HelpName = "FILE" });
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
        bool asMarkdown = (session.Get(_format) ?? (file is not null && ReportFile.IsMarkdown(file) ? "markdown" : "html")) == "markdown";
        if (session.Get(_force) && file is null)
        {
            throw new UsageException("--force goes with --out: standard output takes the place of nothing.");
        }

        if (file is null && !asMarkdown && session.Host.OutIsTerminal)
        {
            throw new UsageException($"A page of HTML is nothing to read on a terminal, and nothing was written: name a file with --out, as in 'campaigns report {session.Get(_code)} --out report.html', or ask for --format markdown.");
        }

        if (file is not null)
        {
            FileEnding.Fits(file, "A report is HTML or Markdown: name a .html or .md file; a browser prints the page as PDF.", ".html", ".htm", ".md");
        }

        var question = new ReportQuestion(session.Get(_code), session.Get(_experiments) is { Length: > 0 } named ? named : null, session.Get(_most));
        using Catalog.Catalog catalog = session.OpenCatalog();
        if (file is null)
        {
            ReportFile.Write(SectionList.Document(new ReportReader(catalog).Read(question)), asMarkdown, session.Host.Out);
            return ExitCode.Done;
        }

        foreach (string sentence in ReportFile.Write(catalog, question, file, asMarkdown, session.Get(_force), session.Host.Cancel))
        {
            session.Say(sentence);
        }

        return ExitCode.Done;
    }
}
