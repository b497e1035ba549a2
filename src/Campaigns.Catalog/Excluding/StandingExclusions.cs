using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Excluding;

/// <summary>The observations of a campaign that are left out of its analysis as things stand, with every decision that led there.</summary>
/// <remarks>Campaigns without an exclusion, which is nearly all, cost one look at an empty table.</remarks>
internal sealed class StandingExclusions
{
    private static readonly HashSet<Place> Nothing = [];

    private readonly Dictionary<long, Experiment> _experiments = [];

    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    /// <param name="asOf">The position of the record up to which decisions and test runs count; null for all of them.</param>
    public StandingExclusions(Catalog catalog, long campaignId, RecordPosition? asOf = null)
    {
        using SqliteStatement any = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM exclusions)");
        any.Read();
        bool none = any.Integer(0) == 0;
        any.Reset();
        if (none)
        {
            return;
        }

        using SqliteStatement select = catalog.Prepare(
            """
            SELECT x.experiment_id, x.id, x.load_id, x.line, x.is_excluded, x.group_label, x.value, x.reason, x.named_by, x.made_at, l.file_name, e.code,
                (SELECT max(coalesce(t.last_exclusion_id, 0)) FROM test_results r JOIN test_runs t ON t.id = r.test_run_id WHERE r.experiment_id = x.experiment_id AND t.id <= ?3)
            FROM exclusions x JOIN experiments e ON e.id = x.experiment_id JOIN loads l ON l.id = x.load_id
            WHERE e.campaign_id = ?1 AND x.id <= ?2 ORDER BY x.experiment_id, x.id
            """);
        select.Bind(1, campaignId).Bind(2, asOf is null ? long.MaxValue : asOf.LastExclusionId ?? 0).Bind(3, asOf?.LastTestRunId ?? long.MaxValue);
        while (select.Read())
        {
            Add(select);
        }
    }

    /// <summary>Where an observation came from: its load and its line there.</summary>
    public readonly record struct Place(long LoadId, long Line);

    /// <summary>Key of the latest decision of the campaign; null where there is none.</summary>
    public long? LastId { get; private set; }

    /// <summary>Experiments about whose observations anything was decided.</summary>
    public IReadOnlyCollection<long> Ids => _experiments.Keys;

    /// <summary>Observations of an experiment that are left out.</summary>
    public IReadOnlySet<Place> Of(long experimentId) => _experiments.TryGetValue(experimentId, out Experiment? found) ? found.Excluded : Nothing;

    /// <summary>Observations of an experiment that were left out once a decision had been made, and before the next one.</summary>
    /// <param name="experimentId">The experiment.</param>
    /// <param name="lastId">Key of that decision; null for the time before the first.</param>
    public IReadOnlySet<Place> Of(long experimentId, long? lastId)
    {
        if (!_experiments.TryGetValue(experimentId, out Experiment? found))
        {
            return Nothing;
        }

        var excluded = new HashSet<Place>();
        foreach ((_, Place place, bool isExcluded) in found.Places.TakeWhile(p => p.Id <= (lastId ?? 0)))
        {
            _ = isExcluded ? excluded.Add(place) : excluded.Remove(place);
        }

        return excluded;
    }

    /// <summary>Every decision about an experiment, oldest first.</summary>
    public IReadOnlyList<ExcludedObservation> Decisions(long experimentId) =>
        _experiments.TryGetValue(experimentId, out Experiment? found) ? found.Decisions : [];

    /// <summary>Whether a decision came after the latest test, which is then no longer the experiment's result.</summary>
    public bool AwaitsTest(long experimentId) => _experiments.TryGetValue(experimentId, out Experiment? found) && found.AwaitsTest;

    private void Add(SqliteStatement row)
    {
        if (!_experiments.TryGetValue(row.Integer(0), out Experiment? experiment))
        {
            _experiments[row.Integer(0)] = experiment = new Experiment();
        }

        long id = row.Integer(1);
        LastId = Math.Max(id, LastId ?? 0);
        var place = new Place(row.Integer(2), row.Integer(3));
        bool excluded = row.Integer(4) != 0;
        _ = excluded ? experiment.Excluded.Add(place) : experiment.Excluded.Remove(place);
        experiment.Places.Add((id, place, excluded));
        experiment.Decisions.Add(new ExcludedObservation(
            row.Text(11), row.Text(10), place.Line, row.Text(5), row.Text(6), excluded, row.Text(7), row.Text(8), Instants.FromMicroseconds(row.Integer(9))));
        experiment.AwaitsTest |= !row.IsNull(12) && row.Integer(12) < id;
    }

    private sealed class Experiment
    {
        public HashSet<Place> Excluded { get; } = [];

        public List<(long Id, Place Place, bool IsExcluded)> Places { get; } = [];

        public List<ExcludedObservation> Decisions { get; } = [];

        public bool AwaitsTest { get; set; }
    }
}
