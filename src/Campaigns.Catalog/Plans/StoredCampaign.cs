using Campaigns.Domain;

namespace Campaigns.Catalog.Plans;

/// <summary>A campaign with its key in the catalog.</summary>
/// <param name="Id">Key within the catalog.</param>
/// <param name="Campaign">The campaign.</param>
public sealed record StoredCampaign(long Id, Campaign Campaign);
