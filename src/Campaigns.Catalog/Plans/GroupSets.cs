using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Plans;

/// <summary>The group sets of one campaign: ordered lists of labels, each kept once however many experiments compare them.</summary>
internal sealed class GroupSets : IDisposable
{
    private readonly Catalog _catalog;
    private readonly long _campaignId;
    private readonly Dictionary<long, string[]> _labels = [];
    private readonly Dictionary<string, long> _ids = new(StringComparer.Ordinal);
    private SqliteStatement? _insertSet;
    private SqliteStatement? _insertGroup;
    private long _nextId;

    public GroupSets(Catalog catalog, long campaignId)
    {
        _catalog = catalog;
        _campaignId = campaignId;
        using SqliteStatement select = catalog.Prepare(
            "SELECT s.id, g.label FROM group_sets s JOIN groups g ON g.group_set_id = s.id WHERE s.campaign_id = ?1 ORDER BY s.id, g.position");
        select.Bind(1, campaignId);
        var labels = new List<string>();
        long current = 0;
        while (select.Read())
        {
            if (select.Integer(0) != current && labels.Count > 0)
            {
                Remember(current, [.. labels]);
                labels.Clear();
            }

            current = select.Integer(0);
            labels.Add(select.Text(1));
        }

        if (labels.Count > 0)
        {
            Remember(current, [.. labels]);
        }
    }

    /// <summary>The latest key of all sets; 0 before the first.</summary>
    public static long LastId(Catalog catalog)
    {
        using SqliteStatement last = catalog.Prepare("SELECT coalesce(max(id), 0) FROM group_sets");
        last.Read();
        return last.Integer(0);
    }

    /// <summary>What was added to a campaign's sets in this transaction, for the ledger: none or one range.</summary>
    public static IEnumerable<EvidenceRequest> Since(Catalog catalog, long campaignId, long lastIdBefore) =>
        LastId(catalog) is var last && last > lastIdBefore ? [EvidenceRegistry.GroupSets.Of(campaignId, lastIdBefore + 1, last)] : [];

    /// <summary>The labels of a set, in the order of their positions.</summary>
    public string[] Labels(long? id) => id is { } key ? _labels[key] : [];

    /// <summary>The set of these labels in this order, stored where it is new; inside a transaction.</summary>
    public long IdOf(IReadOnlyList<string> labels)
    {
        if (_ids.TryGetValue(Key(labels), out long known))
        {
            return known;
        }

        if (_insertSet is null)
        {
            using SqliteStatement last = _catalog.Prepare("SELECT coalesce(max(id), 0) FROM group_sets");
            last.Read();
            _nextId = last.Integer(0);
            last.Reset();
            _insertSet = _catalog.Prepare("INSERT INTO group_sets (id, campaign_id) VALUES (?1, ?2)");
            _insertGroup = _catalog.Prepare("INSERT INTO groups (group_set_id, position, label) VALUES (?1, ?2, ?3)");
        }

        long id = ++_nextId;
        _insertSet.Bind(1, id).Bind(2, _campaignId).Run();
        for (int position = 0; position < labels.Count; position++)
        {
            _insertGroup!.Bind(1, id).Bind(2, (long)position).Bind(3, labels[position]).Run();
        }

        Remember(id, [.. labels]);
        return id;
    }

    public void Dispose()
    {
        _insertSet?.Dispose();
        _insertGroup?.Dispose();
    }

    private void Remember(long id, string[] labels)
    {
        _labels[id] = labels;
        _ids[Key(labels)] = id;
    }

    /// <summary>Labels hold no control characters, so a line feed parts them safely.</summary>
    private static string Key(IReadOnlyList<string> labels) => string.Join('\n', labels);
}
