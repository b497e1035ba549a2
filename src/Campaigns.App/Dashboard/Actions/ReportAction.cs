using Campaigns.App.Dashboard.Model;
using Campaigns.App.Report;
using Campaigns.Catalog.Exporting;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Writes the report of the campaign.</summary>
internal sealed class ReportAction : DashboardAction
{
    private const string File = "file";
    private const string Existing = "a file there";
    private const string Kept = "is kept";
    private const string Replaced = "is replaced";

    /// <inheritdoc/>
    public override char Key => 'o';

    /// <inheritdoc/>
    public override string Name => "write the report";

    /// <inheritdoc/>
    public override string Does => "Writes everything about the campaign into one file: a page for the manager first, then the full record with figures, methods and the head of the ledger.";

    /// <inheritdoc/>
    public override bool Changes => false;

    /// <inheritdoc/>
    public override IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk) =>
    [
        new(File, "The file to write: NAME.html for a browser, NAME.md for a notebook. Tab completes.", new SafeFileNames().For(model.Standing.Campaign.Code + ".html"))
        {
            IfEmpty = "Into which file? Type its path.",
            Suggest = values => FileNames.That(values[File]),
        },
        new(Existing, "What becomes of a file of that name: it is kept, and nothing is written, or the report takes its place.", Kept) { Words = [Kept, Replaced] },
    ];

    /// <inheritdoc/>
    public override Preview Rehearse(ActionWork work)
    {
        string file = Path.GetFullPath(FileNames.Whole(work.Values[File]));
        NewFile.Demand(work.Catalog, file, force: true);
        if (!Replaces(work) && System.IO.File.Exists(file))
        {
            throw new RefusedException($"'{file}' exists; nothing was written. Name another file, or choose '{Replaced}' for '{Existing}'.");
        }

        string folder = Path.GetDirectoryName(file)!;
        string replaced = System.IO.File.Exists(file) ? ", in the place of the one that is there" : "";
        return new Preview(
        [
            $"The report of {work.Campaign} will be written to '{file}'{replaced}, {(ReportFile.IsMarkdown(file) ? "as Markdown" : "as one page for a browser")}, whole or not at all.",
            FormattableString.Invariant($"In full, with figures: the survivors, and up to {ReportQuestion.UsualInFull} experiments in all."),
            Directory.Exists(folder) ? "The catalog is only read." : $"The folder '{folder}' is not there, so that it cannot be written: make it first, or name another.",
        ])
        {
            IsRecorded = false,
        };
    }

    /// <inheritdoc/>
    public override IReadOnlyList<string> CarryOut(ActionWork work)
    {
        string file = FileNames.Whole(work.Values[File]);
        return ReportFile.Write(work.Catalog, new ReportQuestion(work.Campaign, null, ReportQuestion.UsualInFull), file, ReportFile.IsMarkdown(file), Replaces(work), work.Cancel);
    }

    private static bool Replaces(ActionWork work) => work.Values[Existing] != Kept;
}
