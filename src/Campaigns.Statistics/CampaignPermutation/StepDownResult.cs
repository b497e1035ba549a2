using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>What permuting a campaign gave for one response.</summary>
/// <param name="P">Its own p-value.</param>
/// <param name="AdjustedP">Its p-value adjusted over the family; at least <paramref name="P"/>.</param>
/// <param name="Resampling">The arrangements behind <paramref name="P"/>; null where it was given.</param>
public sealed record StepDownResult(PValue P, PValue AdjustedP, Resampling? Resampling);
