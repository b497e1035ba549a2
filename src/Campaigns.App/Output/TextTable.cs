using System.Text;
using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Output;

/// <summary>Writes rows for people: aligned, fitted to the width, cut with an ellipsis, and honest about what was left out.</summary>
internal static class TextTable
{
    /// <summary>Rows shown where the user did not ask for a number.</summary>
    public const int UsualRows = 200;

    /// <summary>Writes a table.</summary>
    /// <param name="table">The rows.</param>
    /// <param name="host">Where to, and how wide.</param>
    /// <param name="mostRows">Rows to show; 0 for all.</param>
    public static void Write(RowTable table, Host host, int mostRows)
    {
        Sentences(host, table.Above);
        List<Cell[]> rows = Take(table.Rows, mostRows, out long left);
        if (rows.Count == 0)
        {
            Sentences(host, [table.WhenEmpty]);
        }
        else
        {
            WriteRows(host, table.Columns, [.. rows.Select(row => row.Select(cell => Text(cell)).ToArray())]);
        }

        if (left > 0)
        {
            Sentences(host, [FormattableString.Invariant($"... and {left} more rows; --top 0 shows all, --format csv writes all for a file.")]);
        }

        Sentences(host, table.Below);
    }

    /// <summary>Writes sentences, wrapped to the width.</summary>
    public static void Sentences(Host host, IEnumerable<string> sentences)
    {
        foreach (string line in sentences.SelectMany(sentence => CellText.Wrap(sentence, host.Width)))
        {
            host.Out.WriteLine(line);
        }
    }

    private static List<Cell[]> Take(IEnumerable<Cell[]> rows, int most, out long left)
    {
        var taken = new List<Cell[]>();
        left = 0;
        foreach (Cell[] row in rows)
        {
            if (most == 0 || taken.Count < most)
            {
                taken.Add(row);
            }
            else
            {
                left++;
            }
        }

        return taken;
    }

    private static void WriteRows(Host host, IReadOnlyList<Column> columns, string[][] rows)
    {
        ColumnLayout layout = ColumnLayout.Of(columns, rows, host.Width);
        string head = Line(columns, [.. columns.Select(c => c.Heading ?? "")], layout);
        host.Out.WriteLine(host.OutIsStyled ? $"\u001b[1m{head}\u001b[0m" : head);
        foreach (string[] row in rows.SelectMany(row => Lines(columns, row, layout)))
        {
            host.Out.WriteLine(Line(columns, row, layout));
        }

        if (layout.LeftOut.Count > 0)
        {
            Sentences(host, [$"No room for: {string.Join(", ", layout.LeftOut)}; a wider window shows more, --format csv writes all."]);
        }
    }

    /// <summary>A row as the lines that it takes: one, or more where a text goes on below.</summary>
    private static IEnumerable<string[]> Lines(IReadOnlyList<Column> columns, string[] row, ColumnLayout layout)
    {
        var wrapped = new Dictionary<int, IReadOnlyList<string>>();
        for (int i = 0; i < layout.Shown.Count; i++)
        {
            int c = layout.Shown[i];
            if (columns[c].Wraps && CellText.Width(row[c]) > layout.Widths[i])
            {
                wrapped.Add(c, CellText.Wrap(row[c], layout.Widths[i]));
            }
        }

        int count = wrapped.Count == 0 ? 1 : wrapped.Values.Max(w => w.Count);
        return Enumerable.Range(0, count).Select(line => count == 1 ? row
            : [.. row.Select((text, c) => wrapped.TryGetValue(c, out IReadOnlyList<string>? lines) ? lines.ElementAtOrDefault(line) ?? "" : line == 0 ? text : "")]);
    }

    private static string Line(IReadOnlyList<Column> columns, string[] texts, ColumnLayout layout)
    {
        var line = new StringBuilder();
        for (int i = 0; i < layout.Shown.Count; i++)
        {
            int c = layout.Shown[i];
            string text = CellText.Fit(texts[c], layout.Widths[i], "…");
            int blanks = layout.Widths[i] - CellText.Width(text);
            line.Append(' ', (i > 0 ? ColumnLayout.Gap : 0) + (columns[c].IsNumeric ? blanks : 0)).Append(text).Append(' ', columns[c].IsNumeric ? 0 : blanks);
        }

        return line.ToString().TrimEnd(' ');
    }

    /// <summary>A cell as people see it.</summary>
    public static string Text(in Cell cell) => cell.Kind switch
    {
        CellKind.Number => cell.AsText.Length > 0 ? cell.AsText : NumberText.Screen(cell.AsNumber, 5),
        CellKind.P => NumberText.P(cell.AsP),
        CellKind.Truth => cell.AsTruth ? "yes" : "no",
        CellKind.Text => SafeText.Escape(cell.AsText),
        _ => CsvRows.Text(cell),
    };
}
