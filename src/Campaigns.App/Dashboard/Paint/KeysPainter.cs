using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the line of keys below every page.</summary>
public static class KeysPainter
{
    /// <summary>Paints as many keys as fit, each whole.</summary>
    /// <param name="keys">Names of keys and what they do, the most needed first.</param>
    /// <param name="width">Cells across.</param>
    public static TextCanvas Paint(IEnumerable<(string Key, string Does)> keys, int width)
    {
        TextCanvas canvas = new(width, 1);
        canvas.InkRow(0, Ink.Bar);
        foreach ((int x, string key, string does) in Place(keys, width))
        {
            canvas.Write(x, 0, key, Ink.KeyName);
            canvas.Write(x + key.Length + 1, 0, does, Ink.Bar);
        }

        return canvas;
    }

    /// <summary>Paints what is wrong in the place of the keys.</summary>
    /// <param name="trouble">One sentence, with the key that helps first.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(string trouble, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, 1);
        canvas.InkRow(0, Ink.Bar);
        canvas.Write(1, 0, CellText.Fit(trouble, width - 1, glyphs.Cut), Ink.KeyName);
        return canvas;
    }

    /// <summary>Which key stands at a cell; null beside all.</summary>
    /// <param name="keys">The keys as they were painted.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="at">Cell from 0.</param>
    public static int? KeyAt(IEnumerable<(string Key, string Does)> keys, int width, int at)
    {
        int place = Place(keys, width).ToList().FindIndex(k => at >= k.X && at <= k.X + k.Key.Length + k.Does.Length);
        return place < 0 ? null : place;
    }

    private static IEnumerable<(int X, string Key, string Does)> Place(IEnumerable<(string Key, string Does)> keys, int width)
    {
        int x = 1;
        foreach ((string key, string does) in keys)
        {
            int needed = key.Length + 1 + does.Length;
            if (x + needed > width)
            {
                yield break;
            }

            yield return (x, key, does);
            x += needed + 2;
        }
    }
}
