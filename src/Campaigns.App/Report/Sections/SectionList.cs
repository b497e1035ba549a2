using System.Globalization;
using Campaigns.App.Report.Document;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Report.Sections;

/// <summary>The sections of a report, in the order in which they are read.</summary>
internal static class SectionList
{
    private static readonly ReportSection[] All =
    [
        new PageSection(),
        new PlanSection(),
        new ResultsSection(),
        new SurvivorsSection(),
        new ExperimentsSection(),
        new CorrectionsSection(),
        new RankingSection(),
        new RiskSection(),
        new FamiliesSection(),
        new DecisionsSection(),
        new ReviewsSection(),
        new FilesSection(),
        new MethodsSection(),
        new RecordSection(),
        new CautionsSection(),
    ];

    /// <summary>The report as a document.</summary>
    /// <param name="data">What it shows.</param>
    public static ReportDocument Document(ReportData data)
    {
        Campaign campaign = data.Standing.Campaign;
        return new ReportDocument(
            campaign.Code,
            campaign.Title.Length > 0 ? campaign.Title : campaign.Code,
            AsOf(data),
            $"Campaigns {ProgramVersion.Current}",
            [.. All.Where(s => s.Concerns(data)).Select(s => new DocumentSection(s.Anchor, s.Title, s.Blocks(data), s.IsPage))]);
    }

    /// <summary>A report is of the moment at which its record ends, not of the one at which it is printed: the same record gives the same report.</summary>
    private static string AsOf(ReportData data) => data.HeadAt is { } at
        ? string.Create(CultureInfo.InvariantCulture, $"As the record stood on {at.UtcDateTime:yyyy-MM-dd HH:mm} UTC, with entry {data.Head.Sequence} of its ledger.")
        : "The record has no entry yet.";
}
