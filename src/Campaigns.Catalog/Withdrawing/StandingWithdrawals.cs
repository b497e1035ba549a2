using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Withdrawing;

/// <summary>The experiments of a campaign that are withdrawn as things stand, or stood at a position of the record, with every decision that led there.</summary>
/// <remarks>Of each experiment the latest decision stands. Campaigns without any, which is nearly all, cost one look at an empty table; else O(decisions), one statement.</remarks>
internal sealed class StandingWithdrawals
{
    private readonly Dictionary<long, Experiment> _experiments = [];

    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    /// <param name="asOf">The position up to which decisions and test runs count; null for all of them.</param>
    public StandingWithdrawals(Catalog catalog, long campaignId, RecordPosition? asOf = null)
    {
        using SqliteStatement any = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM withdrawals)");
        any.Read();
        bool none = any.Integer(0) == 0;
        any.Reset();
        if (none)
        {
            return;
        }

        using SqliteStatement select = catalog.Prepare(
            """
            SELECT w.experiment_id, w.id, w.is_withdrawn, w.had_data, w.reason, w.named_by, w.made_at, e.code,
                (SELECT max(coalesce(t.last_withdrawal_id, 0)) FROM test_results r JOIN test_runs t ON t.id = r.test_run_id WHERE r.experiment_id = w.experiment_id AND t.id <= ?3),
                (SELECT coalesce(min(coalesce(t.last_withdrawal_id, 0)), w.id) < w.id FROM test_runs t WHERE t.campaign_id = ?1)
            FROM withdrawals w JOIN experiments e ON e.id = w.experiment_id
            WHERE e.campaign_id = ?1 AND w.id <= ?2 ORDER BY w.experiment_id, w.id
            """);
        select.Bind(1, campaignId).Bind(2, asOf is null ? long.MaxValue : asOf.LastWithdrawalId ?? 0).Bind(3, asOf?.LastTestRunId ?? long.MaxValue);
        while (select.Read())
        {
            Add(select);
        }
    }

    /// <summary>Key of the campaign's latest decision; null where there is none.</summary>
    public long? LastId { get; private set; }

    /// <summary>Decisions, all of them.</summary>
    public int Count { get; private set; }

    /// <summary>Experiments about which anything was decided.</summary>
    public IReadOnlyCollection<long> Ids => _experiments.Keys;

    /// <summary>How many experiments are withdrawn.</summary>
    public WithdrawnCounts Counts => new(
        _experiments.Values.Count(e => e.Latest is { IsWithdrawn: true, HadData: true }),
        _experiments.Values.Count(e => e.Latest.LeavesFamily),
        _experiments.Values.Count(e => e.Latest is { LeavesFamily: true, AfterResults: true }));

    /// <summary>Whether an experiment is withdrawn: it has no result that counts, and is no survivor.</summary>
    public bool IsWithdrawn(long experimentId) => _experiments.TryGetValue(experimentId, out Experiment? found) && found.Latest.IsWithdrawn;

    /// <summary>Whether an experiment was withdrawn before any data, so that its family does not count it; another that is withdrawn counts with p = 1.</summary>
    public bool LeavesFamily(long experimentId) => _experiments.TryGetValue(experimentId, out Experiment? found) && found.Latest.LeavesFamily;

    /// <summary>Whether a decision about an experiment came after its latest test, which is then no longer its result: one that was taken in again is tested anew.</summary>
    public bool AwaitsTest(long experimentId) => _experiments.TryGetValue(experimentId, out Experiment? found) && found.AwaitsTest;

    /// <summary>Every decision about an experiment in plain words, oldest first.</summary>
    public IReadOnlyList<string> Reasons(long experimentId) => [.. Decisions(experimentId).Select(d => d.Sentence)];

    /// <summary>Every decision about an experiment, oldest first.</summary>
    public IReadOnlyList<Withdrawal> Decisions(long experimentId) => _experiments.TryGetValue(experimentId, out Experiment? found) ? found.Decisions : [];

    /// <summary>Every decision, in the order in which they were made.</summary>
    public IEnumerable<Withdrawal> InOrder() =>
        _experiments.Values.SelectMany(e => e.Keys.Zip(e.Decisions)).OrderBy(d => d.First).Select(d => d.Second);

    /// <summary>How many decisions came after one.</summary>
    /// <param name="id">Its key; null counts all.</param>
    public int After(long? id) => _experiments.Values.Sum(e => e.Keys.Count(k => k > (id ?? 0)));

    private void Add(SqliteStatement row)
    {
        if (!_experiments.TryGetValue(row.Integer(0), out Experiment? experiment))
        {
            _experiments[row.Integer(0)] = experiment = new Experiment();
        }

        long id = row.Integer(1);
        Count++;
        LastId = Math.Max(id, LastId ?? 0);
        experiment.Keys.Add(id);
        experiment.Decisions.Add(new Withdrawal(
            row.Text(7), row.Integer(2) != 0, row.Integer(3) != 0, row.Integer(9) != 0, row.Text(4), row.Text(5), Instants.FromMicroseconds(row.Integer(6))));
        experiment.AwaitsTest |= !row.IsNull(8) && row.Integer(8) < id;
    }

    private sealed class Experiment
    {
        public List<long> Keys { get; } = [];

        public List<Withdrawal> Decisions { get; } = [];

        public Withdrawal Latest => Decisions[^1];

        public bool AwaitsTest { get; set; }
    }
}
