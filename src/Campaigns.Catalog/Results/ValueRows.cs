using System.Text.Json;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Results;

/// <summary>Walks through experiments with their values: one look-up for all of them, one experiment in memory at a time.</summary>
internal sealed class ValueRows : IDisposable
{
    private readonly GroupSets _sets;
    private readonly SqliteStatement _select;
    private readonly StandingExclusions _exclusions;
    private readonly ExcludedPositions _leftOut = new();
    private readonly List<(int End, string File)> _files = [];
    private bool _more;

    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    /// <param name="exclusions">What is left out of the analysis.</param>
    /// <param name="only">Codes of the experiments wanted; null for all.</param>
    public ValueRows(Catalog catalog, long campaignId, StandingExclusions exclusions, IEnumerable<string>? only)
    {
        // Where only some are wanted, the list of them is where SQLite is told to begin.
        string chosen = only is null ? "experiments e" : "(SELECT value AS wanted FROM json_each(?2)) w CROSS JOIN experiments e ON e.campaign_id = ?1 AND e.code = w.wanted";
        _exclusions = exclusions;
        _sets = new GroupSets(catalog, campaignId);
        _select = catalog.Prepare(
            $"""
            SELECT e.id, e.code, e.group_set_id, m.load_id, m.missing_count, m.packed, l.file_name FROM {chosen}
            CROSS JOIN measurements m ON m.experiment_id = e.id CROSS JOIN loads l ON l.id = m.load_id WHERE e.campaign_id = ?1 ORDER BY e.id, m.load_id
            """);
        _select.Bind(1, campaignId);
        if (only is not null)
        {
            _select.Bind(2, JsonSerializer.Serialize([.. only], JsonArrays.Default.StringArray));
        }

        _more = _select.Read();
    }

    /// <summary>Key of the experiment at hand.</summary>
    public long Id { get; private set; }

    /// <summary>Code of the experiment at hand.</summary>
    public string Code { get; private set; } = "";

    /// <summary>Labels of its groups.</summary>
    public string[] Labels { get; private set; } = [];

    /// <summary>Rows whose value is marked as missing.</summary>
    public int MissingCount { get; private set; }

    /// <summary>Its values, excluded ones left out unless they were asked for.</summary>
    public ObservationColumns Values { get; } = new();

    /// <summary>Values that were excluded.</summary>
    public int ExcludedCount { get; private set; }

    /// <summary>Reads the next experiment that has values; false at the end.</summary>
    /// <param name="withExcluded">Whether excluded values are kept among the others.</param>
    public bool Next(bool withExcluded = false)
    {
        if (!_more)
        {
            return false;
        }

        Id = _select.Integer(0);
        Code = _select.Text(1);
        Labels = _sets.Labels(_select.NullableInteger(2));
        MissingCount = 0;
        Values.Clear();
        _files.Clear();
        _leftOut.Begin(_exclusions.Of(Id));
        for (; _more && _select.Integer(0) == Id; _more = _select.Read())
        {
            PackedMeasurements.Read(_select.Blob(5), Values);
            _leftOut.Find(_select.Integer(3), Values);
            MissingCount += (int)_select.Integer(4);
            _files.Add((Values.Count, _files.Count > 0 && _select.TextEquals(6, _files[^1].File) ? _files[^1].File : _select.Text(6)));
        }

        ExcludedCount = _leftOut.Positions.Count;
        if (!withExcluded)
        {
            Values.RemoveAt(_leftOut.Positions);
            MoveFileEnds();
        }

        return true;
    }

    /// <summary>Where each value came from, for people: for example "line 41 of week-1.csv".</summary>
    public IReadOnlyList<string> Places()
    {
        var places = new string[Values.Count];
        int file = 0;
        for (int i = 0; i < places.Length; i++)
        {
            while (i >= _files[file].End)
            {
                file++;
            }

            places[i] = FormattableString.Invariant($"line {Values.Lines[i]} of {_files[file].File}");
        }

        return places;
    }

    private void MoveFileEnds()
    {
        for (int i = 0; i < _files.Count && _leftOut.Positions.Count > 0; i++)
        {
            int before = _leftOut.Positions.Count(p => p < _files[i].End);
            _files[i] = (_files[i].End - before, _files[i].File);
        }
    }

    public void Dispose()
    {
        _select.Dispose();
        _sets.Dispose();
    }
}
