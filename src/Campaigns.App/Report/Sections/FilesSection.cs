using Campaigns.App.Commands;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.Catalog.Loading;

namespace Campaigns.App.Report.Sections;

/// <summary>Where the measurements came from.</summary>
internal sealed class FilesSection : ReportSection
{
    public override string Anchor => "files";

    public override string Title => "Where the data came from";

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        string code = data.Standing.Campaign.Code;
        yield return TableBlock.Of("Loaded files, in the order of loading", new RowTable(
            [
                new("number", "no.", true), new("file", "file"), new("rows", "rows", true), new("missing", "missing", true), new("experiments", "experiments", true), new("bytes", "bytes", true),
                new("loaded_at", "loaded"), new("by", "by"), new("amendment", "added after a test because"), new("sha256", "SHA-256"),
            ],
            data.Files.Select(Row))
        {
            WhenEmpty = "No file was loaded yet.",
            Below = data.Files.Count == 0 ? [] :
            [
                FormattableString.Invariant($"Together: {data.Files.Sum(f => f.RowCount)} rows, {data.Files.Sum(f => f.MissingCount)} of them marked as missing and left out."),
                $"By: the name given with --as, else the account. 'campaigns export {code} --originals' gives the files back byte for byte, 'campaigns show {code} EXPERIMENT --observations' traces every value to file and line.",
            ],
        }).WithoutEmptyColumns();
    }

    private static Cell[] Row(LoadedFile file) =>
    [
        Cell.Whole(file.Number), Cell.Text(file.FileName), Cell.Whole(file.RowCount), Cell.Whole(file.MissingCount), Cell.Whole(file.ExperimentCount), Cell.Whole(file.ByteCount),
        Cell.Text(Words.Instant(file.LoadedAt)), Cell.Text(file.By?.Name), Cell.Text(file.AmendmentReason), Cell.Text(file.Sha256),
    ];
}
