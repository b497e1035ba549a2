using System.Globalization;
using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>The names of the pages in one row; the one shown stands in brackets.</summary>
/// <param name="names">The names, first to last.</param>
public sealed class PageStrip(IReadOnlyList<string> names)
{
    /// <summary>Paints the row.</summary>
    /// <param name="page">The page shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    public TextCanvas Paint(int page, int width)
    {
        TextCanvas canvas = new(width, 1);
        foreach ((int i, int x, string label) in Labels())
        {
            canvas.Write(x, 0, i == page ? $"[{label}]" : $" {label} ", i == page ? Ink.Heading : Ink.Text);
        }

        return canvas;
    }

    /// <summary>The page whose name stands at a cell; null beside all.</summary>
    /// <param name="at">Cell from 0.</param>
    public int? PageAt(int at)
    {
        foreach ((int i, int x, string label) in Labels())
        {
            if (at >= x && at < x + label.Length + 2)
            {
                return i;
            }
        }

        return null;
    }

    private IEnumerable<(int Page, int X, string Label)> Labels()
    {
        int x = 0;
        for (int i = 0; i < names.Count; i++)
        {
            string label = (i + 1).ToString(CultureInfo.InvariantCulture) + " " + names[i];
            yield return (i, x, label);
            x += label.Length + 3;
        }
    }
}
