using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Every observation of an experiment as a dot above its group's mean and interval, all groups on one axis.</summary>
public static class ObservationPlot
{
    private const int DotsPerRow = 4;
    private const int MostDotRows = 3;
    private const int LongestLabel = 24;

    /// <summary>Paints the plot.</summary>
    /// <param name="groups">The groups in the plan's order.</param>
    /// <param name="width">Cells across, at least 24.</param>
    /// <param name="glyphs">The signs.</param>
    /// <returns>A canvas as high as the groups need; one line of words where there is nothing to draw.</returns>
    public static TextCanvas Paint(IReadOnlyList<GroupDetail> groups, int width, GlyphSet glyphs)
    {
        double[] all = [.. groups.SelectMany(g => g.Values.Concat(new[] { g.Summary.Lower, g.Summary.Upper }.OfType<double>())).Where(double.IsFinite)];
        if (all.Length == 0 || width < 24)
        {
            TextCanvas words = new(width, 1);
            words.Write(0, 0, all.Length == 0 ? "no values yet" : "too narrow to draw the values", Ink.Quiet);
            return words;
        }

        int label = Math.Clamp(groups.Max(g => CellText.Width(g.Label)), 1, Math.Min(LongestLabel, width / 4)) + 1;
        LinearScale scale = new(all.Min(), all.Max(), width - label - 1);
        int[][] heaps = [.. groups.Select(g => HeapsOf(g, scale, glyphs))];
        int highest = heaps.Max(h => h.Length == 0 ? 0 : h.Max());
        int dotRows = glyphs.HasDots ? Math.Clamp((highest + DotsPerRow - 1) / DotsPerRow, 1, MostDotRows) : 1;
        int perDot = glyphs.HasDots ? Math.Max(1, (highest + (dotRows * DotsPerRow) - 1) / (dotRows * DotsPerRow)) : 1;

        TextCanvas canvas = new(width, (groups.Count * (dotRows + 1)) + 3);
        for (int i = 0; i < groups.Count; i++)
        {
            int y = i * (dotRows + 1);
            canvas.Write(0, y + dotRows, CellText.Fit(groups[i].Label, label - 1, glyphs.Cut));
            Heaps(canvas, heaps[i], label, y, dotRows, perDot, glyphs);
            Interval(canvas, groups[i], scale, label, y + dotRows, glyphs);
        }

        int axis = groups.Count * (dotRows + 1);
        scale.Draw(canvas, label, axis, glyphs);
        canvas.Write(0, axis + 2, CellText.Fit(Key(perDot, glyphs), width, glyphs.Cut), Ink.Quiet);
        return canvas;
    }

    private static string Key(int perDot, GlyphSet glyphs)
    {
        string dot = glyphs.HasDots
            ? perDot == 1 ? "a dot is a value" : string.Create(CultureInfo.InvariantCulture, $"a dot is up to {perDot} values")
            : "digits count values, 9 is 9 or more";
        return $"{dot}; {glyphs.Left}{glyphs.Mean}{glyphs.Right} mean and interval";
    }

    private static int[] HeapsOf(GroupDetail group, LinearScale scale, GlyphSet glyphs)
    {
        int[] heaps = new int[glyphs.HasDots ? scale.Cells * 2 : scale.Cells];
        foreach (double value in group.Values.Where(double.IsFinite))
        {
            heaps[scale.PlaceOf(value, heaps.Length)]++;
        }

        return heaps;
    }

    private static void Heaps(TextCanvas canvas, int[] heaps, int x, int y, int rows, int perDot, GlyphSet glyphs)
    {
        for (int place = 0; place < heaps.Length; place++)
        {
            if (!glyphs.HasDots)
            {
                if (heaps[place] > 0)
                {
                    canvas.Write(x + place, y, Math.Min(9, heaps[place]).ToString(CultureInfo.InvariantCulture));
                }

                continue;
            }

            int dots = (heaps[place] + perDot - 1) / perDot;
            for (int dot = 0; dot < dots; dot++)
            {
                int fromTop = (rows * DotsPerRow) - 1 - dot;
                canvas.PutDot(x + (place / 2), y + (fromTop / DotsPerRow), place % 2, fromTop % DotsPerRow, Ink.Text);
            }
        }
    }

    private static void Interval(TextCanvas canvas, GroupDetail group, LinearScale scale, int x, int y, GlyphSet glyphs)
    {
        if (group.Summary is { Lower: { } lower, Upper: { } upper } && double.IsFinite(lower) && double.IsFinite(upper))
        {
            int from = scale.PlaceOf(lower, scale.Cells), to = scale.PlaceOf(upper, scale.Cells);
            canvas.Repeat(x + from, y, to - from + 1, glyphs.Across, Ink.Mean);
            canvas.Put(x + from, y, glyphs.Left, Ink.Mean);
            canvas.Put(x + to, y, glyphs.Right, Ink.Mean);
        }

        if (group.Summary.Mean is { } mean && double.IsFinite(mean))
        {
            canvas.Put(x + scale.PlaceOf(mean, scale.Cells), y, glyphs.Mean, Ink.Mean);
        }
        else
        {
            canvas.Write(x, y, "no values", Ink.Open);
        }
    }
}
