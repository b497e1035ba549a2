namespace Campaigns.Statistics.Planning;

/// <summary>Monte Carlo standard errors of a simulated <see cref="CampaignExpectation"/>, each of the value of the same name.</summary>
/// <param name="Draws">Campaigns that were drawn.</param>
/// <param name="Survivors">Of the survivors.</param>
/// <param name="TrueSurvivors">Of the true ones.</param>
/// <param name="FalseSurvivors">Of the false ones.</param>
/// <param name="ShareFound">Of the share found; null where no effect is real.</param>
/// <param name="AnyTrue">Of the probability of at least one true survivor; where it was seen always or never, that of one draw more of each kind, since 0 would claim certainty.</param>
/// <param name="AnyFalse">Of the probability of at least one false survivor, likewise.</param>
/// <param name="FalseShare">Of the realised false discovery rate.</param>
public sealed record CampaignErrors(int Draws, double Survivors, double TrueSurvivors, double FalseSurvivors, double? ShareFound, double AnyTrue, double AnyFalse, double FalseShare);
