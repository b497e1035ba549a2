using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the form of an action: what it does, its fields, what the one at hand means, what is wrong, what would fit. Fields of text are left free for the screen's own.</summary>
internal static class ActionFormPainter
{
    private const int MostHintRows = 3;

    /// <summary>Column at which fields begin.</summary>
    /// <param name="run">The action.</param>
    public static int FieldColumn(ActionRun run) => run.Fields.Max(f => f.Name.Length) + 2;

    /// <summary>Row of the first field; the others follow.</summary>
    /// <param name="run">The action.</param>
    /// <param name="width">Cells across.</param>
    public static int FirstFieldRow(ActionRun run, int width) => CellText.Wrap(run.Action.Does, width).Count + 1;

    /// <summary>Row of the first suggestion.</summary>
    /// <param name="run">The action.</param>
    /// <param name="field">The field at hand.</param>
    /// <param name="width">Cells across.</param>
    public static int FirstSuggestionRow(ActionRun run, int field, int width) =>
        FirstFieldRow(run, width) + run.Fields.Count + 1 + NoteOf(run, field, width).Count + 1;

    /// <summary>Paints the form.</summary>
    /// <param name="run">The action.</param>
    /// <param name="field">The field at hand, from 0.</param>
    /// <param name="suggestions">What would fit it.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(ActionRun run, int field, IReadOnlyList<Suggestion> suggestions, int width, int height, GlyphSet glyphs)
    {
        TextCanvas canvas = new(width, height);
        Lines(canvas, 0, CellText.Wrap(run.Action.Does, width), Ink.Text);
        int row = FirstFieldRow(run, width), column = FieldColumn(run);
        for (int i = 0; i < run.Fields.Count; i++)
        {
            ActionField f = run.Fields[i];
            canvas.Write(0, row + i, f.Name, i == field ? Ink.Heading : Ink.Text);
            if (f.Words.Count > 0)
            {
                canvas.Write(column, row + i, $"< {f.Text} >", i == field ? Ink.Selected : Ink.Text);
            }
        }

        int noteRow = row + run.Fields.Count + 1;
        bool isWrong = run.Complaint is not null;
        if (isWrong)
        {
            canvas.Put(0, noteRow, glyphs.Warns, Ink.Warning);
        }

        IReadOnlyList<string> note = NoteOf(run, field, width);
        for (int i = 0; i < note.Count; i++)
        {
            canvas.Write(isWrong ? 2 : 0, noteRow + i, note[i], isWrong ? Ink.Warning : Ink.Quiet);
        }

        Suggestions(canvas, FirstSuggestionRow(run, field, width), suggestions, glyphs);
        return canvas;
    }

    private static void Suggestions(TextCanvas canvas, int row, IReadOnlyList<Suggestion> suggestions, GlyphSet glyphs)
    {
        int room = canvas.Height - row;
        int shown = suggestions.Count <= room ? suggestions.Count : Math.Max(0, room - 1);
        Lines(canvas, row, suggestions.Take(shown).Select(s => CellText.Fit(s.Shown, canvas.Width, glyphs.Cut)), Ink.Text);
        if (shown < suggestions.Count)
        {
            canvas.Write(0, row + shown, FormattableString.Invariant($"and {suggestions.Count - shown} more; type on"), Ink.Quiet);
        }
    }

    private static IReadOnlyList<string> NoteOf(ActionRun run, int field, int width)
    {
        IReadOnlyList<string> lines = CellText.Wrap(run.Complaint?.Sentence ?? run.Fields[field].Hint, Math.Max(1, width - (run.Complaint is null ? 0 : 2)));
        return [.. lines.Take(Math.Max(MostHintRows, 1))];
    }

    private static void Lines(TextCanvas canvas, int row, IEnumerable<string> lines, Ink ink)
    {
        foreach (string line in lines)
        {
            canvas.Write(0, row++, line, ink);
        }
    }
}
