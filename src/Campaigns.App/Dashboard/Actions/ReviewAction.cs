using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Takes a review.</summary>
internal sealed class ReviewAction : DashboardAction
{
    private const string Family = "family";
    private const string Planned = "every planned experiment";

    /// <inheritdoc/>
    public override char Key => 'v';

    /// <inheritdoc/>
    public override string Name => "take a review";

    /// <inheritdoc/>
    public override string Does => "Applies the sealed correction to the family and keeps the outcome for ever.";

    /// <inheritdoc/>
    public override IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk) =>
    [
        new(Family, "What is counted: every planned experiment, or tested ones alone; such a review is marked as interim.", Planned) { Words = [Planned, "tested ones alone"] },
    ];

    /// <inheritdoc/>
    public override Preview Rehearse(ActionWork work)
    {
        ReviewHead? before = new OverviewReader(work.Catalog).Read(new CampaignStore(work.Catalog).Get(work.Campaign)).LastReview;
        ReviewTaken taken = Take(work);
        if (!taken.IsNew)
        {
            return new Preview([ReviewWording.Taken(work.Campaign, taken)], HasEffect: false);
        }

        List<string> sentences = [ReviewWording.Foreseen(work.Campaign, taken.Review)];
        if (before is null)
        {
            sentences.Add("It is the first review of this campaign.");
        }
        else
        {
            (ReviewComparison comparison, IReadOnlyDictionary<long, string> codes) = new ReviewComparer(work.Catalog).Compare(work.Campaign, before.Number, taken.Review.Number);
            sentences.Add(ReviewWording.Summary(comparison));
            sentences.AddRange(comparison.Differences.OrderByDescending(d => d.IsGained).Select(d => $"{(d.IsGained ? "Gained" : "Lost")}: {codes[d.Key]}, {ReviewWording.Why(d)}."));
            sentences.AddRange(ReviewWording.Counts(comparison));
        }

        sentences.AddRange(Around(work));
        return new Preview(sentences);
    }

    /// <inheritdoc/>
    public override IReadOnlyList<string> CarryOut(ActionWork work) =>
        [ReviewWording.Taken(work.Campaign, Take(work)), .. Around(work), LedgerText.HeadLine(new LedgerReader(work.Catalog).Head)];

    private static ReviewTaken Take(ActionWork work) => new ReviewStore(work.Catalog).Take(work.Campaign, testedOnly: work.Values[Family] != Planned);

    private static IEnumerable<string> Around(ActionWork work)
    {
        var families = ReviewedFamilies.Read(work.Catalog, work.Campaign);
        CampaignOverview overview = new OverviewReader(work.Catalog).Read(new CampaignStore(work.Catalog).Get(work.Campaign));
        string[] awaiting = OnlineText.Awaiting(overview, work.Steps) is { } line ? [line] : [];
        return [.. families.Lines, .. families.Warnings, .. awaiting, .. CampaignText.Deviations(overview, work.Steps)];
    }
}
