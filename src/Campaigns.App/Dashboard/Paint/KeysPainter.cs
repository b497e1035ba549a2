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
        int x = 1;
        foreach ((string key, string does) in keys)
        {
            int needed = key.Length + 1 + does.Length;
            if (x + needed > width)
            {
                break;
            }

            canvas.Write(x, 0, key, Ink.KeyName);
            canvas.Write(x + key.Length + 1, 0, does, Ink.Bar);
            x += needed + 2;
        }

        return canvas;
    }
}
