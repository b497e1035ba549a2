using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the three lines above every page.</summary>
public static class HeadingPainter
{
    /// <summary>Rows of the heading.</summary>
    public const int Height = 3;

    private const int ShortestCode = 8;

    /// <summary>Paints the heading.</summary>
    /// <param name="heading">What it says.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(CampaignHeading heading, int width, GlyphSet glyphs)
    {
        TextCanvas canvas = new(width, Height);
        string between = " " + glyphs.Between + " ";
        string held = string.Join(between, heading.Held);
        int room = width - CellText.Width(held) - between.Length - 1;
        string code = CellText.Fit(heading.Code, Math.Max(ShortestCode, room), glyphs.Cut);
        canvas.InkRow(0, Ink.Bar);
        int x = canvas.Write(1, 0, code + between + held, Ink.Bar);
        foreach (string more in new[] { heading.Plan, heading.Title })
        {
            if (more.Length > 0 && x + between.Length + CellText.Width(more) < width)
            {
                x = canvas.Write(x, 0, between + more, Ink.Bar);
            }
        }

        IEnumerable<string> progress = heading.Family is { } family ? heading.Progress.Append(family) : heading.Progress;
        int next = canvas.Write(1, 1, string.Join(between, progress) + between);
        Ink review = heading.ReviewTrouble is null ? Ink.Text : Ink.Warning;
        canvas.Write(next, 1, CellText.Fit(heading.Review, width - next, glyphs.Cut), review);
        canvas.Write(1, 2, CellText.Fit(heading.Meaning, width - 1, glyphs.Cut), Ink.Quiet);
        return canvas;
    }
}
