using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Reviewing;

/// <summary>Runs the tests of a campaign again, each on the values, exclusions and plan that a past test run had.</summary>
/// <remarks>One statement for each question and the pipeline that tests; no query per experiment.</remarks>
internal sealed class PastTests(Catalog catalog, StoredCampaign stored, Action<WorkProgress> progress, CancellationToken cancel)
{
    /// <summary>The columns that each row gives; the set of groups is the one that the latest of the values refer to.</summary>
    private const string Columns =
        """
        e.id, e.code, e.test, m.packed, m.load_id, t.id, t.last_load_id, t.last_exclusion_id, t.last_amendment_id, t.last_withdrawal_id,
        (SELECT x.group_set_id FROM measurements x WHERE x.experiment_id = e.id AND x.load_id <= coalesce(t.last_load_id, 0) ORDER BY x.load_id DESC LIMIT 1)
        """;

    private const string ValuesThen =
        """
        JOIN test_runs t ON t.id = n.run JOIN experiments e ON e.id = n.experiment_id
        JOIN measurements m ON m.experiment_id = e.id AND m.load_id <= coalesce(t.last_load_id, 0) ORDER BY e.id, m.load_id
        """;

    private const string LatestRuns =
        $"""
        SELECT {Columns} FROM (SELECT r.experiment_id, max(r.test_run_id) AS run FROM test_results r JOIN test_runs u ON u.id = r.test_run_id
            WHERE u.campaign_id = ?1 AND u.id <= ?2 GROUP BY r.experiment_id) n
        {ValuesThen}
        """;

    private const string DecidingRuns =
        $"""
        SELECT {Columns} FROM (SELECT s.experiment_id, d.test_run_id AS run FROM streams c JOIN stream_entries s ON s.stream_id = c.id
            JOIN standing_decisions d ON d.stream_id = s.stream_id AND d.position = s.position WHERE c.campaign_id = ?1 AND d.test_run_id <= ?2) n
        {ValuesThen}
        """;

    private readonly PlanThen _plan = new(catalog, stored.Id);
    private readonly StandingExclusions _exclusions = new(catalog, stored.Id);
    private readonly Dictionary<long, int> _draws = [];

    /// <summary>Of each experiment that was tested up to a run the latest test up to it, run again: p-values by keys, ascending; null where the data gave none.</summary>
    public IReadOnlyList<(long Id, PValue? P)> Latest(long lastTestRunId) => Run(LatestRuns, lastTestRunId);

    /// <summary>The same of the tests on which standing decisions were made.</summary>
    public IReadOnlyList<(long Id, PValue? P)> Decisions(long lastTestRunId) => Run(DecidingRuns, lastTestRunId);

    private List<(long Id, PValue? P)> Run(string sql, long lastTestRunId)
    {
        var results = new List<(long, PValue?)>();
        using var sets = new GroupSets(catalog, stored.Id);
        using var pipeline = new TestPipeline(includeIncomplete: true, batch => Store(batch, results));
        using SqliteStatement select = catalog.Prepare(sql);
        select.Bind(1, stored.Id).Bind(2, lastTestRunId);
        TestBatch batch = pipeline.Fresh();
        long done = 0;
        while (select.Read())
        {
            if (select.Integer(0) != batch.LastId)
            {
                if (batch.IsFull)
                {
                    cancel.ThrowIfCancellationRequested();
                    progress(new WorkProgress("testing again", done += batch.Count, 0, "experiments"));
                    pipeline.Give(batch);
                    batch = pipeline.Fresh();
                }

                batch.Begin(Of(select, sets));
            }

            batch.Add(select.Integer(4), select.Blob(3));
        }

        pipeline.Give(batch);
        pipeline.Finish();
        cancel.ThrowIfCancellationRequested();
        return results;
    }

    private static void Store(TestBatch batch, List<(long, PValue?)> results)
    {
        for (int i = 0; i < batch.Count; i++)
        {
            results.Add((batch[i].Id, (batch.OutcomeOf(i) as Tested)?.P));
        }
    }

    private ExperimentToTest Of(SqliteStatement row, GroupSets sets)
    {
        long id = row.Integer(0);
        var then = new RecordPosition(row.NullableInteger(6), row.NullableInteger(7), row.NullableInteger(8), row.NullableInteger(9));
        string key = _plan.Of(id, "test", row.Text(2), then.LastAmendmentId) ?? stored.Campaign.DefaultTest;
        GroupTest test = GroupTestRegistry.Find(key)
            ?? throw new RefusedException($"Experiment '{row.Text(1)}' was tested by '{key}', which this version of the program does not have.");
        return new ExperimentToTest(
            id, sets.Labels(row.NullableInteger(10)).Length, GroupsArePlanned: false, Replicates: null, test,
            test.DrawsAtRandom ? new RandomDraws(PermutationDraws.Seed(stored.Campaign.Code, row.Text(1)), Draws(row.Integer(5), then)) { Stop = cancel } : default,
            _exclusions.Of(id, then.LastExclusionId));
    }

    private int Draws(long runId, RecordPosition then)
    {
        if (!_draws.TryGetValue(runId, out int draws))
        {
            _draws[runId] = draws = new FamilyReader(catalog).PermutationDrawCount(stored, then);
        }

        return draws;
    }
}
