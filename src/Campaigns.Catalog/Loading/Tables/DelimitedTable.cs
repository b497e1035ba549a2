using System.Text;
using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>A whole delimited file in memory, its cells as they are written, for passing them on beside new columns.</summary>
/// <remarks>The text is kept as UTF-8 in one piece with the ends of its cells, so it takes about the size of the file and four bytes a cell.</remarks>
public sealed class DelimitedTable
{
    /// <summary>The most text that is taken, in bytes.</summary>
    public const int LargestText = 1 << 28;

    private readonly List<int> _ends = [0];
    private readonly List<long> _lines = [];
    private byte[] _text = new byte[1 << 12];

    private DelimitedTable(DelimitedFile file)
    {
        Headers = file.Headers;
        Problems = file.Problems;
        Name = file.Name;
    }

    /// <summary>The file's name as shown.</summary>
    public string Name { get; }

    /// <summary>The headers, trimmed, in the order of the file.</summary>
    public IReadOnlyList<string> Headers { get; }

    /// <summary>What is wrong with the file; rows with problems are left out.</summary>
    public ImportProblems Problems { get; }

    /// <summary>How many rows there are.</summary>
    public int RowCount => _lines.Count;

    /// <summary>Reads a file.</summary>
    /// <param name="path">The file.</param>
    /// <param name="options">How to read it; its columns play no part.</param>
    /// <exception cref="LoadingException">The file is not there or cannot be read.</exception>
    public static DelimitedTable Read(string path, DelimitedFileOptions options)
    {
        using DelimitedFile file = DelimitedFile.Open(path, options, ["p"]);
        DelimitedTable table = new(file);
        while (file.Read())
        {
            if (!table.TryAdd(file))
            {
                file.Report(-1, "table-too-large", "the file has more than 256 MiB of text: split it.");
                file.Stop();
            }
        }

        return table;
    }

    /// <summary>The physical line of a row, from 1.</summary>
    /// <param name="row">The row, from 0.</param>
    public long Line(int row) => _lines[row];

    /// <summary>A cell as text, not trimmed.</summary>
    /// <param name="row">The row, from 0.</param>
    /// <param name="column">The column, from 0.</param>
    public string Cell(int row, int column) => Encoding.UTF8.GetString(CellUtf8(row, column));

    /// <summary>A cell as UTF-8, not trimmed.</summary>
    /// <param name="row">The row, from 0.</param>
    /// <param name="column">The column, from 0.</param>
    public ReadOnlySpan<byte> CellUtf8(int row, int column)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(column);
        ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual(column, Headers.Count);
        int cell = checked((row * Headers.Count) + column);
        return _text.AsSpan(_ends[cell].._ends[cell + 1]);
    }

    /// <summary>The place of a column: the one header equal to a name, else the one equal but for case.</summary>
    /// <param name="name">The header looked for.</param>
    /// <exception cref="LoadingException">There is none, or more than one.</exception>
    public int FindColumn(string name)
    {
        ArgumentNullException.ThrowIfNull(name);
        foreach (StringComparison comparison in (ReadOnlySpan<StringComparison>)[StringComparison.Ordinal, StringComparison.OrdinalIgnoreCase])
        {
            int[] places = [.. Enumerable.Range(0, Headers.Count).Where(i => string.Equals(Headers[i], name.Trim(), comparison))];
            if (places.Length == 1)
            {
                return places[0];
            }

            if (places.Length > 1)
            {
                throw new LoadingException($"{Name} has {places.Length} columns headed {ShownText.Quote(name)}: rename all but one.");
            }
        }

        string near = Nearest.Of(name, Headers) is string nearest ? $" ({ShownText.Quote(nearest)} may be it)" : "";
        string present = string.Join(", ", Headers.Take(30).Select(ShownText.Quote));
        throw new LoadingException($"{Name} has no column headed {ShownText.Quote(name)}{near}: its columns are {present}.");
    }

    private bool TryAdd(DelimitedFile file)
    {
        for (int i = 0; i < Headers.Count; i++)
        {
            ReadOnlySpan<byte> cell = file.Field(i);
            int start = _ends[^1];
            if (cell.Length > LargestText - start)
            {
                _ends.RemoveRange(_ends.Count - i, i);
                return false;
            }

            if (start + cell.Length > _text.Length)
            {
                Array.Resize(ref _text, Math.Max(start + cell.Length, Math.Min(LargestText, _text.Length * 2)));
            }

            cell.CopyTo(_text.AsSpan(start));
            _ends.Add(start + cell.Length);
        }

        _lines.Add(file.Line);
        return true;
    }
}
