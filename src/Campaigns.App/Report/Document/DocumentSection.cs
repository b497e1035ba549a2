namespace Campaigns.App.Report.Document;

/// <summary>A section of a report.</summary>
/// <param name="Anchor">Where links lead; letters, digits and hyphens, unique in the report.</param>
/// <param name="Title">Its heading.</param>
/// <param name="Blocks">What it holds; walked through once.</param>
/// <param name="IsPage">Whether it is the one page for those who read no more; it must fit a sheet of paper.</param>
internal sealed record DocumentSection(string Anchor, string Title, IEnumerable<Block> Blocks, bool IsPage = false);

/// <summary>A whole report.</summary>
/// <param name="Code">Code of the campaign.</param>
/// <param name="Title">Its title; its code where it has none.</param>
/// <param name="AsOf">Of when it is, in a sentence.</param>
/// <param name="Writer">Which program wrote it: name and version.</param>
/// <param name="Sections">The sections, in order.</param>
internal sealed record ReportDocument(string Code, string Title, string AsOf, string Writer, IReadOnlyList<DocumentSection> Sections);
