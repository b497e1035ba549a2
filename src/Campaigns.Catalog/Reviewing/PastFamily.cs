using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Reviewing;

/// <summary>The family of a campaign as it was counted at a position of the record: without what came to the plan or to an exploratory campaign later or was withdrawn before any data, with the plan that stood then.</summary>
/// <remarks>One scan of the plan.</remarks>
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
            tally.Add(
                _plan.Of(id, "family", row.NullableText(1), asOf.LastAmendmentId), Weight(id, row.NullableReal(2)),
                _plan.Of(id, "shared_control", row.NullableText(3), asOf.LastAmendmentId), isTested ? columns.P[next] : null);
            next += isTested ? 1 : 0;
        });
        return tally;
    }

    private double? Weight(long id, double? today)
    {
        const string unchanged = "\0";
        return _plan.Of(id, "weight", unchanged, asOf.LastAmendmentId) is var text && text == unchanged ? today
            : text is not null && DecimalText.Parse(Encoding.UTF8.GetBytes(text), DecimalMark.Point, out ParsedDecimal number) == NumberReading.Number ? number.ToDouble()
            : null;
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
