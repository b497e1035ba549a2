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
    /// <summary>Tests, in one transaction.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="includeIncomplete">Whether experiments short of their planned values are tested too; recorded.</param>
    /// <param name="progress">Told now and then how far the work is.</param>
    /// <param name="cancel">Stops the work; nothing is then kept.</param>
    /// <exception cref="RefusedException">The campaign is not sealed.</exception>
    public TestRunSummary Run(string code, bool includeIncomplete, Action<WorkProgress> progress, CancellationToken cancel) => catalog.Change(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        TestSelection.DemandSealed(stored.Campaign);
        return Run(stored, includeIncomplete, progress, cancel);
    });

    private TestRunSummary Run(StoredCampaign stored, bool includeIncomplete, Action<WorkProgress> progress, CancellationToken cancel)
    {
        RecordPosition? last = TestSelection.LastRun(catalog, stored.Id);
        RecordPosition seen = RecordPosition.Of(catalog, stored.Id);
        using SqliteStatement select = TestSelection.Of(catalog, stored.Id, last, includeIncomplete);

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

        return new TestRunSummary(results.Tested, results.NotTestable, ran || last is null ? results.Incomplete : TestSelection.Waiting(catalog, stored.Id).Count, ran)
        {
            Decided = streams?.Decided ?? 0,
            DecidedSurvivors = streams?.DecidedSurvivors ?? 0,
        };
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
                _test = TestSelection.TestOf(row);
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
