using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The standing decisions of an online campaign with the level that each experiment was given, in the order of the stream.</summary>
public static class DecisionsPainter
{
    /// <summary>Rows above the first decision.</summary>
    public const int HeaderRows = 2;

    private const int PlaceEnd = 5;
    private const int CodeColumn = 7;
    private const int LevelWidth = 10;
    private const int PWidth = 11;
    private const int VerdictWidth = 14;
    private const int OverlapsWidth = 22;
    private const int ShortestCode = 6;
    private const int LongestCode = 24;

    /// <summary>Paints the decisions around the selected one.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(RiskModel model, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        IReadOnlyList<ExperimentResult> decisions = model.Decisions;
        canvas.Write(1, 0, CellText.Fit(Title(model), width - 1, glyphs.Cut), Ink.Heading);
        if (decisions.Count == 0)
        {
            canvas.Write(1, 1, CellText.Fit(model.IsOnline ? "No experiment was given a level yet." : "This campaign is corrected as a whole; it has no standing decisions.", width - 1, glyphs.Cut), Ink.Open);
            return canvas;
        }

        int verdictWidth = decisions.Any(e => e.Entry!.Overlaps) ? OverlapsWidth : VerdictWidth;
        int code = Math.Clamp(width - CodeColumn - LevelWidth - PWidth - verdictWidth - 1, ShortestCode, LongestCode);
        int levelEnd = CodeColumn + code + LevelWidth - 1, pEnd = levelEnd + PWidth;
        canvas.WriteRight(PlaceEnd, 1, "place", Ink.Heading);
        canvas.Write(CodeColumn, 1, CellText.Fit("experiment", code, glyphs.Cut), Ink.Heading);
        canvas.WriteRight(levelEnd, 1, "given", Ink.Heading);
        canvas.WriteRight(pEnd, 1, "p", Ink.Heading);
        canvas.Write(pEnd + 3, 1, "decision", Ink.Heading);
        int first = FirstOf(model, height);
        for (int y = HeaderRows; y < height && first + y - HeaderRows < decisions.Count; y++)
        {
            int place = first + y - HeaderRows;
            ExperimentResult e = decisions[place];
            StreamEntry entry = e.Entry!;
            canvas.WriteRight(PlaceEnd, y, PlaceText(entry, model.Standing.Campaign.Streams.Count));
            canvas.Write(CodeColumn, y, CellText.Fit(e.Plan.Code, code, glyphs.Cut));
            canvas.WriteRight(levelEnd, y, NumberText.Screen(entry.Level, 4));
            canvas.WriteRight(pEnd, y, entry.P is { } p ? NumberText.P(p) : glyphs.None);
            (string verdict, Ink ink) = Verdict(e, entry, glyphs);
            canvas.Write(pEnd + 3, y, CellText.Fit(verdict, width - pEnd - 3, glyphs.Cut), ink);
            if (place == model.Decision)
            {
                canvas.InkRow(y, Ink.Selected);
            }
        }

        return canvas;
    }

    /// <summary>The decision in a row; null beside all.</summary>
    /// <param name="model">As it was painted.</param>
    /// <param name="height">As it was painted.</param>
    /// <param name="y">Row from 0.</param>
    public static int? PlaceAt(RiskModel model, int height, int y)
    {
        ArgumentNullException.ThrowIfNull(model);
        int place = FirstOf(model, height) + y - HeaderRows;
        return y >= HeaderRows && place < model.Decisions.Count ? place : null;
    }

    // The selected one in the middle: the list has no other state.
    private static int FirstOf(RiskModel model, int height)
    {
        int room = Math.Max(1, height - HeaderRows);
        return Math.Clamp(model.Decision - (room / 2), 0, Math.Max(0, model.Decisions.Count - room));
    }

    private static string Title(RiskModel model)
    {
        int decided = model.Decisions.Count(e => e.Entry!.DecidedAt is not null);
        return string.Create(CultureInfo.InvariantCulture, $"standing decisions: {model.Decisions.Count} given a level, {decided} decided, {model.Standing.SurvivorCount} survive");
    }

    private static string PlaceText(StreamEntry entry, int streams) =>
        streams > 1 ? string.Create(CultureInfo.InvariantCulture, $"{entry.Stream}:{entry.Position}") : entry.Position.ToString(CultureInfo.InvariantCulture);

    private static (string Text, Ink Ink) Verdict(ExperimentResult e, StreamEntry entry, GlyphSet glyphs)
    {
        string overlaps = entry.Overlaps ? ", overlaps" : "";
        return e.Status == ExperimentStatus.Withdrawn ? ($"{glyphs.Warns} withdrawn", Ink.Warning)
            : entry.Survives is not { } survives ? ($"{glyphs.Open} runs{overlaps}", Ink.Open)
            : survives ? ($"{glyphs.Survivor} survives{overlaps}", Ink.Survivor)
            : ($"{glyphs.Other} does not{overlaps}", Ink.Text);
    }
}
