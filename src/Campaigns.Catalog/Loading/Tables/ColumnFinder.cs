using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>Finds our columns among the headers of a file.</summary>
internal sealed class ColumnFinder
{
    private readonly DelimitedFile _file;
    private readonly ColumnMap _map;
    private readonly HashSet<int> _used = [];
    private readonly List<string> _found = [];

    public ColumnFinder(DelimitedFile file, ColumnMap map)
    {
        _file = file;
        _map = map;
    }

    /// <summary>Our columns that were found, each as NAME=HEADER with the header as it stands in the file.</summary>
    public IReadOnlyList<string> Found => _found;

    /// <summary>The headers that no column of ours took, for a notice; one without a name is told by its number.</summary>
    public IReadOnlyList<string> Ignored =>
        [.. _file.Headers.Select((header, i) => (header, i)).Where(h => !_used.Contains(h.i)).Select(h => h.header.Length > 0 ? h.header : FormattableString.Invariant($"(column {h.i + 1}, without a name)"))];

    /// <summary>The place of one of our columns, from 0; -1 where the file has none, which is a problem for a required or a mapped one.</summary>
    /// <param name="name">Our name.</param>
    /// <param name="isRequired">Whether the file must have it.</param>
    public int Find(string name, bool isRequired = false)
    {
        string header = Composition.Compose(_map.HeaderOf(name));
        int[] places = [.. Enumerable.Range(0, _file.Headers.Count).Where(i => string.Equals(_file.Headers[i], header, StringComparison.OrdinalIgnoreCase))];
        foreach (int place in places)
        {
            _used.Add(place);
        }

        if (places.Length > 1)
        {
            _file.ReportAt(_file.HeaderLine, name, "duplicate-column", $"{places.Length} columns are headed {ShownText.Quote(header)}: rename all but one.");
            _file.Stop();
        }
        else if (places.Length == 0 && (isRequired || !string.Equals(header, name, StringComparison.Ordinal)))
        {
            string near = Nearest.Of(header, _file.Headers) is string nearest ? $"; {ShownText.Quote(nearest)} may be it" : "";
            string present = string.Join(", ", _file.Headers.Take(30).Select(ShownText.Quote));
            _file.ReportAt(
                _file.HeaderLine,
                name,
                "missing-column",
                $"no column is headed {ShownText.Quote(header)}; the columns are {present}{near}: rename it, or say --columns {name}=HEADER.");
            _file.Stop();
        }

        if (places.Length == 0)
        {
            return -1;
        }

        _found.Add($"{name}={_file.Headers[places[0]]}");
        return places[0];
    }
}
