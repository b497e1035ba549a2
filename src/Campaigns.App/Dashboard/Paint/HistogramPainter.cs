using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.App.Wording;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The p-values of a campaign in bars, with the height that true nulls alone would give them.</summary>
public static class HistogramPainter
{
    private const int Left = 7;
    private const int LeastRows = 3;

    /// <summary>Paints the bars, and below them what the line is and what the estimate rests on.</summary>
    /// <param name="histogram">The bars.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(PHistogram histogram, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(histogram);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        string title = string.Create(CultureInfo.InvariantCulture, $"p-values of all {histogram.Tested} tested, in twentieths");
        canvas.Write(1, 0, CellText.Fit(histogram.Tested == 0 ? "Nothing is tested yet: there is no p-value to count." : title, width - 1, glyphs.Cut), Ink.Heading);
        if (histogram.Tested == 0)
        {
            return canvas;
        }

        int across = Math.Max(20, width - 2);
        IReadOnlyList<string> notes = CellText.Wrap(Notes(histogram, glyphs, isBrief: false), across);
        notes = notes.Count <= height - 3 - LeastRows ? notes : CellText.Wrap(Notes(histogram, glyphs, isBrief: true), across);
        int rows = Math.Max(LeastRows, height - 3 - notes.Count);
        int cell = (width - Left - 1) / PHistogram.Bars;
        if (cell < 1 || height < 1 + LeastRows + 2)
        {
            canvas.Write(1, 1, "too small to draw", Ink.Quiet);
            return canvas;
        }

        rows = Math.Min(rows, height - 3);
        Draw(canvas, histogram, rows, cell, glyphs);
        int y = rows + 3, room = height - y;
        for (int i = 0; i < notes.Count && i < room; i++)
        {
            bool isCut = i == room - 1 && i < notes.Count - 1;
            canvas.Write(1, y + i, isCut ? CellText.Fit(notes[i] + " " + notes[i + 1], width - 2, glyphs.Cut) : notes[i], Ink.Quiet);
        }

        return canvas;
    }

    private static void Draw(TextCanvas canvas, PHistogram histogram, int rows, int cell, GlyphSet glyphs)
    {
        int highest = Math.Max(histogram.Counts.Max(), (int)Math.Ceiling(histogram.ExpectedNulls ?? 0));
        int steps = glyphs.Bars.Length;
        for (int bar = 0; bar < PHistogram.Bars; bar++)
        {
            // Whatever is there is seen: at least the lowest cell.
            int count = histogram.Counts[bar];
            int full = (int)Math.Round((double)count * rows * steps / highest);
            full = count > 0 ? Math.Max(1, full) : 0;
            for (int y = 0; y * steps < full; y++)
            {
                string sign = glyphs.Bars[Math.Min(steps, full - (y * steps)) - 1].ToString();
                canvas.Repeat(Left + (bar * cell), rows - y, Math.Max(1, cell - 1), sign, Ink.Mean);
            }
        }

        for (int y = 1; y <= rows; y++)
        {
            canvas.Put(Left - 1, y, glyphs.Upright, Ink.Axis);
        }

        canvas.Put(Left - 1, 1, glyphs.TickLeft, Ink.Axis);
        canvas.WriteRight(Left - 2, 1, Count(highest), Ink.Axis);
        if (histogram.ExpectedNulls is { } expected)
        {
            int y = Math.Clamp(rows - (int)Math.Round(expected * rows / highest) + 1, 1, rows);
            for (int x = Left; x < Left + (PHistogram.Bars * cell); x++)
            {
                // Bars are higher or lower than the line: both are seen.
                if (canvas.SignAt(x, y) == " ")
                {
                    canvas.Put(x, y, glyphs.Explored, Ink.Boundary);
                }
            }

            canvas.Put(Left - 1, y, glyphs.TickLeft, Ink.Boundary);
            if (y > 1)
            {
                canvas.WriteRight(Left - 2, y, NumberText.Screen(expected, 3), Ink.Boundary);
            }
        }

        int end = Left + (PHistogram.Bars * cell) - 1;
        canvas.Put(Left - 1, rows + 1, glyphs.Corner, Ink.Axis);
        canvas.Repeat(Left, rows + 1, PHistogram.Bars * cell, glyphs.Across, Ink.Axis);
        canvas.Write(Left, rows + 2, "0", Ink.Axis);
        canvas.WriteRight(Left + (PHistogram.Bars * cell / 2), rows + 2, "0.5", Ink.Axis);
        canvas.WriteRight(end, rows + 2, "p 1", Ink.Axis);
    }

    private static string Notes(PHistogram histogram, GlyphSet glyphs, bool isBrief)
    {
        string first = (isBrief ? TrueNullText.Alone(histogram.TrueNulls) : TrueNullText.Brief(histogram.TrueNulls, histogram.Others)) is { } share && histogram.ExpectedNulls is { } expected
            ? $"{glyphs.Explored}{glyphs.Explored} {NumberText.Screen(expected, 3)} a bar: true nulls alone, by {share}. {(isBrief ? TrueNullText.SupposesBriefly : TrueNullText.Supposes)}"
            : histogram.TrueNulls.Reason ?? "";
        return TrueNullText.Few(histogram.Tested) is { } few && !isBrief ? few + " " + first : first;
    }

    private static string Count(int n) => n.ToString(CultureInfo.InvariantCulture);
}
