namespace Campaigns.Domain;

/// <summary>A campaign in figures, without its experiments one by one.</summary>
/// <param name="Campaign">The campaign.</param>
/// <param name="FamilySize">Hypotheses that the correction counts.</param>
/// <param name="TestedCount">Experiments with a result.</param>
/// <param name="UncorrectedCount">Experiments whose own p-value is at most the level.</param>
/// <param name="SurvivorCount">Experiments that survive the correction.</param>
/// <param name="AmendedCount">Experiments that deviate from their plan.</param>
/// <param name="LastReview">The latest review; null before the first.</param>
/// <param name="ResultsSinceReview">Experiments tested after the latest review.</param>
public sealed record CampaignOverview(
    Campaign Campaign,
    int FamilySize,
    int TestedCount,
    int UncorrectedCount,
    int SurvivorCount,
    int AmendedCount,
    ReviewHead? LastReview,
    int ResultsSinceReview)
{
    /// <summary>Experiments that are withdrawn.</summary>
    public WithdrawnCounts Withdrawn { get; init; }

    /// <summary>How far the sealed plan was amended.</summary>
    public AmendedPlan AmendedPlan { get; init; }

    /// <summary>Decisions to withdraw experiments or take them in again, and amendments of the plan, that came after the latest review.</summary>
    public int DecisionsSinceReview { get; init; }

    /// <summary>Experiments whose values were changed after their test (added to, or left out), so that they have no result before a new one.</summary>
    public int AwaitingNewTest { get; init; }

    /// <summary>The families in figures; one for a campaign of one family.</summary>
    public required IReadOnlyList<FamilyStanding> Families { get; init; }
}
