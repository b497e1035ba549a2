using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the list of experiments: a row of column names and the rows from a given one on.</summary>
public static class ListPainter
{
    /// <summary>Rows above the first experiment.</summary>
    public const int HeaderRows = 1;

    /// <summary>Paints the list.</summary>
    /// <param name="model">What is shown.</param>
    /// <param name="layout">Where the columns stand.</param>
    /// <param name="top">The first row shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows, the names included.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(DashboardModel model, ListLayout layout, int top, int width, int height, GlyphSet glyphs)
    {
        TextCanvas canvas = new(width, height);
        IReadOnlyList<(ExperimentColumn Column, int X, int Width)> columns = layout.Place(width);
        foreach ((ExperimentColumn column, int x, int w) in columns)
        {
            bool isSorted = column == model.SortColumn;
            string mark = model.IsFalling ? glyphs.Falling : glyphs.Rising;
            Cell(canvas, column, x, w, 0, column.Name[..Math.Min(column.Name.Length, w)], Ink.Heading);
            if (isSorted)
            {
                // On the side to which the name is not aligned: where it fills its column, in the gap.
                canvas.Put(column.IsRightAligned ? x + w - 1 - column.Name.Length : x + column.Name.Length, 0, mark, Ink.Heading);
            }
        }

        if (model.RowCount == 0)
        {
            canvas.Write(1, HeaderRows + 1, CellText.Fit(EmptyText(model), width - 2, glyphs.Cut), Ink.Open);
            return canvas;
        }

        for (int y = HeaderRows; y < height && top + y - HeaderRows < model.RowCount; y++)
        {
            int row = top + y - HeaderRows;
            Row(canvas, columns, layout, model.RowAt(row), y, glyphs);
            if (model.Marks.Has(model.PositionAt(row)))
            {
                // In the gap behind the code.
                canvas.Put(columns[0].X + columns[0].Width, y, glyphs.Marked, Ink.Heading);
            }

            if (row == model.SelectedRow)
            {
                canvas.InkRow(y, Ink.Selected);
            }
        }

        return canvas;
    }

    /// <summary>The column whose name or cells stand at a place; null beside all.</summary>
    /// <param name="layout">Where the columns stand.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="at">Cell from 0.</param>
    public static ExperimentColumn? ColumnAt(ListLayout layout, int width, int at) =>
        layout.Place(width).FirstOrDefault(c => at >= c.X && at < c.X + c.Width).Column;

    /// <summary>Which row is selected of how many, and how they are sorted.</summary>
    /// <param name="model">What is shown.</param>
    public static string Caption(DashboardModel model)
    {
        string all = Count(model.Standing.Experiments.Count);
        string rows = model.RowCount == model.Standing.Experiments.Count ? $"row {Count(model.SelectedRow + 1)} of {all}"
            : model.RowCount == 0 ? $"none of {all} shown"
            : $"row {Count(model.SelectedRow + 1)} of {Count(model.RowCount)} shown, {all} in all";
        string order = model.SortColumn is { } column ? $"by {column.Name}, {(model.IsFalling ? "falling" : "rising")}"
            : model.IsFalling ? "plan's order, last first" : "plan's order";
        return rows + "; " + order;
    }

    /// <summary>Whether an experiment survives, as a sign and a word.</summary>
    /// <param name="survives">Yes, no, or null where there is no result.</param>
    /// <param name="glyphs">The signs.</param>
    public static string SurvivalText(bool? survives, GlyphSet glyphs) => survives switch
    {
        true => glyphs.Survivor + " yes",
        false => glyphs.Other + " no",
        null => glyphs.Open + " " + glyphs.None,
    };

    private static void Row(TextCanvas canvas, IReadOnlyList<(ExperimentColumn Column, int X, int Width)> columns, ListLayout layout, ExperimentResult e, int y, GlyphSet glyphs)
    {
        foreach ((ExperimentColumn column, int x, int w) in columns)
        {
            bool isSurvival = column.Name == "survives";
            string text = isSurvival ? SurvivalText(e.Survives, glyphs)
                : column.ShortTextOf is { } shortly && !layout.IsStatusInFull(w) ? shortly(e)
                : column.TextOf(e) ?? glyphs.None;
            Ink ink = column.Name == "status" && e.Amendments.Count > 0 ? Ink.Warning
                : isSurvival && e.Survives == true ? Ink.Survivor
                : e.Survives is null && column.Name is not ("experiment" or "title") ? Ink.Open
                : Ink.Text;
            Cell(canvas, column, x, w, y, CellText.Fit(text, w, glyphs.Cut), ink);
        }
    }

    private static void Cell(TextCanvas canvas, ExperimentColumn column, int x, int width, int y, string text, Ink ink)
    {
        if (column.IsRightAligned)
        {
            canvas.WriteRight(x + width - 1, y, text, ink);
        }
        else
        {
            canvas.Write(x, y, text, ink);
        }
    }

    private static string EmptyText(DashboardModel model) =>
        model.Standing.Experiments.Count == 0 ? "No experiment is planned in this campaign yet." : "No experiment fits the filter. Esc takes it off.";

    private static string Count(int n) => n.ToString(CultureInfo.InvariantCulture);
}
