using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Amending;

/// <summary>The plan of a campaign as it was sealed: the plan that stands, with every amendment undone and the experiments left out that amendments added.</summary>
/// <remarks>The digest of it is the one that the seal stored; whoever verifies the record holds them against each other.</remarks>
public static class SealedPlan
{
    /// <summary>Reads it; the plan that stands where it was never amended, or is not sealed. O(experiments + changes).</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    public static IReadOnlyList<PlannedExperiment> Read(Catalog catalog, long campaignId)
    {
        ArgumentNullException.ThrowIfNull(catalog);
        List<(long Id, PlannedExperiment Plan)> plan = new PlanStore(catalog).ReadPlanned(campaignId);
        Dictionary<string, PlanField> fields = PlanFields.All.ToDictionary(f => f.Name, StringComparer.Ordinal);
        var undone = new Dictionary<long, PlannedExperiment?>();
        Dictionary<long, PlannedExperiment> standing = plan.ToDictionary(e => e.Id, e => e.Plan);
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT c.experiment_id, c.field, c.before FROM plan_amendments a JOIN plan_amendment_changes c ON c.amendment_id = a.id
            WHERE a.campaign_id = ?1 ORDER BY a.number DESC
            """);
        select.Bind(1, campaignId);
        while (select.Read())
        {
            long id = select.Integer(0);
            PlannedExperiment? before = undone.TryGetValue(id, out PlannedExperiment? sofar) ? sofar : standing.GetValueOrDefault(id);
            undone[id] = select.TextEquals(1, PlanAmendmentChange.Added) || before is null ? null
                : fields.TryGetValue(select.Text(1), out PlanField? field) ? field.With(before, select.NullableText(2))
                : throw new CatalogException($"An amendment in the catalog changes the field '{select.Text(1)}', which no plan has; the catalog is damaged.");
        }

        return [.. plan.Select(e => undone.TryGetValue(e.Id, out PlannedExperiment? before) ? before : e.Plan).OfType<PlannedExperiment>()];
    }

    /// <summary>The plan that stands, amendments included, with what it says alone: groups that came with the data are left out.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    public static IReadOnlyList<PlannedExperiment> Standing(Catalog catalog, long campaignId)
    {
        ArgumentNullException.ThrowIfNull(catalog);
        return [.. new PlanStore(catalog).ReadPlanned(campaignId).Select(e => e.Plan)];
    }

    /// <summary>SHA-256 of the plan as it was sealed; null where it is not sealed. It equals the digest that the seal stored unless the record was tampered with.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="stored">The campaign.</param>
    public static string? Digest(Catalog catalog, StoredCampaign stored)
    {
        ArgumentNullException.ThrowIfNull(stored);
        return !stored.Campaign.IsSealed ? null : PlanDigest.Of(stored.Campaign, stored.Campaign.IsExploratory ? [] : Read(catalog, stored.Id));
    }
}
