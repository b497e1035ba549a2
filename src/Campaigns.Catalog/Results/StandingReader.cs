using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;

namespace Campaigns.Catalog.Results;

/// <summary>Reads a campaign as it stands: every experiment with its result, corrected over the whole family.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class StandingReader(Catalog catalog)
{
    /// <summary>The campaign as it stands. A handful of scans whatever the number of experiments; O(m log m) for the correction.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public CampaignStanding Read(string code) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        CampaignStanding standing = ReadNow(code);
        return standing with { Experiments = new ConfirmationReader(catalog, ReadNow).Apply(stored, standing) };
    });

    private CampaignStanding ReadNow(string code)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        var amended = new AmendedExperiments(catalog, stored.Id);
        Dictionary<long, DataAtHand> untested = UntestedData(stored.Id);
        List<ExperimentResult> experiments = ReadExperiments(stored, amended, untested);
        (ReviewHead Head, long? LastRun)? latest = new ReviewStore(catalog).Latest(stored.Id);
        CampaignVerdict verdict = FamilyVerdict.Judge(stored.Campaign, FamilyMembers.Of(stored.Campaign, experiments));
        return new CampaignStanding(
            stored.Campaign,
            FamilyVerdict.ApplyToOwn(experiments, verdict),
            experiments.Count(e => !e.LeftFamily),
            latest?.Head,
            new FamilyReader(catalog).ResultsAfter(stored.Id, latest?.LastRun ?? 0))
        {
            AwaitingNewTest = amended.AwaitingTest,
            Withdrawn = amended.Withdrawals.Counts,
            AmendedPlan = amended.Plan.Counts,
            DecisionsSinceReview = new ReviewStore(catalog).DecisionsSince(stored.Id, amended.Withdrawals),
            Families = verdict.Families,
        };
    }

    /// <summary>Some tested experiments in full, by their keys, without the correction; one look-up for all.</summary>
    internal Dictionary<long, ExperimentResult> ReadSome(long campaignId, IEnumerable<long> experimentIds)
    {
        using var rows = new ExperimentRows(catalog, campaignId, [.. experimentIds]);
        var amended = new AmendedExperiments(catalog, campaignId);
        var experiments = new Dictionary<long, ExperimentResult>();
        while (rows.Next(amended) is { } experiment)
        {
            experiments.Add(rows.Id, experiment);
        }

        return experiments;
    }

    private List<ExperimentResult> ReadExperiments(StoredCampaign stored, AmendedExperiments amended, Dictionary<long, DataAtHand> untested)
    {
        using var rows = new ExperimentRows(catalog, stored.Id, only: null);
        Dictionary<long, StreamEntry> entries = stored.Campaign.Streams.Count == 0 ? [] : StreamEntries.Read(catalog, stored.Id);
        var experiments = new List<ExperimentResult>();
        while (rows.Next(amended) is { } experiment)
        {
            experiment = entries.Count == 0 ? experiment : experiment with { Entry = entries.GetValueOrDefault(rows.Id) };
            experiment = untested.TryGetValue(rows.Id, out DataAtHand? data) ? data.Describe(experiment) : experiment;
            experiments.Add(!amended.Withdrawals.IsWithdrawn(rows.Id) ? experiment
                : experiment with { Status = ExperimentStatus.Withdrawn, LeftFamily = amended.Withdrawals.LeavesFamily(rows.Id) });
        }

        if (stored.Campaign.IsExploratory)
        {
            // Without a plan the order of the experiments is the order of their names, whatever the order of the rows that brought them.
            experiments.Sort((a, b) => NaturalOrder.Instance.Compare(a.Plan.Code, b.Plan.Code));
            for (int i = 0; i < experiments.Count; i++)
            {
                experiments[i] = experiments[i] with { Position = i + 1 };
            }
        }

        return experiments;
    }

    /// <summary>Counts of the experiments that have data and no standing result.</summary>
    private Dictionary<long, DataAtHand> UntestedData(long campaignId)
    {
        string stale = NothingCameAfterTests(campaignId) ? "WHERE r.experiment_id = e.id" :
            """
            JOIN test_runs t ON t.id = r.test_run_id
                WHERE r.experiment_id = e.id AND coalesce(t.last_load_id, 0) >= (SELECT max(load_id) FROM measurements WHERE experiment_id = e.id)
                    AND coalesce(t.last_exclusion_id, 0) >= (SELECT coalesce(max(id), 0) FROM exclusions WHERE experiment_id = e.id)
                    AND coalesce(t.last_withdrawal_id, 0) >= (SELECT coalesce(max(id), 0) FROM withdrawals WHERE experiment_id = e.id)
            """;
        using SqliteStatement select = catalog.Prepare(
            $"""
            SELECT e.id, e.group_set_id, e.groups_are_planned, CASE WHEN {TestSelection.TestedBefore} THEN NULL ELSE e.replicates END, m.packed
            FROM experiments e JOIN measurements m ON m.experiment_id = e.id
            WHERE e.campaign_id = ?1 AND NOT EXISTS (
                SELECT 1 FROM test_results r {stale})
            ORDER BY e.id, m.load_id
            """);
        using var sets = new GroupSets(catalog, campaignId);
        select.Bind(1, campaignId);
        var data = new Dictionary<long, DataAtHand>();
        var values = new ObservationColumns();
        var completeness = new Completeness();
        bool more = select.Read();
        while (more)
        {
            long id = select.Integer(0);
            int groupCount = sets.Labels(select.NullableInteger(1)).Length;
            bool planned = select.Integer(2) != 0;
            var replicates = (int?)select.NullableInteger(3);
            values.Clear();
            for (; more && select.Integer(0) == id; more = select.Read())
            {
                PackedMeasurements.Read(select.Blob(4), values);
            }

            ExperimentStatus status =
                completeness.IsComplete(values, groupCount, planned, replicates) ? ExperimentStatus.Ready
                : values.Count == 0 ? ExperimentStatus.Planned
                : ExperimentStatus.Incomplete;
            data[id] = new DataAtHand(status, CountGroups(values.Groups, groupCount), values.Count);
        }

        return data;
    }

    /// <summary>Whether no value of a campaign came, left or was withdrawn after any of its test runs: then every result stands, and none need be looked at.</summary>
    private bool NothingCameAfterTests(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT NOT EXISTS (SELECT 1 FROM exclusions x JOIN experiments e ON e.id = x.experiment_id WHERE e.campaign_id = ?1)
                AND NOT EXISTS (SELECT 1 FROM withdrawals w JOIN experiments e ON e.id = w.experiment_id WHERE e.campaign_id = ?1)
                AND coalesce((SELECT min(coalesce(last_load_id, 0)) FROM test_runs WHERE campaign_id = ?1) >= (SELECT max(id) FROM loads WHERE campaign_id = ?1), 0)
            """);
        select.Bind(1, campaignId).Read();
        bool nothing = select.Integer(0) == 1;
        select.Reset();
        return nothing;
    }

    private static int CountGroups(ReadOnlySpan<ushort> groups, int groupCount)
    {
        var seen = new bool[groupCount];
        foreach (ushort group in groups)
        {
            // Completeness has seen to it that the numbers are the set's, unless the plan gives no number of replicates.
            seen[group < groupCount ? group : throw PackReader.Damaged()] = true;
        }

        return seen.Count(s => s);
    }

    /// <summary>Values of an experiment against what its plan asks for.</summary>
    private sealed record DataAtHand(ExperimentStatus Status, int GroupCount, int ObservationCount)
    {
        public ExperimentResult Describe(ExperimentResult experiment) =>
            experiment with { Status = Status, GroupCount = GroupCount, ObservationCount = ObservationCount };
    }
}
