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

    /// <summary>The one key that stands at a cell: where a name holds two, parted by a stroke or a space, the one clicked; for a word the key that goes on, or the first of two that do different things.</summary>
    /// <param name="keys">The keys as they were painted.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="at">Cell from 0.</param>
    /// <returns>The name of the key, for example "Right" of "Left/Right"; null beside all.</returns>
    public static string? NameAt(IReadOnlyList<(string Key, string Does)> keys, int width, int at)
    {
        ArgumentNullException.ThrowIfNull(keys);
        if (KeyAt(keys, width, at) is not { } place)
        {
            return null;
        }

        (int x, string name, _) = Place(keys, width).ElementAt(place);
        int offset = at - x;
        char between = name.Length > 1 && name.Contains('/', StringComparison.Ordinal) ? '/' : ' ';
        string[] parts = name.Length > 1 ? name.Split(between) : [name];
        if (offset >= name.Length)
        {
            return between == '/' ? parts[^1] : parts[0];
        }

        return parts[name.AsSpan(0, offset).Count(between)];
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
