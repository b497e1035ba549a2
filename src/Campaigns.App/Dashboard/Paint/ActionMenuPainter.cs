using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the list of everything that can be done: key, name, and below it what it does.</summary>
internal static class ActionMenuPainter
{
    private const int Indent = 5;

    /// <summary>Paints the list.</summary>
    /// <param name="actions">The actions.</param>
    /// <param name="selected">The one that Enter begins, from 0.</param>
    /// <param name="width">Cells across.</param>
    public static TextCanvas Paint(IReadOnlyList<DashboardAction> actions, int selected, int width)
    {
        List<(int Action, IReadOnlyList<string> Lines)> entries = [.. actions.Select((a, i) => (i, LinesOf(a, width)))];
        TextCanvas canvas = new(width, entries.Sum(e => e.Lines.Count + 1));
        int row = 0;
        foreach ((int i, IReadOnlyList<string> lines) in entries)
        {
            if (i == selected)
            {
                canvas.InkRow(row, Ink.Selected);
            }

            canvas.Write(0, row, $"{(i == selected ? ">" : " ")} {actions[i].Key}  {actions[i].Name}", i == selected ? Ink.Selected : Ink.Heading);
            row++;
            foreach (string line in lines)
            {
                canvas.Write(Indent, row++, line);
            }
        }

        return canvas;
    }

    /// <summary>The action that stands in a row; null below all.</summary>
    /// <param name="actions">The actions.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="row">Row from 0.</param>
    public static int? ActionAt(IReadOnlyList<DashboardAction> actions, int width, int row)
    {
        for (int i = 0; i < actions.Count; i++)
        {
            row -= LinesOf(actions[i], width).Count + 1;
            if (row < 0)
            {
                return i;
            }
        }

        return null;
    }

    /// <summary>The rows of an action, from 0.</summary>
    /// <param name="actions">The actions.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="action">Its place, from 0.</param>
    public static (int First, int Last) RowsOf(IReadOnlyList<DashboardAction> actions, int width, int action)
    {
        int first = actions.Take(action).Sum(a => LinesOf(a, width).Count + 1);
        return (first, first + LinesOf(actions[action], width).Count);
    }

    private static IReadOnlyList<string> LinesOf(DashboardAction action, int width) => CellText.Wrap(action.Does, Math.Max(1, width - Indent));
}
