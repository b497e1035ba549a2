using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>At most how many of the marked experiments are false, beside the same bound of the smallest p-values.</summary>
public static class BoundPainter
{
    private const int Left = 8;
    private const int Narrowest = 30;
    private const int LeastRows = 3;
    private const int FewestRanks = 20;
    private const int MostNamed = 12;

    /// <summary>Paints the bound, the curve of bounds, and what they rest on.</summary>
    /// <param name="marks">What is marked.</param>
    /// <param name="ranking">All p-values of the campaign, ranked.</param>
    /// <param name="isNear">Whether twice the survivors are shown instead of all tested.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="pointed">Position of the experiment that the keys act on, where it is to be named here; -1 where another picture names it.</param>
    public static TextCanvas Paint(Marks marks, Ranking ranking, bool isNear, int width, int height, GlyphSet glyphs, int pointed = -1)
    {
        ArgumentNullException.ThrowIfNull(marks);
        ArgumentNullException.ThrowIfNull(ranking);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        canvas.Write(1, 0, CellText.FirstThatFits(width - 1, glyphs.Cut, marks.Count == 0 ? ["Nothing is marked; m marks an experiment."] : [BoundWording.Line(marks.Bound, marks.Confidence), BoundWording.ShortLine(marks.Bound, marks.Confidence)]), Ink.Heading);
        canvas.Write(1, 1, CellText.Fit(Named(marks, ranking, glyphs), width - 1, glyphs.Cut), Ink.Text);
        if (ranking.Count == 0)
        {
            canvas.Write(1, 2, CellText.Fit("Nothing is tested yet: nothing can be said of any experiment.", width - 1, glyphs.Cut), Ink.Open);
            return canvas;
        }

        IReadOnlyList<string> notes = CellText.Wrap(Notes(marks, glyphs), Math.Max(20, width - 2));
        int named = pointed < 0 ? 0 : 1;
        int rows = height - 5 - named - notes.Count;
        rows = Math.Min(Math.Max(rows, LeastRows + 2), height - 5 - named);
        if (width < Narrowest || rows < LeastRows)
        {
            canvas.Write(1, 2, "too small to draw", Ink.Quiet);
            return canvas;
        }

        int shown = isNear ? Math.Clamp(2 * ranking.SurvivorCount, Math.Min(FewestRanks, ranking.Count), ranking.Count) : ranking.Count;
        Draw(canvas, marks, ranking, shown, rows, glyphs, ranking.RankOf(pointed));
        int first = rows + 5;
        if (named > 0)
        {
            canvas.Write(1, first++, CellText.Fit(PointedText(marks, ranking, pointed, shown, glyphs), width - 2, glyphs.Cut), Ink.Heading);
        }

        for (int i = 0; i < notes.Count && first + i < height; i++)
        {
            bool isCut = first + i == height - 1 && i < notes.Count - 1;
            canvas.Write(1, first + i, isCut ? CellText.Fit(notes[i] + " " + notes[i + 1], width - 2, glyphs.Cut) : notes[i], Ink.Quiet);
        }

        return canvas;
    }

    private static void Draw(TextCanvas canvas, Marks marks, Ranking ranking, int shown, int rows, GlyphSet glyphs, int pointed)
    {
        const int Top = 3;
        int columns = canvas.Width - Left - 1;
        bool hasMarks = marks.Count > 0 && marks.Bound.Marked <= shown;
        int highest = Math.Max(1, marks.FalseAtMostOfSmallest(shown));
        highest = hasMarks ? Math.Max(highest, marks.Bound.FalseAtMost) : highest;
        canvas.Write(1, Top - 1, "at most so many false", Ink.Axis);
        for (int y = 0; y < rows; y++)
        {
            canvas.Put(Left - 1, Top + y, glyphs.Upright, Ink.Axis);
        }

        foreach (int tick in new[] { 0, highest })
        {
            canvas.Put(Left - 1, Top + RowOf(tick), glyphs.TickLeft, Ink.Axis);
            canvas.WriteRight(Left - 2, Top + RowOf(tick), tick.ToString(CultureInfo.InvariantCulture), Ink.Axis);
        }

        canvas.Put(Left - 1, Top + rows, glyphs.Corner, Ink.Axis);
        canvas.Repeat(Left, Top + rows, columns, glyphs.Across, Ink.Axis);
        canvas.Write(Left, Top + rows + 1, "1", Ink.Axis);
        canvas.WriteRight(Left + columns - 1, Top + rows + 1, shown.ToString(CultureInfo.InvariantCulture), Ink.Axis);
        canvas.Write(Left + Math.Max(2, (columns / 2) - 10), Top + rows + 1, "smallest p-values", Ink.Axis);
        int count = Math.Min(shown, columns);
        for (int i = 0; i < count; i++)
        {
            int k = count == 1 ? 1 : 1 + (int)Math.Round((double)i * (shown - 1) / (count - 1));
            bool survives = ranking.At(k).Survives == true;
            canvas.Put(ColumnOf(k), Top + RowOf(marks.FalseAtMostOfSmallest(k)), survives ? glyphs.Survivor : glyphs.Other, survives ? Ink.Survivor : Ink.Text);
        }

        if (hasMarks && marks.Bound.Marked > 0)
        {
            canvas.Put(ColumnOf(marks.Bound.Marked), Top + RowOf(marks.Bound.FalseAtMost), glyphs.Marked, Ink.Selected);
        }

        if (pointed > 0 && pointed <= shown)
        {
            canvas.Put(ColumnOf(pointed), Top + rows, glyphs.Here, Ink.Selected);
        }

        int ColumnOf(int k) => Left + (shown == 1 ? 0 : (int)Math.Round((k - 1.0) * (columns - 1) / (shown - 1)));

        int RowOf(int falseAtMost) => (int)Math.Round((1 - ((double)falseAtMost / highest)) * (rows - 1));
    }

    private static string Named(Marks marks, Ranking ranking, GlyphSet glyphs)
    {
        if (marks.Count == 0)
        {
            return "Shift+m marks every survivor.";
        }

        IEnumerable<string> names = marks.Positions.Order().Take(MostNamed).Select(i => ranking.Experiment(i).Plan.Code);
        return $"{glyphs.Marked} {string.Join(" ", names)}{(marks.Count > MostNamed ? string.Create(CultureInfo.InvariantCulture, $" and {marks.Count - MostNamed} more") : "")}";
    }

    private static string PointedText(Marks marks, Ranking ranking, int pointed, int shown, GlyphSet glyphs)
    {
        ExperimentResult e = ranking.Experiment(pointed);
        int rank = ranking.RankOf(pointed);
        string where = rank == 0 || e.P is not { } p ? e.Status.Sentence()
            : string.Create(CultureInfo.InvariantCulture, $"rank {rank} of {ranking.Count}{(rank > shown ? " (z shows it)" : "")}, p {NumberText.P(p)}");
        return $"{glyphs.Here} {e.Plan.Code}: {where}; {(marks.Has(pointed) ? "marked, m takes the mark off" : "not marked, m marks it")}";
    }

    private static string Notes(Marks marks, GlyphSet glyphs) =>
        $"{glyphs.Survivor}{glyphs.Other} the k smallest p-values, {glyphs.Marked} the marked. {BoundWording.Brief(marks.Bounds)} {BoundWording.SimesAlone} {BoundWording.NoEstimate}";
}
