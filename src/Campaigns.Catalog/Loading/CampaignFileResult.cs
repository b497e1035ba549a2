namespace Campaigns.Catalog.Loading;

/// <summary>What a campaign file says.</summary>
/// <param name="Campaign">The campaign; null where the file has problems.</param>
/// <param name="Problems">What is wrong with the file.</param>
public sealed record CampaignFileResult(CampaignDescription? Campaign, ImportProblems Problems);
