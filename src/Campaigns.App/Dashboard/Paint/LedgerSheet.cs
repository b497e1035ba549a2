using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints an entry of the ledger in full, or what came of proving the record.</summary>
public static class LedgerSheet
{
    private const int MostChanges = 500;
    private const int MostFindings = 200;
    private const int Digest = 64;

    /// <summary>Paints the sheet, as high as it needs.</summary>
    /// <param name="ledger">What is shown.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(LedgerModel ledger, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(ledger);
        DetailSheet sheet = new(width, glyphs);
        if (ledger.Proving is { } progress)
        {
            sheet.Line(Progress(progress), Ink.Heading);
        }
        else if (ledger.Problem is { } problem)
        {
            sheet.Marked(glyphs.Warns, "The record could not be proved: " + problem, Ink.Warning);
        }
        else if (ledger.Proof is { } proof)
        {
            Proof(sheet, proof);
        }
        else if (ledger.Selected is { } entry)
        {
            Entry(sheet, entry);
        }

        return sheet.Painted();
    }

    /// <summary>The proof under way as a line, for example "proving the tables, part 4 of 6; Esc stops it".</summary>
    /// <param name="progress">How far it is.</param>
    public static string Progress(WorkProgress progress) => progress.Total == 0
        ? $"{progress.What}; Esc stops it"
        : FormattableString.Invariant($"{progress.What}, part {progress.Done + 1} of {progress.Total}; Esc stops it");

    private static void Proof(DetailSheet sheet, LedgerProof proof)
    {
        if (proof.IsWhole)
        {
            bool isFirst = true;
            foreach (string sentence in ProofText.Whole(proof))
            {
                sheet.Line(sentence, isFirst ? Ink.Survivor : Ink.Text);
                isFirst = false;
            }
        }
        else
        {
            sheet.Marked(sheet.Glyphs.Warns, ProofText.Broken(proof), Ink.Warning);
            foreach (LedgerFinding finding in proof.Findings.Take(MostFindings))
            {
                sheet.Line(ProofText.Finding(finding), Ink.Text, indent: 2);
            }

            if (proof.Findings.Count > MostFindings)
            {
                sheet.Line(FormattableString.Invariant($"... and {proof.Findings.Count - MostFindings} more; 'campaigns ledger verify' names all."), Ink.Quiet, indent: 2);
            }
        }

        foreach (string remark in proof.Remarks)
        {
            sheet.Line("Note: " + remark);
        }

        sheet.Blank();
        sheet.Line("Esc goes back to the entries.", Ink.Quiet);
    }

    private static void Entry(DetailSheet sheet, LedgerEntry entry)
    {
        sheet.Line(LedgerText.Sentence(entry), Ink.Heading);
        foreach (LedgerChange change in entry.Changes.Take(MostChanges))
        {
            sheet.Line(LedgerText.Change(change), change.What == LedgerChange.Clock ? Ink.Warning : Ink.Text, indent: 2);
        }

        if (entry.Changes.Count > MostChanges)
        {
            sheet.Line(FormattableString.Invariant($"... and {entry.Changes.Count - MostChanges} more changes; 'campaigns ledger --from {entry.Sequence} --format csv' writes all."), Ink.Quiet, indent: 2);
        }

        sheet.Title("what proves it");
        sheet.Line("hash of this entry, which holds the one before:");
        Hash(sheet, entry.Hash);
        foreach (LedgerEvidence evidence in entry.Evidence)
        {
            sheet.Line($"digest of {Rows(evidence)}:");
            Hash(sheet, evidence.Digest);
        }

        sheet.Line($"written by version {entry.ProgramVersion} of the program");
        sheet.Blank();
        foreach (string sentence in LedgerText.Legend)
        {
            sheet.Line(sentence, Ink.Quiet);
        }
    }

    /// <summary>A digest in one line where there is room, so that it can be copied.</summary>
    private static void Hash(DetailSheet sheet, string hash) => sheet.Line(hash, Ink.Mean, indent: sheet.Width >= Digest + 2 ? 2 : 0);

    /// <summary>The rows that a digest is of, for example "test-run (key 4 in the catalog)": kind, key, range of keys where there is one.</summary>
    private static string Rows(LedgerEvidence evidence) => evidence.First == 0 && evidence.Last == 0
        ? FormattableString.Invariant($"{evidence.Kind} (key {evidence.Owner} in the catalog)")
        : FormattableString.Invariant($"{evidence.Kind} (key {evidence.Owner} in the catalog), from {evidence.First} to {evidence.Last}");
}
