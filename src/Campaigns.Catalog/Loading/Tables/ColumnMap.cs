using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>Which header of a file stands for which of our columns.</summary>
public sealed class ColumnMap
{
    private readonly Dictionary<string, string> _headers;

    private ColumnMap(Dictionary<string, string> headers) => _headers = headers;

    /// <summary>No other names.</summary>
    public static ColumnMap Empty { get; } = new([]);

    /// <summary>Whether no column has another name.</summary>
    public bool IsEmpty => _headers.Count == 0;

    /// <summary>Reads a map such as <c>value=Reading,group=Code</c>.</summary>
    /// <param name="text">Pairs of our name and the file's header, separated by commas; blanks around names are ignored.</param>
    /// <param name="ours">The names that we know.</param>
    /// <exception cref="LoadingException">A pair is not complete, names a column that we do not know, or repeats a column or a header.</exception>
    public static ColumnMap Parse(string text, IReadOnlyCollection<string> ours)
    {
        ArgumentNullException.ThrowIfNull(text);
        ArgumentNullException.ThrowIfNull(ours);
        Dictionary<string, string> headers = new(StringComparer.OrdinalIgnoreCase);
        HashSet<string> used = new(StringComparer.OrdinalIgnoreCase);
        foreach (string pair in text.Split(','))
        {
            int equals = pair.IndexOf('=', StringComparison.Ordinal);
            string name = equals < 0 ? "" : pair[..equals].Trim();
            string header = equals < 0 ? "" : pair[(equals + 1)..].Trim();
            if (name.Length == 0 || header.Length == 0)
            {
                throw new LoadingException($"{ShownText.Quote(pair.Trim())} is no pair of names: write it like value=Reading,group=Code.");
            }

            if (!ours.Contains(name, StringComparer.OrdinalIgnoreCase))
            {
                string near = Nearest.Of(name, ours) is string nearest ? $" (did you mean {nearest}?)" : "";
                throw new LoadingException($"{ShownText.Quote(name)} is none of the columns {string.Join(", ", ours)}{near}: our name comes first, as in value=Reading.");
            }

            if (!headers.TryAdd(name, header) || !used.Add(header))
            {
                throw new LoadingException($"{ShownText.Quote(pair.Trim())} repeats a name: give each column one header of its own.");
            }
        }

        return new ColumnMap(headers);
    }

    /// <summary>The header that stands for one of our columns: the mapped one, else our own name.</summary>
    /// <param name="name">Our name.</param>
    public string HeaderOf(string name) => _headers.GetValueOrDefault(name, name);
}
