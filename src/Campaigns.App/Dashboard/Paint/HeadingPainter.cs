using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the lines above every page: what is held, how far it is, and what that means with all its conditions.</summary>
public static class HeadingPainter
{
    private const int LinesOfFacts = 2;
    private const int ShortestCode = 8;
    private const int LeastMeaning = 2;
    private const string InFull = " (all: F1)";

    /// <summary>Rows that the heading needs.</summary>
    /// <param name="heading">What it says.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="screen">Rows of the whole screen: a long meaning takes an eighth of it, and is said in full on the help page.</param>
    public static int HeightOf(CampaignHeading heading, int width, int screen = int.MaxValue) => LinesOfFacts + Math.Min(MeaningOf(heading, width).Count, Math.Max(LeastMeaning, screen / 8));

    /// <summary>Paints the heading.</summary>
    /// <param name="heading">What it says.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="screen">Rows of the whole screen.</param>
    public static TextCanvas Paint(CampaignHeading heading, int width, GlyphSet glyphs, int screen = int.MaxValue)
    {
        TextCanvas canvas = new(width, HeightOf(heading, width, screen));
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
        string state = CellText.Width(heading.Review) <= width - next ? heading.Review : heading.ShortReview;
        canvas.Write(next, 1, CellText.Fit(state, width - next, glyphs.Cut), review);
        IReadOnlyList<string> meaning = MeaningOf(heading, width);
        int rows = canvas.Height - LinesOfFacts;
        for (int i = 0; i < Math.Min(rows, meaning.Count); i++)
        {
            bool isCut = i == rows - 1 && meaning.Count > rows;
            canvas.Write(1, LinesOfFacts + i, isCut ? CellText.Fit(meaning[i] + " " + meaning[i + 1], width - 1 - InFull.Length, glyphs.Cut) + InFull : meaning[i], Ink.Quiet);
        }

        return canvas;
    }

    private static IReadOnlyList<string> MeaningOf(CampaignHeading heading, int width) => CellText.Wrap(heading.Meaning, Math.Max(40, width - 2));
}
