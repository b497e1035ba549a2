using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Loading;

/// <summary>What a load must know of an experiment.</summary>
internal sealed class KnownExperiment
{
    /// <summary>Key within the catalog; 0 for one that the data brings and that is not stored yet.</summary>
    public long Id { get; set; }

    public required string Code { get; init; }

    public long? GroupSetId { get; set; }

    public bool GroupsArePlanned { get; init; }

    /// <summary>Whether it was tested, and so is closed to more data.</summary>
    public bool IsTested { get; init; }
}

/// <summary>The experiments of a campaign by their code.</summary>
/// <remarks>
/// A large file reads all of them at once; a small file among very many experiments asks for each that it names,
/// so that one more experiment in a catalog of 100,000 does not cost reading 100,000.
/// </remarks>
internal sealed class ExperimentDirectory : IDisposable
{
    private const long BytesPerExperiment = 20;
    private const string Select =
        """
        SELECT id, code, group_set_id, groups_are_planned, EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = e.id)
        FROM experiments e WHERE campaign_id = ?1
        """;

    private readonly long _campaignId;
    private readonly Utf8Interner? _codes;
    private readonly List<KnownExperiment> _experiments = [];
    private readonly SqliteStatement? _find;

    public ExperimentDirectory(Catalog catalog, long campaignId, long fileSize)
    {
        _campaignId = campaignId;
        long most = (fileSize / BytesPerExperiment) + 1;
        long count = CountUpTo(most, catalog, campaignId);
        IsEmpty = count == 0;
        if (IsEmpty)
        {
            return;
        }

        if (count == most)
        {
            _find = catalog.Prepare(Select + " AND code = ?2");
            return;
        }

        _codes = new Utf8Interner();
        using SqliteStatement all = catalog.Prepare(Select);
        all.Bind(1, campaignId);
        while (all.Read())
        {
            _codes.Intern(all.Blob(1));
            _experiments.Add(Row(all));
        }
    }

    /// <summary>Whether the campaign had no experiments before the load.</summary>
    public bool IsEmpty { get; }

    public KnownExperiment? Find(ReadOnlySpan<byte> code)
    {
        if (_find is not null)
        {
            _find.Bind(1, _campaignId).BindText(2, code);
            KnownExperiment? found = _find.Read() ? Row(_find) : null;
            _find.Reset();
            return found;
        }

        return _codes?.Find(code) is >= 0 and int number ? _experiments[number] : null;
    }

    public void Dispose() => _find?.Dispose();

    /// <summary>Every code, for a suggestion where one is not found.</summary>
    public static IReadOnlyList<string> Codes(Catalog catalog, long campaignId)
    {
        using SqliteStatement select = catalog.Prepare("SELECT code FROM experiments WHERE campaign_id = ?1 ORDER BY id");
        select.Bind(1, campaignId);
        var codes = new List<string>();
        while (select.Read())
        {
            codes.Add(select.Text(0));
        }

        return codes;
    }

    /// <summary>Experiments of the campaign, counted no further than asked: a small file need not know how many hundred thousand there are.</summary>
    private static long CountUpTo(long most, Catalog catalog, long campaignId)
    {
        using SqliteStatement count = catalog.Prepare("SELECT count(*) FROM (SELECT 1 FROM experiments WHERE campaign_id = ?1 LIMIT ?2)");
        count.Bind(1, campaignId).Bind(2, most).Read();
        return count.Integer(0);
    }

    private static KnownExperiment Row(SqliteStatement row) => new()
    {
        Id = row.Integer(0),
        Code = row.Text(1),
        GroupSetId = row.NullableInteger(2),
        GroupsArePlanned = row.Integer(3) != 0,
        IsTested = row.Integer(4) != 0,
    };
}
