using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves that the digest with which a plan was sealed recomputes from the plan; of a plan that was amended since, the entries of the amendments speak.</summary>
/// <param name="catalog">The open catalog, in a snapshot.</param>
/// <param name="findings">Takes what is wrong.</param>
internal sealed class PlanProof(Catalog catalog, Findings findings)
{
    /// <summary>Looks at every sealed campaign. O(experiments).</summary>
    public void Run()
    {
        HashSet<long> amended = Amended();
        foreach (StoredCampaign stored in new CampaignStore(catalog).All().Where(c => c.Campaign.IsSealed && !amended.Contains(c.Id)))
        {
            IReadOnlyList<PlannedExperiment> plan = stored.Campaign.IsExploratory ? [] : PlanOf(stored.Id);
            if (PlanDigest.Of(stored.Campaign, plan) != stored.Campaign.PlanDigest)
            {
                findings.Add(SealedBy(stored.Campaign.Code), stored.Campaign.Code, "The digest with which the plan was sealed does not follow from the plan as it stands.");
            }
        }
    }

    private HashSet<long> Amended()
    {
        using SqliteStatement rows = catalog.Prepare("SELECT DISTINCT campaign_id FROM plan_amendments");
        var amended = new HashSet<long>();
        while (rows.Read())
        {
            amended.Add(rows.Integer(0));
        }

        return amended;
    }

    /// <summary>The plan as it was before data came: groups that came with them are none of the plan's.</summary>
    private List<PlannedExperiment> PlanOf(long campaignId)
    {
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement rows = catalog.Prepare($"SELECT {PlanStore.ExperimentColumns} FROM experiments WHERE campaign_id = ?1 AND first_load_id IS NULL ORDER BY id");
        rows.Bind(1, campaignId);
        var plan = new List<PlannedExperiment>();
        while (rows.Read())
        {
            PlannedExperiment experiment = PlanStore.Row(rows, sets);
            plan.Add(rows.Integer(7) == 1 ? experiment : experiment with { Groups = [] });
        }

        return plan;
    }

    /// <summary>The entry that sealed a campaign; null for one that was sealed before there was a ledger.</summary>
    private long? SealedBy(string code)
    {
        using SqliteStatement entry = catalog.Prepare("SELECT max(sequence) FROM ledger WHERE campaign = ?1 AND action = 'seal'");
        entry.Bind(1, code).Read();
        return entry.NullableInteger(0);
    }
}
