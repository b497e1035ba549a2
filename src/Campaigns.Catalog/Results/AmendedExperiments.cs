using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Withdrawing;

namespace Campaigns.Catalog.Results;

/// <summary>The experiments of a campaign to which values were added after their test, of which values were left out, or that were withdrawn, with the reasons given.</summary>
/// <remarks>Campaigns without any, which is nearly all, cost a look at the list of loads, one at the list of exclusions and one at that of withdrawals.</remarks>
internal sealed class AmendedExperiments
{
    private readonly Dictionary<long, Amended> _experiments = [];

    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    /// <param name="asOf">The position of the record up to which all this counts; null for all of it.</param>
    public AmendedExperiments(Catalog catalog, long campaignId, RecordPosition? asOf = null)
    {
        Exclusions = new StandingExclusions(catalog, campaignId, asOf);
        AddLoads(catalog, campaignId, asOf);
        foreach (long id in Exclusions.Ids)
        {
            Amended amended = Of(id);
            amended.Reasons.AddRange(Exclusions.Decisions(id).Select(d => d.Sentence));
            amended.AwaitsTest |= Exclusions.AwaitsTest(id);
        }

        Plan = new PlanAmendments(catalog, campaignId);
        Withdrawals = new StandingWithdrawals(catalog, campaignId, asOf);
        foreach (long id in Withdrawals.Ids)
        {
            Amended amended = Of(id);
            amended.Reasons.AddRange(Withdrawals.Reasons(id));
            amended.AwaitsTest |= Withdrawals.AwaitsTest(id);
        }
    }

    /// <summary>What is left out of the analysis.</summary>
    public StandingExclusions Exclusions { get; }

    /// <summary>What is withdrawn.</summary>
    public StandingWithdrawals Withdrawals { get; }

    /// <summary>Changes of the sealed plan; they take no result away.</summary>
    public PlanAmendments Plan { get; }

    /// <summary>Experiments that a new test would give a result again: those that are withdrawn stay without one.</summary>
    public int AwaitingTest => _experiments.Keys.Count(id => AwaitsTest(id) && !Withdrawals.IsWithdrawn(id));

    private void AddLoads(Catalog catalog, long campaignId, RecordPosition? asOf)
    {
        using SqliteStatement loads = catalog.Prepare("SELECT count(*) FROM loads WHERE campaign_id = ?1 AND amendment_reason IS NOT NULL");
        loads.Bind(1, campaignId).Read();
        if (loads.Integer(0) == 0)
        {
            loads.Reset();
            return;
        }

        loads.Reset();
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT m.experiment_id, l.id, l.amendment_reason,
                (SELECT min(coalesce(t.last_load_id, 0)) FROM test_results r JOIN test_runs t ON t.id = r.test_run_id WHERE r.experiment_id = m.experiment_id AND t.id <= ?3),
                (SELECT max(coalesce(t.last_load_id, 0)) FROM test_results r JOIN test_runs t ON t.id = r.test_run_id WHERE r.experiment_id = m.experiment_id AND t.id <= ?3)
            FROM loads l JOIN measurements m ON m.load_id = l.id
            WHERE l.campaign_id = ?1 AND l.amendment_reason IS NOT NULL AND l.id <= ?2 ORDER BY m.experiment_id, l.id
            """);
        select.Bind(1, campaignId).Bind(2, asOf is null ? long.MaxValue : asOf.LastLoadId ?? 0).Bind(3, asOf?.LastTestRunId ?? long.MaxValue);
        while (select.Read())
        {
            long load = select.Integer(1);
            if (select.IsNull(3) || select.Integer(3) >= load)
            {
                continue;
            }

            Amended amended = Of(select.Integer(0));
            amended.Reasons.Add(select.Text(2));
            amended.AwaitsTest |= select.Integer(4) < load;
        }
    }

    /// <summary>Keys of the experiments, those included whose plan was amended.</summary>
    public IEnumerable<long> Ids => _experiments.Keys.Union(Plan.Ids);

    /// <summary>Whether there is an experiment whose result may not stand.</summary>
    public bool Any => _experiments.Count > 0;

    /// <summary>Whether values came in or were left out, or the experiment was withdrawn, after the latest test, which is then no longer its result.</summary>
    public bool AwaitsTest(long experimentId) => _experiments.TryGetValue(experimentId, out Amended? amended) && amended.AwaitsTest;

    /// <summary>Every deviation from the plan in words: changes of the sealed plan, then the reasons of amendments, exclusions and withdrawals, oldest first.</summary>
    public IReadOnlyList<string> Reasons(long experimentId) =>
        _experiments.TryGetValue(experimentId, out Amended? amended) ? [.. Plan.Sentences(experimentId), .. amended.Reasons] : Plan.Sentences(experimentId);

    private Amended Of(long experimentId)
    {
        if (!_experiments.TryGetValue(experimentId, out Amended? amended))
        {
            _experiments[experimentId] = amended = new Amended();
        }

        return amended;
    }

    private sealed class Amended
    {
        public List<string> Reasons { get; } = [];

        public bool AwaitsTest { get; set; }
    }
}
