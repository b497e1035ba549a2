using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves that the digest with which a plan was sealed recomputes from the plan, every amendment undone.</summary>
/// <param name="catalog">The open catalog, in a snapshot.</param>
/// <param name="findings">Takes what is wrong.</param>
internal sealed class PlanProof(Catalog catalog, Findings findings)
{
    /// <summary>Looks at every sealed campaign. O(experiments).</summary>
    public void Run()
    {
        foreach (StoredCampaign stored in new CampaignStore(catalog).All().Where(c => c.Campaign.IsSealed))
        {
            if (SealedPlan.Digest(catalog, stored) != stored.Campaign.PlanDigest)
            {
                findings.Add(SealedBy(stored.Campaign.Code), stored.Campaign.Code, "The digest with which the plan was sealed does not follow from the plan as it stands with every amendment undone.");
            }
        }
    }

    /// <summary>The entry that sealed a campaign; null for one that was sealed before there was a ledger.</summary>
    private long? SealedBy(string code)
    {
        using SqliteStatement entry = catalog.Prepare("SELECT max(sequence) FROM ledger WHERE campaign = ?1 AND action = 'seal'");
        entry.Bind(1, code).Read();
        return entry.NullableInteger(0);
    }
}
