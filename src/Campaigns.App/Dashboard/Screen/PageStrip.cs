using System.Globalization;
using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>The names of the pages in one row; the one shown stands in brackets.</summary>
/// <param name="names">The names, first to last.</param>
public sealed class PageStrip(IReadOnlyList<string> names)
{
    private const int Brackets = 2;
    private int _width = int.MaxValue;

    /// <summary>Paints the row.</summary>
    /// <param name="page">The page shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    public TextCanvas Paint(int page, int width)
    {
        _width = width;
        TextCanvas canvas = new(width, 1);
        foreach ((int i, int x, string label) in Labels())
        {
            canvas.Write(x, 0, i == page ? $"[{label}]" : $" {label} ", i == page ? Ink.Heading : Ink.Text);
        }

        return canvas;
    }

    /// <summary>The page whose name stands at a cell of the row as it was painted last; null beside all.</summary>
    /// <param name="at">Cell from 0.</param>
    public int? PageAt(int at)
    {
        foreach ((int i, int x, string label) in Labels())
        {
            if (at >= x && at < x + label.Length + Brackets)
            {
                return i;
            }
        }

        return null;
    }

    private IEnumerable<(int Page, int X, string Label)> Labels()
    {
        string[] labels = [.. names.Select((name, i) => (i + 1).ToString(CultureInfo.InvariantCulture) + " " + name)];
        int needed = labels.Sum(label => label.Length + Brackets);

        // Where there is room, a blank more between two names.
        int gap = needed + names.Count - 1 <= _width ? 1 : 0;
        int x = 0;
        for (int i = 0; i < labels.Length; i++)
        {
            yield return (i, x, labels[i]);
            x += labels[i].Length + Brackets + gap;
        }
    }
}
