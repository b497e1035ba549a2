using Campaigns.App.Dashboard.Canvas;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The differences of means with their simultaneous intervals, one below the other on one axis that holds 0, with a line at 0.</summary>
internal static class ComparisonPlot
{
    private const int LongestLabel = 26;
    private const int SignWidth = 2;

    /// <summary>Paints the plot.</summary>
    /// <param name="comparisons">The comparisons, in the order shown.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    /// <returns>A row a comparison, the axis with its labels, and a line that says what is drawn; one line of words where there is no room.</returns>
    public static TextCanvas Paint(IReadOnlyList<ExperimentComparison> comparisons, int width, GlyphSet glyphs)
    {
        double[] all = [0, .. comparisons.SelectMany(c => new[] { c.Comparison.Difference, c.Comparison.Lower, c.Comparison.Upper }).OfType<double>().Where(double.IsFinite)];
        if (width < 30)
        {
            TextCanvas words = new(width, 1);
            words.Write(0, 0, CellText.Fit("too narrow to draw", width, glyphs.Cut), Ink.Quiet);
            return words;
        }

        int longest = comparisons.Max(c => CellText.Width(c.GroupA) + CellText.Width(c.GroupB) + 3);
        int label = Math.Min(longest, Math.Min(LongestLabel, (width * 9 / 20) - SignWidth));
        int start = SignWidth + label + 1;
        LinearScale scale = new(all.Min(), all.Max(), width - start - 1);
        int zero = start + scale.PlaceOf(0, scale.Cells);
        TextCanvas canvas = new(width, comparisons.Count + 3);
        for (int y = 0; y < comparisons.Count; y++)
        {
            ExperimentComparison c = comparisons[y];
            canvas.Write(0, y, ComparisonsPainter.Sign(c, glyphs), ComparisonsPainter.InkOf(c));
            canvas.Write(SignWidth, y, ComparisonsPainter.PairText(c, label, glyphs));
            canvas.Put(zero, y, glyphs.Upright, Ink.Axis);
            Interval(canvas, c, scale, start, zero, y, glyphs);
        }

        scale.Draw(canvas, start, comparisons.Count, glyphs);
        string key = $"{glyphs.Left}{glyphs.Mean}{glyphs.Right} difference and interval; {glyphs.Upright} and {glyphs.Crossing} at 0";
        canvas.Write(0, comparisons.Count + 2, CellText.Fit(key, width, glyphs.Cut), Ink.Quiet);
        return canvas;
    }

    private static void Interval(TextCanvas canvas, ExperimentComparison c, LinearScale scale, int start, int zero, int y, GlyphSet glyphs)
    {
        double difference = c.Comparison.Difference;
        if (c.Comparison is { Lower: { } lower, Upper: { } upper } && double.IsFinite(lower) && double.IsFinite(upper))
        {
            int from = start + scale.PlaceOf(lower, scale.Cells), to = start + scale.PlaceOf(upper, scale.Cells);

            // An interval that leaves out 0 must not seem to reach it for want of a finer cell.
            from += lower > 0 && from == zero && to > zero ? 1 : 0;
            to -= upper < 0 && to == zero && from < zero ? 1 : 0;
            canvas.Repeat(from, y, to - from + 1, glyphs.Across, Ink.Mean);
            if (from < zero && zero < to)
            {
                canvas.Put(zero, y, glyphs.Crossing, Ink.Mean);
            }

            canvas.Put(from, y, glyphs.Left, Ink.Mean);
            canvas.Put(to, y, glyphs.Right, Ink.Mean);
            canvas.Put(Math.Clamp(start + scale.PlaceOf(difference, scale.Cells), from, to), y, glyphs.Mean, Ink.Mean);
        }
        else if (double.IsFinite(difference))
        {
            canvas.Put(start + scale.PlaceOf(difference, scale.Cells), y, glyphs.Mean, Ink.Mean);
        }
    }
}
