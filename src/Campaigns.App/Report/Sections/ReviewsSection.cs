using Campaigns.App.Commands;
using Campaigns.App.Figures;
using Campaigns.App.Report.Document;
using Campaigns.Domain;

namespace Campaigns.App.Report.Sections;

/// <summary>The reviews as they were on their days, and what was gained and lost from each to the next.</summary>
internal sealed class ReviewsSection : ReportSection
{
    public override string Anchor => "reviews";

    public override string Title => "Reviews";

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        string code = data.Standing.Campaign.Code;
        yield return TableBlock.Of("Reviews, each as it was on its day", ReviewTables.Of(code, data.Reviews.Records) with { Above = [] });
        if (data.Reviews.Records.Count > 0)
        {
            yield return new Paragraph(CampaignText.ReviewLine(data.Overview), Tone.Note);
        }

        if (data.Reviews.Records.Count > 1)
        {
            yield return new FigureBlock(ReviewsFigure.Of(data.Standing, [.. data.Reviews.Records.Select(r => r.Head)]));
        }

        if (data.Reviews.Changes.Count < data.Reviews.Records.Count - 1)
        {
            yield return new Paragraph(FormattableString.Invariant($"Compared below: the latest {data.Reviews.Changes.Count + 1} of {data.Reviews.Records.Count} reviews, each with the one before it; 'campaigns reviews {code} --compare' compares any two."), Tone.Note);
        }

        foreach (ReviewChange change in data.Reviews.Changes)
        {
            ReviewComparison comparison = change.Comparison;
            yield return TableBlock.Of(
                FormattableString.Invariant($"Gained and lost from review {comparison.Before.Head.Number} to review {comparison.After.Head.Number}"),
                ReviewTables.Compared(comparison, change.Codes)) with
            {
                Links = Anchors.InFull(data),
            };
        }
    }
}
