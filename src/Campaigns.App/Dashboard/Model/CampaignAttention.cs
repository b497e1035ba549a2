using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What of a campaign waits for somebody to do something.</summary>
/// <param name="Overview">The campaign in figures.</param>
/// <param name="Waiting">Its data that wait for their test.</param>
public sealed record CampaignAttention(CampaignOverview Overview, WaitingData Waiting)
{
    /// <summary>Whether its plan can still be changed, so that nothing of it can be tested.</summary>
    public bool IsPlanOpen => !Overview.Campaign.IsSealed;

    /// <summary>Experiments with data that were never tested.</summary>
    public int NeverTested => Waiting.NeverTested;

    /// <summary>Experiments whose values were changed after their test.</summary>
    public int AwaitingNewTest => Overview.AwaitingNewTest;

    /// <summary>Whether it has results and no review.</summary>
    public bool LacksReview => Overview.LastReview is null && Overview.TestedCount > 0;

    /// <summary>Whether its latest review does not hold what stands today.</summary>
    public bool IsReviewBehind => Overview.LastReview is { } review
        && (AwaitingNewTest > 0 || Overview.DecisionsSinceReview > 0 || Overview.ResultsSinceReview > 0 || (review.IsInterim && review.FamilySize != Overview.FamilySize));

    /// <summary>Families whose gates are closed, so that none of their experiments can survive.</summary>
    public int ClosedFamilies => Overview.Families.Count(f => !f.IsOpen);

    /// <summary>How many kinds of things wait; 0 where nothing does.</summary>
    public int Count => (IsPlanOpen ? 1 : 0) + (NeverTested > 0 ? 1 : 0) + (AwaitingNewTest > 0 ? 1 : 0) + (LacksReview || IsReviewBehind ? 1 : 0) + (ClosedFamilies > 0 ? 1 : 0);
}
