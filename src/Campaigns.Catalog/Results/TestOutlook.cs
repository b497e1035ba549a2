using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Results;

/// <summary>What a test run would take up. It holds no result: nobody should know one before deciding to test.</summary>
/// <param name="ToTest">Codes of the experiments that would be tested, in the plan's order.</param>
/// <param name="Lacking">Codes of those that have values, but fewer than planned; they are left alone, or are among <paramref name="ToTest"/> where incomplete ones are taken.</param>
public sealed record TestOutlook(IReadOnlyList<string> ToTest, IReadOnlyList<string> Lacking);

/// <summary>Looks what a test run would take up, without running a test.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class TestOutlookReader(Catalog catalog)
{
    /// <summary>Looks through the experiments that a run started now would look through. O(their values).</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="includeIncomplete">Whether experiments short of their planned values would be tested, too.</param>
    /// <param name="cancel">Stops the work.</param>
    /// <exception cref="RefusedException">What the run would be refused for.</exception>
    public TestOutlook Read(string code, bool includeIncomplete, CancellationToken cancel) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        TestSelection.DemandSealed(stored.Campaign);
        RecordPosition? last = TestSelection.LastRun(catalog, stored.Id);
        var withdrawals = new StandingWithdrawals(catalog, stored.Id);
        using var sets = new GroupSets(catalog, stored.Id);
        using SqliteStatement row = TestSelection.Of(catalog, stored.Id, last, includeIncomplete);
        var look = new Look(includeIncomplete);
        while (row.Read())
        {
            if (!withdrawals.IsWithdrawn(row.Integer(0)))
            {
                cancel.ThrowIfCancellationRequested();
                look.Take(row, sets);
            }
        }

        look.End();
        if (last is not null)
        {
            look.AddWaiting(TestSelection.Waiting(catalog, stored.Id));
        }

        return new TestOutlook(look.ToTest, [.. look.Lacking.Values]);
    });

    /// <summary>Gathers the rows of one experiment after the other.</summary>
    private sealed class Look(bool includeIncomplete)
    {
        private readonly ObservationColumns _values = new();
        private readonly Completeness _completeness = new();
        private (long Id, string Code, int GroupCount, bool GroupsArePlanned, int? Replicates)? _current;

        public List<string> ToTest { get; } = [];

        public SortedDictionary<long, string> Lacking { get; } = [];

        public void Take(SqliteStatement row, GroupSets sets)
        {
            if (_current?.Id != row.Integer(0))
            {
                End();
                TestSelection.TestOf(row);
                _current = (row.Integer(0), row.Text(1), sets.Labels(row.NullableInteger(2)).Length, row.Integer(3) != 0, row.Integer(8) != 0 ? null : (int?)row.NullableInteger(4));
            }

            PackedMeasurements.Read(row.Blob(6), _values);
        }

        public void End()
        {
            if (_current is { } e)
            {
                bool isComplete = _completeness.IsComplete(_values, e.GroupCount, e.GroupsArePlanned, e.Replicates);
                if (!isComplete)
                {
                    Lacking.Add(e.Id, e.Code);
                }

                if (isComplete || includeIncomplete)
                {
                    ToTest.Add(e.Code);
                }
            }

            _current = null;
            _values.Clear();
        }

        /// <summary>Adds those that were left alone by an earlier run and received nothing since.</summary>
        public void AddWaiting(IEnumerable<(long Id, string Code)> waiting)
        {
            HashSet<string> tested = [.. ToTest];
            foreach ((long id, string code) in waiting.Where(w => !tested.Contains(w.Code)))
            {
                Lacking.TryAdd(id, code);
            }
        }
    }
}
