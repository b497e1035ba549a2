using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The risk of at least one false positive growing with the tests, a row for some of them: its span whatever the dependence, the place for independent tests, and the place with the correction.</summary>
internal static class RiskPicture
{
    /// <summary>A wider picture tells nothing more.</summary>
    private const int Widest = 110;

    /// <summary>Rows of tests at most: first and last, and evenly between them.</summary>
    private const int MostRows = 15;

    private const int Narrowest = 44;
    private const int NumberWidth = 10;

    /// <summary>Paints the picture.</summary>
    /// <param name="points">The risk test by test; at least one.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    /// <returns>A heading, a row for each test shown, the axis in per cent, and a line that says what is drawn; one line of words where there is no room.</returns>
    public static TextCanvas Paint(IReadOnlyList<RiskPoint> points, int width, GlyphSet glyphs)
    {
        width = Math.Min(width, Widest);
        if (width < Narrowest)
        {
            TextCanvas words = new(width, 1);
            words.Write(0, 0, CellText.Fit("too narrow to draw", width, glyphs.Cut), Ink.Quiet);
            return words;
        }

        RiskPoint[] shown = Shown(points);
        int label = Math.Max("tests".Length, points.Count.ToString(CultureInfo.InvariantCulture).Length);
        bool hasCorrected = points[^1].Corrected is not null;
        int start = label + 2;
        LinearScale scale = new(0, 100, width - start - (hasCorrected ? 2 : 1) * NumberWidth);
        IReadOnlyList<string> key = CellText.Wrap(Key(glyphs, hasCorrected), width);
        TextCanvas canvas = new(width, shown.Length + 3 + key.Count);
        canvas.WriteRight(label - 1, 0, "tests", Ink.Heading);
        canvas.WriteRight(start + scale.Cells + NumberWidth - 1, 0, "risk", Ink.Heading);
        if (hasCorrected)
        {
            canvas.WriteRight(start + scale.Cells + (2 * NumberWidth) - 1, 0, "corrected", Ink.Heading);
        }

        for (int i = 0; i < shown.Length; i++)
        {
            Row(canvas, shown[i], scale, start, label, i + 1, glyphs);
        }

        scale.Draw(canvas, start, shown.Length + 1, glyphs);
        for (int i = 0; i < key.Count; i++)
        {
            canvas.Write(0, shown.Length + 3 + i, key[i], Ink.Quiet);
        }

        return canvas;
    }

    private static void Row(TextCanvas canvas, RiskPoint point, LinearScale scale, int start, int label, int y, GlyphSet glyphs)
    {
        canvas.WriteRight(label - 1, y, point.Tests.ToString(CultureInfo.InvariantCulture));
        int Place(double risk) => start + scale.PlaceOf(100 * risk, scale.Cells);
        int from = Place(point.AtLeast);
        int to = Place(point.AtMost);
        canvas.Repeat(from, y, to - from + 1, glyphs.Across, Ink.Axis);
        canvas.Put(from, y, glyphs.Left, Ink.Axis);
        canvas.Put(to, y, glyphs.Right, Ink.Axis);
        canvas.Put(Place(point.Independent), y, glyphs.Mean, Ink.Mean);
        canvas.WriteRight(start + scale.Cells + NumberWidth - 1, y, ProbabilityText.Percent(point.Independent));
        if (point.Corrected is { } corrected)
        {
            canvas.Put(Place(corrected.AtLeastOne), y, glyphs.Survivor, Ink.Survivor);
            canvas.WriteRight(start + scale.Cells + (2 * NumberWidth) - 1, y, ProbabilityText.Percent(corrected.AtLeastOne));
        }
    }

    private static RiskPoint[] Shown(IReadOnlyList<RiskPoint> points)
    {
        int rows = Math.Min(MostRows, points.Count);
        return rows == 1
            ? [points[0]]
            : [.. Enumerable.Range(0, rows).Select(i => points[(int)Math.Round((double)i * (points.Count - 1) / (rows - 1))])];
    }

    private static string Key(GlyphSet glyphs, bool hasCorrected) =>
        $"Risk of at least one false positive in per cent, if nothing is real: {glyphs.Left}{glyphs.Mean}{glyphs.Right} without correction, for independent tests between its bounds whatever the dependence"
        + (hasCorrected ? $"; {glyphs.Survivor} with the correction." : ".");
}
