using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Results;

namespace Campaigns.App.Report.Sections;

/// <summary>The ledger: its head, how it is proved, and what it says of the campaign.</summary>
internal sealed class RecordSection : ReportSection
{
    private const int MostChanges = 4;

    public override string Anchor => "record";

    public override string Title => "The record";

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        yield return new FactList(
        [
            new("Head of the ledger", Cell.Text(data.Head.ToString())),
            new("Entries about this campaign", Cell.Whole(data.EntryCount)),
            new("Program", Cell.Text($"Campaigns {ProgramVersion.Current}")),
        ]);
        yield return new Paragraph(LedgerText.HeadLine(data.Head));
        yield return new Paragraph($"The whole command: campaigns ledger verify --head {data.Head}");
        yield return new Paragraph(LedgerText.NotSeenWithoutHead, Tone.Note);
        if (data.EntryCount > data.Entries.Count)
        {
            yield return new Paragraph(FormattableString.Invariant($"The latest {data.Entries.Count} of {data.EntryCount} entries; 'campaigns ledger {data.Standing.Campaign.Code}' tells all."), Tone.Note);
        }

        yield return new BulletList([.. data.Entries.Select(Entry)]);
        yield return new Paragraph(LedgerText.Legend[0], Tone.Note);
    }

    private static string Entry(LedgerEntry entry)
    {
        string more = entry.Changes.Count > MostChanges ? FormattableString.Invariant($"; and {entry.Changes.Count - MostChanges} more changes") : "";
        return $"{LedgerText.Sentence(entry)}{(entry.Changes.Count > 0 ? $" {string.Join("; ", entry.Changes.Take(MostChanges).Select(LedgerText.Change))}{more}." : "")}";
    }
}
