using Campaigns.App.Output;
using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Html;

/// <summary>Writes the tables of a page: every number carries the shortest text that reads back as the same double, for sorting and for whoever copies it.</summary>
/// <param name="writer">Where to.</param>
internal sealed class HtmlTables(TextWriter writer)
{
    /// <summary>Rows that fit a sheet of paper together, and are then not parted.</summary>
    private const int SmallTable = 15;

    /// <summary>Lines that fit it together, where texts go on below; and letters of a text that fit a line of its column on paper.</summary>
    private const int SmallLines = 24;
    private const int LettersOfColumn = 18;

    /// <summary>From so many letters on, a text gets room to run in, rather than standing word below word.</summary>
    private const int WideFrom = 22;

    /// <summary>Up to so many letters, the words of a text stay together: a unit such as "mPa s" is one thing.</summary>
    private const int BriefTo = 8;

    private int _count;

    /// <summary>Writes one table, with its sentences above and below.</summary>
    public void Write(TableBlock table)
    {
        Sentences(table.Above, "above");
        if (table.Rows.Count == 0)
        {
            writer.Write($"<p class=\"empty\"><strong>{HtmlText.Escape(table.Caption)}.</strong> {HtmlText.Escape(table.WhenEmpty)}</p>\n");
        }
        else
        {
            string id = $"table-{HtmlText.Whole(++_count)}";
            writer.Write($"<div class=\"box\"><table{ClassOf(table)} aria-labelledby=\"{id}\">\n<caption id=\"{id}\"><span>{HtmlText.Escape(table.Caption)}</span></caption>\n");
            Heads(table);
            writer.Write("<tbody>\n");
            foreach (Cell[] row in table.Rows)
            {
                Row(table, row);
            }

            writer.Write("</tbody>\n</table></div>\n");
        }

        Sentences(table.Below, "note");
    }

    /// <summary>The attribute that holds the exact value of a number; empty for what is no number.</summary>
    public static string ValueOf(in Cell cell) => cell.Kind is CellKind.Number or CellKind.P or CellKind.Whole ? $" data-value=\"{CsvRows.Text(cell)}\"" : "";

    private static string ClassOf(TableBlock table)
    {
        string[] classes = [.. table.MaySort ? ["sorts"] : (string[])[], .. IsSmall(table) ? ["small"] : (string[])[], .. table.AsCards ? ["cards"] : (string[])[]];
        return classes.Length == 0 ? "" : $" class=\"{string.Join(' ', classes)}\"";
    }

    private static bool IsSmall(TableBlock table) => table.Rows.Count <= SmallTable
        && table.Rows.Sum(row => row.Max(cell => cell.Kind == CellKind.Text ? 1 + (cell.AsText.Length / LettersOfColumn) : 1)) <= SmallLines;

    private void Heads(TableBlock table)
    {
        writer.Write("<thead><tr>");
        foreach (Column column in table.Columns)
        {
            writer.Write($"<th scope=\"col\"{(column.IsNumeric ? " class=\"n\"" : "")}>{HtmlText.Escape(column.Heading ?? "")}</th>");
        }

        writer.Write("</tr></thead>\n");
    }

    private void Row(TableBlock table, Cell[] row)
    {
        bool isApart = table.SetsApart is { } place && row[place].Kind == CellKind.Truth && row[place].AsTruth;
        writer.Write(isApart ? "<tr class=\"apart\">" : "<tr>");
        for (int c = 0; c < row.Length; c++)
        {
            string plain = TextTable.Text(row[c]);
            string text = HtmlText.Breakable(plain);
            string kind = table.Columns[c].IsNumeric ? " class=\"n\"" : HtmlText.HasLongWord(plain) ? " class=\"long\"" : plain.Length >= WideFrom ? " class=\"wide\""
                : plain.Length <= BriefTo && plain.Contains(' ') ? " class=\"brief\"" : "";
            if (c > 0)
            {
                // On a card no heading stands above a number, so that it carries its own.
                string label = table.AsCards && table.Columns[c].IsNumeric ? $" data-label=\"{HtmlText.Escape(table.Columns[c].Heading ?? "")}\"" : "";
                writer.Write($"<td{kind}{label}{ValueOf(row[c])}>{text}</td>");
                continue;
            }

            string inside = row[c].Kind == CellKind.Text && table.Links.TryGetValue(row[c].AsText, out string? anchor) ? $"<a href=\"#{anchor}\">{text}</a>" : text;
            writer.Write($"<th scope=\"row\"{kind}{ValueOf(row[c])}>{inside}</th>");
        }

        writer.Write("</tr>\n");
    }

    private void Sentences(IReadOnlyList<string> sentences, string kind)
    {
        foreach (string sentence in sentences)
        {
            writer.Write($"<p class=\"{kind}\">{HtmlText.Escape(sentence)}</p>\n");
        }
    }
}
