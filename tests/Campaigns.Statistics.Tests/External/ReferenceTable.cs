using System.Globalization;

namespace Campaigns.Statistics.Tests.External;

/// <summary>A table of reference values under tests/reference: a header line, then comma-separated rows; lines that begin with # are comments.</summary>
internal sealed class ReferenceTable
{
    private readonly string[] _columns;

    private ReferenceTable(string[] columns, IReadOnlyList<ReferenceRow> rows)
    {
        _columns = columns;
        Rows = rows;
    }

    public IReadOnlyList<ReferenceRow> Rows { get; }

    /// <summary>Reads tests/reference/<paramref name="path"/>, found from the test's own folder upwards.</summary>
    public static ReferenceTable Read(string path) => Of(File.ReadLines(Path.Combine(Folder(), path)));

    /// <summary>A table from its lines, such as an outside program has just printed.</summary>
    public static ReferenceTable Of(IEnumerable<string> text)
    {
        string[] lines = [.. text.Where(l => l.Length > 0 && l[0] != '#')];
        string[] columns = lines[0].Split(',');
        var rows = new List<ReferenceRow>();
        var table = new ReferenceTable(columns, rows);
        rows.AddRange(lines.Skip(1).Select(l => new ReferenceRow(table, l.Split(','))));
        Assert.NotEmpty(rows);
        return table;
    }

    public static string Folder()
    {
        for (DirectoryInfo? at = new(AppContext.BaseDirectory); at is not null; at = at.Parent)
        {
            string candidate = Path.Combine(at.FullName, "tests", "reference");
            if (Directory.Exists(candidate))
            {
                return candidate;
            }
        }

        throw new DirectoryNotFoundException("tests/reference was not found above the test's folder.");
    }

    internal int IndexOf(string column)
    {
        int at = Array.IndexOf(_columns, column);
        return at >= 0 ? at : throw new ArgumentException($"No column '{column}'.", nameof(column));
    }
}

/// <summary>One row of a <see cref="ReferenceTable"/>.</summary>
internal sealed class ReferenceRow(ReferenceTable table, string[] cells)
{
    public string Text(string column) => cells[table.IndexOf(column)];

    public bool Has(string column) => Text(column).Length > 0;

    public int Integer(string column) => int.Parse(Text(column), CultureInfo.InvariantCulture);

    public double Number(string column) => double.Parse(Text(column), CultureInfo.InvariantCulture);

    /// <summary>The natural logarithm of a positive number that may lie below the range of doubles.</summary>
    public double LogarithmOf(string column)
    {
        string[] parts = Text(column).Split('e');
        double exponent = parts.Length == 1 ? 0 : double.Parse(parts[1], CultureInfo.InvariantCulture);
        return Math.Log(double.Parse(parts[0], CultureInfo.InvariantCulture)) + (exponent * Math.Log(10));
    }
}
