namespace Campaigns.Statistics.Planning;

/// <summary>What a correction is expected to bring over a whole campaign.</summary>
/// <param name="TrueSurvivors">Expected survivors with a real effect, in [0, m].</param>
/// <param name="FalseSurvivors">Expected survivors without one, in [0, m].</param>
/// <param name="ShareFound">Expected true survivors over expected real effects, in [0, 1]: the probability with which any one real effect is found. Null where no effect is real.</param>
/// <param name="AnyTrue">Probability of at least one true survivor.</param>
/// <param name="AnyFalse">Probability of at least one false survivor: the realised familywise error rate.</param>
/// <param name="FalseShare">Expected share of false survivors among all, 0 where none survives: the realised false discovery rate.</param>
public sealed record CampaignExpectation(double TrueSurvivors, double FalseSurvivors, double? ShareFound, double AnyTrue, double AnyFalse, double FalseShare)
{
    /// <summary>Expected survivors, in [0, m].</summary>
    public double Survivors => TrueSurvivors + FalseSurvivors;

    /// <summary>The standard errors, where the values were simulated; null where they are exact.</summary>
    public CampaignErrors? Errors { get; init; }

    /// <summary>Whether an exact law gave the values.</summary>
    public bool IsExact => Errors is null;
}
