using Spectre.Console;

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
        IAnsiConsole console = host.NewConsole(host.Out, host.OutIsTerminal);
        Sentences(host, table.Above);
        List<Cell[]> rows = Take(table.Rows, mostRows, out long left);
        if (rows.Count == 0)
        {
            host.Out.WriteLine(table.WhenEmpty);
        }
        else
        {
            console.Write(Build(table, rows, host.Width));
        }

        if (left > 0)
        {
            host.Out.WriteLine(FormattableString.Invariant($"... and {left} more rows; --top 0 shows all, --format csv writes all for a file."));
        }

        Sentences(host, table.Below);
    }

    /// <summary>Writes sentences, wrapped to the width.</summary>
    public static void Sentences(Host host, IEnumerable<string> sentences)
    {
        foreach (string sentence in sentences)
        {
            foreach (string line in Wrap(SafeText.Escape(sentence), host.Width))
            {
                host.Out.WriteLine(line);
            }
        }
    }

    /// <summary>Breaks a sentence at its spaces so that no line is wider than asked, where that can be.</summary>
    public static IEnumerable<string> Wrap(string sentence, int width)
    {
        while (sentence.Length > width)
        {
            int cut = sentence.LastIndexOf(' ', width);
            if (cut <= 0)
            {
                cut = sentence.IndexOf(' ', width);
                if (cut < 0)
                {
                    break;
                }
            }

            yield return sentence[..cut];
            sentence = sentence[(cut + 1)..];
        }

        yield return sentence;
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

    private static Table Build(RowTable table, List<Cell[]> rows, int width)
    {
        int[] shown = [.. Enumerable.Range(0, table.Columns.Count).Where(i => table.Columns[i].Heading is not null)];
        string[][] texts = [.. rows.Select(row => shown.Select(i => Text(row[i])).ToArray())];
        string[] headings = [.. shown.Select(i => table.Columns[i].Heading!)];
        int[] widths = Fit(headings, texts, [.. shown.Select(i => table.Columns[i].IsNumeric)], width);
        var view = new Table().Border(TableBorder.None);
        for (int c = 0; c < shown.Length; c++)
        {
            var column = new TableColumn(new Text(Cut(headings[c], widths[c]), new Style(decoration: Decoration.Bold)) { Overflow = Overflow.Crop }).NoWrap().Width(widths[c]);
            column.Padding = new Padding(0, 0, 2, 0);
            view.AddColumn(table.Columns[shown[c]].IsNumeric ? column.RightAligned() : column);
        }

        foreach (string[] row in texts)
        {
            view.AddRow(row.Select((text, c) => (Spectre.Console.Rendering.IRenderable)new Text(Cut(text, widths[c])) { Overflow = Overflow.Crop }));
        }

        return view;
    }

    /// <summary>Widths that fit: the widest text columns give way first, down to eight characters; numbers are never cut.</summary>
    private static int[] Fit(string[] headings, string[][] rows, bool[] isNumeric, int width)
    {
        int[] widths = [.. headings.Select((h, c) => Math.Max(CellWidth(h), rows.Max(r => CellWidth(r[c]))))];
        const int least = 8;
        while (widths.Sum() + (2 * widths.Length) > width)
        {
            int widest = -1;
            for (int c = 0; c < widths.Length; c++)
            {
                if (!isNumeric[c] && widths[c] > least && (widest < 0 || widths[c] > widths[widest]))
                {
                    widest = c;
                }
            }

            if (widest < 0)
            {
                break;
            }

            widths[widest]--;
        }

        return widths;
    }

    private static string Cut(string text, int width)
    {
        if (CellWidth(text) <= width)
        {
            return text;
        }

        int length = text.Length;
        while (length > 0 && CellWidth(text[..length]) > width - 1)
        {
            length -= length > 1 && char.IsLowSurrogate(text[length - 1]) ? 2 : 1;
        }

        return text[..length] + "…";
    }

    private static int CellWidth(string text) => System.Text.Ascii.IsValid(text) ? text.Length : new Segment(text).CellCount();

    private sealed class Segment(string text)
    {
        private readonly Spectre.Console.Rendering.Segment _segment = new(text);

        public int CellCount() => _segment.CellCount();
    }

    private static string Text(in Cell cell) => cell.Kind switch
    {
        CellKind.Number => cell.AsText.Length > 0 ? cell.AsText : NumberText.Screen(cell.AsNumber, 5),
        CellKind.P => NumberText.P(cell.AsP),
        CellKind.Truth => cell.AsTruth ? "yes" : "no",
        CellKind.Text => SafeText.Escape(cell.AsText),
        _ => CsvRows.Text(cell),
    };
}
