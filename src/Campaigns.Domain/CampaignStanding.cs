namespace Campaigns.Domain;

/// <summary>A campaign as it stands: every planned experiment with its result, corrected over the family.</summary>
/// <param name="Campaign">The campaign.</param>
/// <param name="Experiments">Every experiment, in the plan's order.</param>
/// <param name="FamilySize">Hypotheses that the correction counts.</param>
/// <param name="LastReview">The latest stored review; null before the first.</param>
/// <param name="ResultsSinceReview">Experiments tested after the latest review.</param>
public sealed record CampaignStanding(
    Campaign Campaign,
    IReadOnlyList<ExperimentResult> Experiments,
    int FamilySize,
    ReviewHead? LastReview,
    int ResultsSinceReview)
{
    /// <summary>Experiments with a test result.</summary>
    public int TestedCount => Experiments.Count(e => e.P is not null);

    /// <summary>Experiments that survive the correction.</summary>
    public int SurvivorCount => Experiments.Count(e => e.Survives == true);

    /// <summary>The campaign in figures.</summary>
    public CampaignOverview Overview => new(
        Campaign,
        FamilySize,
        TestedCount,
        Experiments.Count(e => e.P is { } p && Campaign.Level.Rejects(p)),
        SurvivorCount,
        Experiments.Count(e => e.Amendments.Count > 0),
        LastReview,
        ResultsSinceReview)
    {
        AwaitingNewTest = AwaitingNewTest,
        Withdrawn = Withdrawn,
        AmendedPlan = AmendedPlan,
        DecisionsSinceReview = DecisionsSinceReview,
        Families = Families,
    };

    /// <summary>The families in figures; one for a campaign of one family.</summary>
    public required IReadOnlyList<FamilyStanding> Families { get; init; }

    /// <summary>The family of one of its experiments.</summary>
    /// <param name="experiment">The experiment.</param>
    public FamilyStanding FamilyOf(ExperimentResult experiment)
    {
        ArgumentNullException.ThrowIfNull(experiment);
        return experiment.Family ?? Families[0];
    }

    /// <summary>Experiments that are withdrawn.</summary>
    public WithdrawnCounts Withdrawn { get; init; }

    /// <summary>How far the sealed plan was amended.</summary>
    public AmendedPlan AmendedPlan { get; init; }

    /// <summary>Decisions to withdraw experiments or take them in again, and amendments of the plan, that came after the latest review.</summary>
    public int DecisionsSinceReview { get; init; }

    /// <summary>Experiments whose values were changed after their test, or that were taken in again, so that they have no result before a new one.</summary>
    public int AwaitingNewTest { get; init; }
}
