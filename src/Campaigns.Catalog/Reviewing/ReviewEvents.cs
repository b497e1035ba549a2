using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Reviewing;

/// <summary>What was done to the experiments of a campaign between two positions of its record.</summary>
/// <remarks>Four statements, whatever the number of experiments.</remarks>
internal sealed class ReviewEvents
{
    private const string Values =
        """
        SELECT m.experiment_id, 0, l.amendment_reason, e.code, e.family, 0 FROM loads l JOIN measurements m ON m.load_id = l.id JOIN experiments e ON e.id = m.experiment_id
        WHERE l.campaign_id = ?1 AND l.id > ?2 AND l.id <= ?3 AND l.amendment_reason IS NOT NULL ORDER BY l.id
        """;

    private const string Exclusions =
        """
        SELECT x.experiment_id, x.is_excluded, x.reason, e.code, e.family, 0 FROM exclusions x JOIN experiments e ON e.id = x.experiment_id
        WHERE e.campaign_id = ?1 AND x.id > ?2 AND x.id <= ?3 ORDER BY x.id
        """;

    private const string Amendments =
        """
        SELECT c.experiment_id, max(c.field = 'experiment'), a.reason, e.code, e.family, max(c.field = 'experiment')
        FROM plan_amendments a JOIN plan_amendment_changes c ON c.amendment_id = a.id JOIN experiments e ON e.id = c.experiment_id
        WHERE a.campaign_id = ?1 AND a.id > ?2 AND a.id <= ?3 GROUP BY a.id, c.experiment_id ORDER BY a.id
        """;

    private const string Withdrawals =
        """
        SELECT w.experiment_id, w.is_withdrawn, w.reason, e.code, e.family, NOT w.had_data FROM withdrawals w JOIN experiments e ON e.id = w.experiment_id
        WHERE e.campaign_id = ?1 AND w.id > ?2 AND w.id <= ?3 ORDER BY w.id
        """;

    private readonly Dictionary<long, List<ReviewEvent>> _events = [];

    public ReviewEvents(Catalog catalog, StoredCampaign stored, RecordPosition from, RecordPosition to)
    {
        // A campaign that is judged as one family may still carry names of families in its plan; they mean nothing there.
        bool hasFamilies = stored.Campaign.JudgedFamilies.Count > 0;
        // Values that come to a tested experiment come by an amendment alone, so loads with a reason are enough to ask for.
        Add(catalog, Values, (stored.Id, hasFamilies), from.LastLoadId, to.LastLoadId, _ => ReviewCause.AddedValues);
        Add(catalog, Exclusions, (stored.Id, hasFamilies), from.LastExclusionId, to.LastExclusionId, excluded => excluded ? ReviewCause.Exclusion : ReviewCause.ExclusionTakenBack);
        Add(catalog, Amendments, (stored.Id, hasFamilies), from.LastAmendmentId, to.LastAmendmentId, isNew => isNew ? ReviewCause.AmendedIn : ReviewCause.PlanAmendment);
        Add(catalog, Withdrawals, (stored.Id, hasFamilies), from.LastWithdrawalId, to.LastWithdrawalId, withdrawn => withdrawn ? ReviewCause.Withdrawal : ReviewCause.WithdrawalTakenBack);
    }

    /// <summary>The events by the key of their experiment: values, exclusions, plan, withdrawals, each oldest first.</summary>
    public IReadOnlyDictionary<long, IReadOnlyList<ReviewEvent>> ByExperiment => _events.ToDictionary(e => e.Key, e => (IReadOnlyList<ReviewEvent>)e.Value);

    private void Add(Catalog catalog, string sql, (long Id, bool HasFamilies) campaign, long? from, long? to, Func<bool, ReviewCause> causeOf)
    {
        if ((to ?? 0) <= (from ?? 0))
        {
            return;
        }

        using SqliteStatement select = catalog.Prepare(sql);
        select.Bind(1, campaign.Id).Bind(2, from ?? 0).Bind(3, to ?? 0);
        while (select.Read())
        {
            if (!_events.TryGetValue(select.Integer(0), out List<ReviewEvent>? events))
            {
                _events[select.Integer(0)] = events = [];
            }

            events.Add(new ReviewEvent(causeOf(select.Integer(1) != 0), select.NullableText(2))
            {
                Experiment = select.Text(3),
                Family = campaign.HasFamilies ? select.NullableText(4) ?? "" : "",
                ChangesFamily = select.Integer(5) != 0,
            });
        }
    }
}
