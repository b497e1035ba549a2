using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints two lines on the marked experiments below the list: the bound, and what it is.</summary>
public static class MarksPainter
{
    /// <summary>Rows that the lines take.</summary>
    public const int Rows = 2;

    /// <summary>What marks are for and what the bound rests on, for the help page.</summary>
    public const string Meaning =
        "at most so many of the marked are false, with a confidence that holds for every set at once: mark after looking at everything. Closed testing with Simes' tests over all planned experiments (Goeman and Solari 2011), if Simes' inequality holds for the true nulls, as it does for independent experiments. " + BoundWording.NoEstimate;

    /// <summary>Paints the lines.</summary>
    /// <param name="marks">What is marked.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(Marks marks, int width, int height, GlyphSet glyphs)
    {
        TextCanvas canvas = new(width, height);
        if (marks.Count > 0)
        {
            canvas.Write(1, 0, CellText.Fit(BoundWording.Line(marks.Bound, marks.Confidence), width - 1, glyphs.Cut), Ink.Heading);
            canvas.Write(1, 1, CellText.Fit("closed testing (Simes), holds for every set; no estimate (F1)", width - 1, glyphs.Cut), Ink.Quiet);
        }

        return canvas;
    }
}
