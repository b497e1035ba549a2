using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the lines above every page: what is held, how far it is, and what that means with all its conditions.</summary>
public static class HeadingPainter
{
    private const int LinesOfFacts = 2;
    private const int ShortestCode = 8;

    /// <summary>Rows that the heading needs.</summary>
    /// <param name="heading">What it says.</param>
    /// <param name="width">Cells across.</param>
    public static int HeightOf(CampaignHeading heading, int width) => LinesOfFacts + MeaningOf(heading, width).Count;

    /// <summary>Paints the heading.</summary>
    /// <param name="heading">What it says.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(CampaignHeading heading, int width, GlyphSet glyphs)
    {
        TextCanvas canvas = new(width, HeightOf(heading, width));
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
        IReadOnlyList<string> meaning = MeaningOf(heading, width);
        for (int i = 0; i < meaning.Count; i++)
        {
            canvas.Write(1, LinesOfFacts + i, meaning[i], Ink.Quiet);
        }

        return canvas;
    }

    private static IReadOnlyList<string> MeaningOf(CampaignHeading heading, int width) => CellText.Wrap(heading.Meaning, Math.Max(40, width - 2));
}
