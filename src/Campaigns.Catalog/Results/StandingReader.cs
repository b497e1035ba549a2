using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Results;

/// <summary>Reads a campaign as it stands: every experiment with its result, corrected over the whole family.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class StandingReader(Catalog catalog)
{
    /// <summary>The campaign as it stands. A handful of scans whatever the number of experiments; O(m log m) for the correction.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public CampaignStanding Read(string code)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        var amended = new AmendedExperiments(catalog, stored.Id);
        Dictionary<long, DataAtHand> untested = UntestedData(stored.Id);
        List<ExperimentResult> experiments = ReadExperiments(stored.Id, amended, untested);
        (ReviewHead Head, long? LastRun)? latest = new ReviewStore(catalog).Latest(stored.Id);
        return new CampaignStanding(
            stored.Campaign,
            FamilyVerdict.Apply(stored.Campaign, experiments, experiments.Count),
            experiments.Count,
            latest?.Head,
            ResultsSince(stored.Id, latest?.LastRun ?? 0));
    }

    private List<ExperimentResult> ReadExperiments(long campaignId, AmendedExperiments amended, Dictionary<long, DataAtHand> untested)
    {
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement plans = catalog.Prepare($"SELECT {PlanStore.ExperimentColumns} FROM experiments WHERE campaign_id = ?1 ORDER BY id");
        using SqliteStatement results = catalog.Prepare(
            """
            SELECT r.experiment_id, r.status, r.group_count, r.observation_count, r.statistic, r.df1, r.df2, r.p, r.log_p, r.eta_squared, r.omega_squared
            FROM experiments e JOIN test_results r ON r.experiment_id = e.id WHERE e.campaign_id = ?1 ORDER BY e.id, r.test_run_id
            """);
        plans.Bind(1, campaignId);
        results.Bind(1, campaignId);
        bool more = results.Read();
        var experiments = new List<ExperimentResult>();
        while (plans.Read())
        {
            long id = plans.Integer(0);
            var experiment = new ExperimentResult
            {
                Plan = PlanStore.Row(plans, sets),
                Position = experiments.Count + 1,
                Status = ExperimentStatus.Planned,
                Amendments = amended.Reasons(id),
            };

            // Results come in the order of the same keys; of several for one experiment the last stands.
            for (; more && results.Integer(0) == id; more = results.Read())
            {
                experiment = amended.AwaitsTest(id) ? experiment : WithResult(experiment, results);
            }

            experiments.Add(untested.TryGetValue(id, out DataAtHand? data) ? data.Describe(experiment) : experiment);
        }

        return experiments;
    }

    private static ExperimentResult WithResult(ExperimentResult experiment, SqliteStatement row) => experiment with
    {
        Status = ExperimentStatusWords.Parse(row.Text(1)),
        GroupCount = (int)row.Integer(2),
        ObservationCount = (int)row.Integer(3),
        Statistic = row.NullableReal(4),
        Df1 = row.NullableReal(5),
        Df2 = row.NullableReal(6),
        P = FamilyReader.ReadP(row, 7),
        EtaSquared = row.NullableReal(9),
        OmegaSquared = row.NullableReal(10),
    };

    /// <summary>Counts of the experiments that have data and no standing result.</summary>
    private Dictionary<long, DataAtHand> UntestedData(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.id, e.group_set_id, e.groups_are_planned, e.replicates, m.packed
            FROM experiments e JOIN measurements m ON m.experiment_id = e.id
            WHERE e.campaign_id = ?1 AND NOT EXISTS (
                SELECT 1 FROM test_results r JOIN test_runs t ON t.id = r.test_run_id
                WHERE r.experiment_id = e.id AND coalesce(t.last_load_id, 0) >= m.load_id)
            ORDER BY e.id, m.load_id
            """);
        using var sets = new GroupSets(catalog, campaignId);
        select.Bind(1, campaignId);
        var data = new Dictionary<long, DataAtHand>();
        var values = new ObservationColumns();
        while (select.Read())
        {
            long id = select.Integer(0);
            if (!data.TryGetValue(id, out DataAtHand? at))
            {
                data[id] = at = new DataAtHand(sets.Labels(select.NullableInteger(1)).Length, select.Integer(2) != 0, (int?)select.NullableInteger(3));
            }

            values.Clear();
            PackedMeasurements.Read(select.Blob(4), values);
            at.Add(values.Groups);
        }

        return data;
    }

    private int ResultsSince(long campaignId, long testRunId)
    {
        using SqliteStatement count = catalog.Prepare(
            """
            SELECT count(*) FROM test_results r JOIN test_runs t ON t.id = r.test_run_id
            WHERE r.test_run_id > ?2 AND t.campaign_id = ?1
            """);
        count.Bind(1, campaignId).Bind(2, testRunId).Read();
        return (int)count.Integer(0);
    }

    /// <summary>Values of an experiment by group, against what its plan asks for.</summary>
    private sealed class DataAtHand(int groupCount, bool groupsArePlanned, int? replicates)
    {
        private readonly List<ushort> _groups = [];

        public void Add(ReadOnlySpan<ushort> groups) => _groups.AddRange(groups);

        public ExperimentResult Describe(ExperimentResult experiment)
        {
            int[] counts = [];
            bool complete = Completeness.IsComplete(
                System.Runtime.InteropServices.CollectionsMarshal.AsSpan(_groups), groupCount, groupsArePlanned, replicates, ref counts);
            return experiment with
            {
                Status = complete ? ExperimentStatus.Ready : _groups.Count == 0 ? ExperimentStatus.Planned : ExperimentStatus.Incomplete,
                GroupCount = _groups.Distinct().Count(),
                ObservationCount = _groups.Count,
            };
        }
    }
}
