using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Streams;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Catalog.Results;

/// <summary>What a test run did.</summary>
/// <param name="Tested">Experiments with a result.</param>
/// <param name="NotTestable">Experiments whose data cannot give a result, with the reason stored.</param>
/// <param name="Incomplete">Experiments left alone because planned values are missing.</param>
/// <param name="Ran">Whether a run was stored; false where there was nothing to test.</param>
public sealed record TestRunSummary(int Tested, int NotTestable, int Incomplete, bool Ran)
{
    /// <summary>Experiments decided for good, in a campaign that is judged as its experiments arrive.</summary>
    public int Decided { get; init; }

    /// <summary>Those of them that survive.</summary>
    public int DecidedSurvivors { get; init; }
}

/// <summary>Runs the planned test of every experiment that is complete and not yet tested.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class TestRunner(Catalog catalog)
{
    private const string Columns =
        "e.id, e.code, e.group_set_id, e.groups_are_planned, e.replicates, e.test, m.packed, m.load_id";

    /// <summary>Whether the experiment was tested before, and values of it were left out or it was withdrawn since: it was complete, or taken incomplete on purpose, and neither makes it less so.</summary>
    internal const string TestedBefore =
        """
        (EXISTS (SELECT 1 FROM exclusions x WHERE x.experiment_id = e.id) OR EXISTS (SELECT 1 FROM withdrawals w WHERE w.experiment_id = e.id))
            AND EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = e.id)
        """;

    private const string All =
        $"SELECT {Columns}, 0 FROM experiments e JOIN measurements m ON m.experiment_id = e.id WHERE e.campaign_id = ?1 ORDER BY e.id, m.load_id";

    // A cross join is SQLite's way of being told where to begin: at the few experiments that received data, not at all there are.
    private const string WithNewsAfterRun =
        $"""
        SELECT {Columns}, {TestedBefore} FROM (SELECT experiment_id FROM measurements WHERE load_id > ?2 UNION SELECT experiment_id FROM exclusions WHERE id > ?3
            UNION SELECT experiment_id FROM withdrawals WHERE id > ?4
            UNION SELECT experiment_id FROM plan_amendment_changes c WHERE c.amendment_id > ?5 AND NOT EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = c.experiment_id)) n
        CROSS JOIN experiments e ON e.id = n.experiment_id CROSS JOIN measurements m ON m.experiment_id = e.id
        WHERE e.campaign_id = ?1 ORDER BY e.id, m.load_id
        """;

    private const string Untested =
        $"""
        SELECT {Columns}, {TestedBefore} FROM experiments e JOIN measurements m ON m.experiment_id = e.id
        WHERE e.campaign_id = ?1 AND NOT EXISTS (
            SELECT 1 FROM test_results r JOIN test_runs t ON t.id = r.test_run_id
            WHERE r.experiment_id = e.id AND coalesce(t.last_load_id, 0) >= (SELECT max(load_id) FROM measurements WHERE experiment_id = e.id)
                AND coalesce(t.last_exclusion_id, 0) >= (SELECT coalesce(max(id), 0) FROM exclusions WHERE experiment_id = e.id)
                AND coalesce(t.last_withdrawal_id, 0) >= (SELECT coalesce(max(id), 0) FROM withdrawals WHERE experiment_id = e.id))
        ORDER BY e.id, m.load_id
        """;

    /// <summary>Tests, in one transaction.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="includeIncomplete">Whether experiments short of their planned values are tested too; recorded.</param>
    /// <param name="progress">Told now and then how far the work is.</param>
    /// <param name="cancel">Stops the work; nothing is then kept.</param>
    /// <exception cref="RefusedException">The campaign is not sealed.</exception>
    public TestRunSummary Run(string code, bool includeIncomplete, Action<WorkProgress> progress, CancellationToken cancel) => catalog.Change(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        if (!stored.Campaign.IsSealed)
        {
            throw new RefusedException($"The campaign '{code}' is not sealed: level, correction and family must be fixed before the first result is seen; run 'campaigns seal {code}'.");
        }

        return Run(stored, includeIncomplete, progress, cancel);
    });

    private TestRunSummary Run(StoredCampaign stored, bool includeIncomplete, Action<WorkProgress> progress, CancellationToken cancel)
    {
        RecordPosition? last = LastRun(stored.Id);
        RecordPosition seen = RecordPosition.Of(catalog, stored.Id);
        string sql = last is null ? All : includeIncomplete ? Untested : WithNewsAfterRun;
        using SqliteStatement select = catalog.Prepare(sql);
        select.Bind(1, stored.Id);
        if (sql == WithNewsAfterRun)
        {
            select.Bind(2, last!.LastLoadId ?? 0).Bind(3, last.LastExclusionId ?? 0).Bind(4, last.LastWithdrawalId ?? 0).Bind(5, last.LastAmendmentId ?? 0);
        }

        var exclusions = new StandingExclusions(catalog, stored.Id);
        var withdrawals = new StandingWithdrawals(catalog, stored.Id);
        using var sets = new GroupSets(catalog, stored.Id);
        using StreamKeeper? streams = stored.Campaign.Streams.Count == 0 ? null : new StreamKeeper(catalog, stored);
        using var results = new ResultWriter(catalog, stored.Id, seen, includeIncomplete, streams);
        using var pipeline = new TestPipeline(includeIncomplete, results.Write);
        var plans = new PlannedTests(stored.Campaign, () => new FamilyReader(catalog).PermutationDrawCount(stored), sets, exclusions, cancel);
        TestBatch batch = pipeline.Fresh();
        long done = 0;
        while (select.Read())
        {
            if (withdrawals.IsWithdrawn(select.Integer(0)))
            {
                continue;
            }

            if (select.Integer(0) != batch.LastId)
            {
                if (batch.IsFull)
                {
                    cancel.ThrowIfCancellationRequested();
                    progress(new WorkProgress("testing", done += batch.Count, 0, "experiments"));
                    pipeline.Give(batch);
                    batch = pipeline.Fresh();
                }

                batch.Begin(plans.Of(select));
            }

            batch.Add(select.Integer(7), select.Blob(6));
        }

        pipeline.Give(batch);
        pipeline.Finish();
        cancel.ThrowIfCancellationRequested();
        bool ran = results.Tested + results.NotTestable > 0;
        if (ran)
        {
            catalog.Record(new LedgerAct(LedgerAction.Test, stored.Campaign.Code)
            {
                Subject = FormattableString.Invariant($"test run {results.RunId}"),
                Changes =
                [
                    new LedgerChange("tested", null, FormattableString.Invariant($"{results.Tested}")), new LedgerChange("not testable", null, FormattableString.Invariant($"{results.NotTestable}")),
                    .. includeIncomplete ? [new LedgerChange("incomplete experiments", "left alone", "taken")] : Array.Empty<LedgerChange>(),
                ],
                Evidence = [EvidenceRegistry.TestRun.Of(results.RunId), .. streams?.Evidence ?? []],
            });
        }

        return new TestRunSummary(results.Tested, results.NotTestable, ran || last is null ? results.Incomplete : Waiting(stored.Id), ran)
        {
            Decided = streams?.Decided ?? 0,
            DecidedSurvivors = streams?.DecidedSurvivors ?? 0,
        };
    }

    /// <summary>What the latest run had seen; null before the first.</summary>
    private RecordPosition? LastRun(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare("SELECT last_load_id, last_exclusion_id, last_amendment_id, last_withdrawal_id FROM test_runs WHERE campaign_id = ?1 ORDER BY id DESC LIMIT 1");
        return select.Bind(1, campaignId).Read()
            ? new RecordPosition(select.NullableInteger(0), select.NullableInteger(1), select.NullableInteger(2), select.NullableInteger(3))
            : null;
    }

    /// <summary>Experiments that have values and no result, and are not withdrawn: those that were left alone before and received nothing since.</summary>
    private int Waiting(long campaignId)
    {
        using SqliteStatement count = catalog.Prepare(
            """
            SELECT count(*) FROM experiments e WHERE e.campaign_id = ?1
                AND EXISTS (SELECT 1 FROM measurements m WHERE m.experiment_id = e.id)
                AND NOT EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = e.id)
                AND coalesce((SELECT w.is_withdrawn FROM withdrawals w WHERE w.experiment_id = e.id ORDER BY w.id DESC LIMIT 1), 0) = 0
            """);
        count.Bind(1, campaignId).Read();
        return (int)count.Integer(0);
    }

    /// <summary>Reads what the plan says of the test of an experiment.</summary>
    private sealed class PlannedTests(Campaign campaign, Func<int> drawCount, GroupSets sets, StandingExclusions exclusions, CancellationToken cancel)
    {
        // Counting the family takes milliseconds, and only a test that draws wants to know.
        private readonly Lazy<int> _draws = new(drawCount);
        private GroupTest? _test;
        private string _key = "";

        public ExperimentToTest Of(SqliteStatement row)
        {
            if (_test is null || !row.TextEquals(5, _key))
            {
                _key = row.Text(5);
                _test = GroupTestRegistry.Find(_key)
                    ?? throw new RefusedException($"The plan of experiment '{row.Text(1)}' names the test '{_key}', which this version of the program does not have.");
            }

            long id = row.Integer(0);
            return new ExperimentToTest(
                id,
                sets.Labels(row.NullableInteger(2)).Length,
                row.Integer(3) != 0,
                row.Integer(8) != 0 ? null : (int?)row.NullableInteger(4),
                _test,
                _test.DrawsAtRandom ? new RandomDraws(PermutationDraws.Seed(campaign.Code, row.Text(1)), _draws.Value) { Stop = cancel } : default,
                exclusions.Of(id));
        }
    }
}
