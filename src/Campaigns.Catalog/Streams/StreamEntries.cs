using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Streams;

/// <summary>The experiments that were given a level, with their decisions, as the catalog holds them.</summary>
internal static class StreamEntries
{
    /// <summary>Every entry of a campaign's streams by the key of its experiment; one scan.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    /// <param name="lastTestRunId">The latest test run whose decisions count, as they were known then; null for all.</param>
    public static Dictionary<long, StreamEntry> Read(Catalog catalog, long campaignId, long? lastTestRunId = null) =>
        Lines(catalog, campaignId, lastTestRunId).ToDictionary(l => l.ExperimentId, l => l.Entry);

    /// <summary>Every entry of a campaign's streams, stream by stream in the order of the positions.</summary>
    public static IReadOnlyList<(long ExperimentId, StreamEntry Entry)> Lines(Catalog catalog, long campaignId, long? lastTestRunId = null)
    {
        List<StoredEntry> stored = Stored(catalog, campaignId, lastTestRunId);
        var lines = new List<(long, StreamEntry)>(stored.Count);
        for (int i = 0; i < stored.Count; i++)
        {
            StoredEntry entry = stored[i];
            StoredEntry? next = i + 1 < stored.Count && stored[i + 1].Stream == entry.Stream ? stored[i + 1] : null;
            bool ranWhenNextStarted = next is not null && (entry.KnownOrder is null || entry.KnownOrder > next.KnownCount);
            lines.Add((entry.ExperimentId, new StreamEntry(entry.Stream, entry.Position, entry.Level, Instants.FromMicroseconds(entry.RegisteredAt))
            {
                DecidedAt = entry.DecidedAt is { } at ? Instants.FromMicroseconds(at) : null,
                P = entry.P,
                Survives = entry.Survives,
                Overlaps = entry.KnownCount < entry.Position - 1 || ranWhenNextStarted,
            }));
        }

        return lines;
    }

    /// <summary>The entries as they were stored.</summary>
    public static List<StoredEntry> Stored(Catalog catalog, long campaignId, long? lastTestRunId = null)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.experiment_id, s.number, e.position, e.level, e.registered_at, e.known_count, d.known_order, d.p, d.log_p, d.survives, d.decided_at
            FROM streams s JOIN stream_entries e ON e.stream_id = s.id
            LEFT JOIN standing_decisions d ON d.stream_id = e.stream_id AND d.position = e.position AND d.test_run_id <= ?2
            WHERE s.campaign_id = ?1 ORDER BY s.number, e.position
            """);
        select.Bind(1, campaignId).Bind(2, lastTestRunId ?? long.MaxValue);
        var entries = new List<StoredEntry>();
        while (select.Read())
        {
            bool decided = !select.IsNull(6);
            entries.Add(new StoredEntry(
                select.Integer(0), (int)select.Integer(1), (int)select.Integer(2), select.Real(3), select.Integer(4), (int)select.Integer(5),
                (int?)select.NullableInteger(6), FamilyReader.ReadP(select, 7), decided ? select.Integer(9) != 0 : null, select.NullableInteger(10)));
        }

        return entries;
    }

    /// <summary>What happened to a stream, in order: each start came after the decisions that it knew of.</summary>
    /// <param name="entries">The entries of one stream in the order of their positions.</param>
    public static IEnumerable<OnlineEvent> Events(IReadOnlyList<StoredEntry> entries)
    {
        StoredEntry[] decided = [.. entries.Where(e => e.KnownOrder is not null).OrderBy(e => e.KnownOrder)];
        int known = 0;
        foreach (StoredEntry entry in entries)
        {
            for (; known < decided.Length && decided[known].KnownOrder <= entry.KnownCount; known++)
            {
                yield return OnlineEvent.Reported(decided[known].Position, decided[known].P ?? PValue.One);
            }

            yield return OnlineEvent.Started(entry.Position, entry.Level);
        }

        for (; known < decided.Length; known++)
        {
            yield return OnlineEvent.Reported(decided[known].Position, decided[known].P ?? PValue.One);
        }
    }

    /// <summary>A line of stream_entries with its line of standing_decisions, where there is one.</summary>
    public sealed record StoredEntry(
        long ExperimentId, int Stream, int Position, double Level, long RegisteredAt, int KnownCount, int? KnownOrder, PValue? P, bool? Survives, long? DecidedAt);
}
