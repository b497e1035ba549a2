using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Streams;

/// <summary>Takes experiments into a campaign's latest stream and stores their decisions; inside a transaction, so that a level and what it rests on are kept together.</summary>
internal sealed class StreamKeeper : IDisposable
{
    private readonly Catalog _catalog;
    private readonly OnlineStream _stream;
    private readonly int _latest;
    private readonly Dictionary<int, long> _streamIds = [];
    private readonly Dictionary<int, int> _known = [];
    private readonly Dictionary<long, Place> _places = [];
    private readonly Dictionary<int, (long First, long Last)> _given = [];
    private readonly Dictionary<int, (long First, long Last)> _made = [];
    private readonly SqliteStatement _register;
    private readonly SqliteStatement _decide;

    /// <summary>Rebuilds the streams from what was stored, at the levels that were given then; one scan.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="stored">A sealed campaign with an online procedure.</param>
    public StreamKeeper(Catalog catalog, StoredCampaign stored)
    {
        _catalog = catalog;
        StreamHead latest = stored.Campaign.Streams[^1];
        _latest = latest.Number;
        using SqliteStatement ids = catalog.Prepare("SELECT number, id FROM streams WHERE campaign_id = ?1");
        ids.Bind(1, stored.Id);
        while (ids.Read())
        {
            _streamIds.Add((int)ids.Integer(0), ids.Integer(1));
        }

        List<StreamEntries.StoredEntry> entries = StreamEntries.Stored(catalog, stored.Id);
        foreach (StreamEntries.StoredEntry entry in entries)
        {
            _places.Add(entry.ExperimentId, new Place(entry.Stream, entry.Position, entry.Level, entry.KnownOrder is not null));
            _known[entry.Stream] = _known.GetValueOrDefault(entry.Stream) + (entry.KnownOrder is null ? 0 : 1);
        }

        _stream = Resume(latest, [.. entries.Where(e => e.Stream == _latest)]);
        _register = catalog.Prepare("INSERT INTO stream_entries (stream_id, position, experiment_id, level, known_count, registered_at) VALUES (?1, ?2, ?3, ?4, ?5, ?6)");
        _decide = catalog.Prepare("INSERT INTO standing_decisions (stream_id, position, known_order, test_run_id, p, log_p, survives, decided_at) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8)");
    }

    /// <summary>What this keeper wrote, for the ledger: levels given and decisions made, stream by stream.</summary>
    public IReadOnlyList<EvidenceRequest> Evidence =>
    [
        .. _given.OrderBy(g => g.Key).Select(g => EvidenceRegistry.Levels.Of(_streamIds[g.Key], g.Value.First, g.Value.Last)),
        .. _made.OrderBy(g => g.Key).Select(g => EvidenceRegistry.Decisions.Of(_streamIds[g.Key], g.Value.First, g.Value.Last)),
    ];

    /// <summary>Experiments decided by this keeper.</summary>
    public int Decided { get; private set; }

    /// <summary>Those of them that survive.</summary>
    public int DecidedSurvivors { get; private set; }

    /// <summary>Whether an experiment was given a level already.</summary>
    public bool IsRegistered(long experimentId) => _places.ContainsKey(experimentId);

    /// <summary>Gives an experiment its level, from what is known now.</summary>
    public void Register(long experimentId)
    {
        int known = _stream.Finished;
        OnlineLevel given = _stream.Register();
        _register.Bind(1, _streamIds[_latest]).Bind(2, (long)given.Position).Bind(3, experimentId).Bind(4, given.Level).Bind(5, (long)known).Bind(6, _catalog.Now).Run();
        _places.Add(experimentId, new Place(_latest, given.Position, given.Level, false));
        _given[_latest] = (_given.TryGetValue(_latest, out (long First, long Last) range) ? range.First : given.Position, given.Position);
    }

    /// <summary>Decides an experiment on its first test, once and for all; one that was not registered is so just before. A later test changes nothing.</summary>
    /// <param name="experimentId">The experiment.</param>
    /// <param name="p">Its p-value; null where its data gave none, which counts as 1.</param>
    /// <param name="testRunId">The test run.</param>
    public void Decide(long experimentId, PValue? p, long testRunId)
    {
        if (!_places.ContainsKey(experimentId))
        {
            Register(experimentId);
        }

        Place place = _places[experimentId];
        if (place.IsDecided)
        {
            return;
        }

        PValue counted = p ?? PValue.One;
        bool survives = place.Stream == _latest ? _stream.Report(place.Position, counted) : new OnlineLevel(place.Position, place.Level).Rejects(counted);
        int order = _known[place.Stream] = _known.GetValueOrDefault(place.Stream) + 1;
        _decide.Bind(1, _streamIds[place.Stream]).Bind(2, (long)place.Position).Bind(3, (long)order).Bind(4, testRunId)
            .Bind(5, p?.Value).Bind(6, p is { } given && given.Value < PackedReviewLines.LogStoredBelow ? given.Log : null)
            .Bind(7, survives ? 1L : 0L).Bind(8, _catalog.Now).Run();
        _made[place.Stream] = (_made.TryGetValue(place.Stream, out (long First, long Last) range) ? range.First : order, order);
        _places[experimentId] = place with { IsDecided = true };
        Decided++;
        DecidedSurvivors += survives ? 1 : 0;
    }

    public void Dispose()
    {
        _register.Dispose();
        _decide.Dispose();
    }

    private static OnlineStream Resume(StreamHead latest, List<StreamEntries.StoredEntry> entries)
    {
        try
        {
            return latest.Procedure.Resume(latest.Settings, StreamEntries.Events(entries));
        }
        catch (ArgumentException error)
        {
            throw new CatalogException($"The stored decisions of stream {latest.Number} cannot have happened in the order in which they stand; the catalog is damaged. {error.Message}");
        }
    }

    private readonly record struct Place(int Stream, int Position, double Level, bool IsDecided);
}
