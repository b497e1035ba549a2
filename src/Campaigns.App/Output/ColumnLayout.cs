using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Output;

/// <summary>Which columns of a table people see, and how wide: what does not fit is cut where it is text, and left out where it is a number, which is never cut.</summary>
/// <param name="Shown">Places of the columns that are shown, in order.</param>
/// <param name="Widths">Their widths in cells.</param>
/// <param name="LeftOut">Headings of the columns that there is no room for.</param>
internal sealed record ColumnLayout(IReadOnlyList<int> Shown, IReadOnlyList<int> Widths, IReadOnlyList<string> LeftOut)
{
    /// <summary>Blanks between two columns.</summary>
    public const int Gap = 2;

    /// <summary>Text columns give way down to this, before columns are left out.</summary>
    private const int LeastText = 8;

    /// <summary>The first column, which names the row, and others that are cut last keep this much where they can.</summary>
    private const int LeastKept = 24;

    /// <summary>The layout for a width.</summary>
    /// <param name="columns">All columns; those without a heading are for scripts alone.</param>
    /// <param name="rows">The texts of every row, a text a column.</param>
    /// <param name="width">Cells of a line.</param>
    public static ColumnLayout Of(IReadOnlyList<Column> columns, IReadOnlyList<string[]> rows, int width)
    {
        List<int> shown = [.. Enumerable.Range(0, columns.Count).Where(c => columns[c].Heading is not null)];
        int[] wanted = new int[columns.Count];
        foreach (int c in shown)
        {
            wanted[c] = Math.Max(CellText.Width(columns[c].Heading!), rows.Max(r => CellText.Width(r[c])));
        }

        bool keepsText = true;
        int Least(int c) => columns[c].IsNumeric ? wanted[c] : Math.Min(wanted[c], c == shown[0] || (columns[c].CutLast && keepsText) ? LeastKept : LeastText);
        int Room() => width - (Gap * (shown.Count - 1));
        List<int> leftOut = [];
        while (shown.Count > 1 && shown.Sum(Least) > Room())
        {
            // Of all but the first the least important goes, the last of several.
            int goes = shown.Skip(1).OrderByDescending(c => columns[c].GivesWay).ThenByDescending(c => c).First();
            if (columns[goes].GivesWay == 0 && keepsText)
            {
                // No column of weight goes for the sake of another's text but the first's.
                keepsText = false;
                continue;
            }

            int[] together = [.. shown.Where(c => c == goes || columns[c].NotWithout == columns[goes].Name)];
            shown.RemoveAll(together.Contains);
            leftOut.AddRange(together);
        }

        while (shown.Sum(c => wanted[c]) > Room() && shown.Where(c => wanted[c] > Least(c)).OrderByDescending(c => wanted[c]).ThenBy(c => c).FirstOrDefault(-1) is >= 0 and int widest)
        {
            wanted[widest]--;
        }

        return new ColumnLayout(shown, [.. shown.Select(c => wanted[c])], [.. leftOut.Order().Select(c => columns[c].Heading!)]);
    }
}
