using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>A row on which levels stand from the lowest to the highest: the sealed one always, and beside it the one that is looked at.</summary>
public static class LevelRuler
{
    private const int Start = 7;
    private const int ShortestAxis = 16;
    private const int LongestAxis = 40;

    /// <summary>Paints the row.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(RankingModel model, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, 1);
        double level = model.Standing.Campaign.Level.Value;
        canvas.Write(1, 0, "level", Ink.Axis);
        int cells = CellsOf(width);
        canvas.Repeat(Start, 0, cells, glyphs.Across, Ink.Axis);
        canvas.Put(Start + PlaceOf(model.Ladder, level, cells), 0, glyphs.Upright, Ink.Boundary);
        string text = $"{glyphs.Upright} sealed {NumberText.RoundTrip(level)}";
        if (model.Exploration is { } explored)
        {
            canvas.Put(Start + PlaceOf(model.Ladder, explored.Level.Value, cells), 0, glyphs.Mean, Ink.Mean);
            text += $"  {glyphs.Mean} explored {NumberText.RoundTrip(explored.Level.Value)}";
        }
        else if (model.WhyNoExploration is null)
        {
            text += "  (+ - another)";
        }

        canvas.Write(Start + cells + 1, 0, CellText.Fit(text, width - Start - cells - 1, glyphs.Cut), model.Exploration is null ? Ink.Quiet : Ink.Heading);
        return canvas;
    }

    /// <summary>The level at a column, the sealed one at its own; null beside the axis.</summary>
    /// <param name="model">As it was painted.</param>
    /// <param name="width">As it was painted.</param>
    /// <param name="x">Column from 0.</param>
    public static double? LevelAt(RankingModel model, int width, int x)
    {
        ArgumentNullException.ThrowIfNull(model);
        LevelLadder ladder = model.Ladder;
        double level = model.Standing.Campaign.Level.Value;
        int cells = CellsOf(width), place = x - Start;
        return place < 0 || place >= cells ? null
            : place == PlaceOf(ladder, level, cells) ? level
            : ladder.Nearest(ladder.Lowest * Math.Pow(ladder.Highest / ladder.Lowest, (double)place / (cells - 1)));
    }

    private static int CellsOf(int width) => Math.Clamp(width / 2 - Start, ShortestAxis, LongestAxis);

    private static int PlaceOf(LevelLadder ladder, double level, int cells) =>
        (int)Math.Round(Math.Log(level / ladder.Lowest) / Math.Log(ladder.Highest / ladder.Lowest) * (cells - 1));
}
