using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Reviewing;

/// <summary>The family of a campaign as it was counted at a position of the record: without what came to the plan or to an exploratory campaign later or was withdrawn before any data.</summary>
/// <remarks>One scan of the plan. Family, weight and what is shared were fixed by the seal, so that they are read as they stand.</remarks>
internal sealed class PastFamily(Catalog catalog, StoredCampaign stored, RecordPosition asOf)
{
    private readonly PlanThen _plan = new(catalog, stored.Id);

    /// <summary>Hypotheses that were counted.</summary>
    public int Size
    {
        get
        {
            int size = 0;
            Scan((_, _) => size++);
            return size;
        }
    }

    /// <summary>The family, counted with the p-values at hand.</summary>
    /// <param name="columns">Tested experiments.</param>
    public FamilyTally Tally(FamilyColumns columns)
    {
        var tally = new FamilyTally(stored.Campaign);
        int next = 0;
        Scan((id, row) =>
        {
            bool isTested = next < columns.Count && columns.ExperimentIds[next] == id;
            tally.Add(row.NullableText(1), row.NullableReal(2), row.NullableText(3), isTested ? columns.P[next] : null);
            next += isTested ? 1 : 0;
        });
        return tally;
    }

    private void Scan(Action<long, SqliteStatement> each)
    {
        var withdrawals = new StandingWithdrawals(catalog, stored.Id, asOf);

        // The experiments of an exploratory campaign that an earlier version of the program loaded do not say which load brought them: their first values do.
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.id, e.family, e.weight, e.shared_control,
                coalesce(e.first_load_id, CASE WHEN ?2 = 1 THEN (SELECT min(m.load_id) FROM measurements m WHERE m.experiment_id = e.id) END)
            FROM experiments e WHERE e.campaign_id = ?1 ORDER BY e.id
            """);
        select.Bind(1, stored.Id).Bind(2, stored.Campaign.IsExploratory ? 1L : 0L);
        while (select.Read())
        {
            long id = select.Integer(0);
            if ((select.IsNull(4) || select.Integer(4) <= (asOf.LastLoadId ?? 0)) && _plan.Has(id, asOf.LastAmendmentId) && !withdrawals.LeavesFamily(id))
            {
                each(id, select);
            }
        }
    }
}
