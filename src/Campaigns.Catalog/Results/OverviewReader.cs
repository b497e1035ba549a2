using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Results;

/// <summary>A campaign in figures.</summary>
/// <param name="Campaign">The campaign.</param>
/// <param name="FamilySize">Experiments in its family.</param>
/// <param name="TestedCount">Experiments with a result.</param>
/// <param name="UncorrectedCount">Experiments whose own p-value is at most the level.</param>
/// <param name="SurvivorCount">Experiments that survive the correction.</param>
/// <param name="LastReview">The latest review; null before the first.</param>
public sealed record CampaignOverview(Campaign Campaign, int FamilySize, int TestedCount, int UncorrectedCount, int SurvivorCount, ReviewHead? LastReview);

/// <summary>Reads campaigns in figures, without their experiments one by one.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class OverviewReader(Catalog catalog)
{
    /// <summary>One campaign in figures; O(m log m) in its tested experiments.</summary>
    /// <param name="stored">The campaign.</param>
    public CampaignOverview Read(StoredCampaign stored)
    {
        ArgumentNullException.ThrowIfNull(stored);
        Campaign campaign = stored.Campaign;
        var families = new FamilyReader(catalog);
        FamilyColumns columns = families.Read(stored.Id);
        int familySize = families.FamilySize(stored.Id);
        PValue[] adjusted = FamilyVerdict.CorrectionOf(campaign).Adjust(RankedFamily.Of(columns.P, familySize));
        int hits = 0;
        foreach (PValue p in columns.P)
        {
            hits += campaign.Level.Rejects(p) ? 1 : 0;
        }

        return new CampaignOverview(
            campaign, familySize, columns.Count, hits, adjusted.Count(campaign.Level.Rejects),
            new ReviewStore(catalog).Latest(stored.Id)?.Head);
    }
}
