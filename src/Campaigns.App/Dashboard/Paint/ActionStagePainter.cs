using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints what comes after the form: the work with its bar, and sentences on what would happen, what was done, or why it was refused.</summary>
internal static class ActionStagePainter
{
    private const int PercentWidth = 6;

    /// <summary>What the stage is, in a line.</summary>
    /// <param name="run">The action.</param>
    public static string Heading(ActionRun run) => run.Stage switch
    {
        ActionStage.Rehearsing => "Finding out what would happen; nothing is changed",
        ActionStage.Preview when run.HasEffect => "What will happen",
        ActionStage.Preview => "Nothing would change",
        ActionStage.Working => "Carrying it out; it is kept whole or not at all",
        ActionStage.Done => "Done",
        _ when run.IsOutrun => "Changed meanwhile",
        _ => "Not done; nothing was changed",
    };

    /// <summary>Paints the work under way.</summary>
    /// <param name="run">The action.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintWork(ActionRun run, int width, int height, GlyphSet glyphs)
    {
        TextCanvas canvas = new(width, height);
        canvas.Write(0, 0, Heading(run), Ink.Heading);
        int room = width - PercentWidth;
        if (run.Share is { } share && room > 0)
        {
            int done = (int)(share * room);
            canvas.Repeat(0, 2, done, glyphs.Filled, Ink.Mean);
            canvas.Repeat(done, 2, room - done, glyphs.Unfilled, Ink.Axis);
            canvas.WriteRight(width - 1, 2, FormattableString.Invariant($"{Math.Floor(100 * share):0} %"), Ink.Text);
        }

        int row = 4;
        foreach (string line in CellText.Wrap(run.Progress, width))
        {
            canvas.Write(0, row++, line, run.IsStopping ? Ink.Warning : Ink.Text);
        }

        return canvas;
    }

    /// <summary>Paints the sentences, as high as they need.</summary>
    /// <param name="run">The action.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintSentences(ActionRun run, int width, GlyphSet glyphs)
    {
        List<IReadOnlyList<string>> wrapped = [.. run.Sentences.Select(s => CellText.Wrap(s, Math.Max(1, width - 2)))];
        TextCanvas canvas = new(width, 2 + wrapped.Sum(w => w.Count));
        bool isRefused = run.Stage == ActionStage.Refused;
        canvas.Write(0, 0, Heading(run), isRefused ? Ink.Warning : Ink.Heading);
        int row = 2;
        for (int i = 0; i < wrapped.Count; i++)
        {
            canvas.Put(0, row, isRefused && i == 0 ? glyphs.Warns : glyphs.Between, isRefused && i == 0 ? Ink.Warning : Ink.Axis);
            foreach (string line in wrapped[i])
            {
                canvas.Write(2, row++, line);
            }
        }

        return canvas;
    }
}
