using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>What a correction brings over one campaign.</summary>
/// <param name="Correction">The correction.</param>
/// <param name="Level">Its level.</param>
/// <param name="Campaign">The campaign.</param>
/// <param name="Replicates">Observations in each group; null where they are unequal.</param>
/// <param name="Effect">Cohen's f.</param>
/// <param name="LargestDifference">Of two means, in the unit of the response; null where no standard deviation was given.</param>
/// <param name="Wanted">The share of real effects that was to be found; null where replicates were given.</param>
/// <param name="Expected">What is expected.</param>
/// <param name="LargeCampaignTrue">True survivors as the approximation for large campaigns has them; null for corrections without one.</param>
internal sealed record SizeCampaignAnswer(
    ErrorProcedure Correction, SignificanceLevel Level, CampaignDesign Campaign, int? Replicates, double Effect, double? LargestDifference, double? Wanted, CampaignExpectation Expected, double? LargeCampaignTrue);
