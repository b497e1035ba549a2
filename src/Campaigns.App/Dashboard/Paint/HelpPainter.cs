using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the keys, the signs, and what the campaign's correction means.</summary>
public static class HelpPainter
{
    private const int KeyWidth = 24;

    private static readonly (string Key, string Does)[] Keys =
    [
        ("1 2 3", "turn to a page (or click its name)"),
        ("Up Down PgUp PgDn", "move in a list, scroll a text"),
        ("Home End", "first, last"),
        ("Enter", "open the selected experiment; Enter or Esc closes it"),
        ("Left Right", "in an open experiment the one before and after; in the ranking a rank"),
        ("s, Shift+s", "sort by the next column, by the one before (or click a column's name)"),
        ("r", "reverse the order"),
        ("m", "mark the selected experiment, or take its mark off; below the list, at most how many of the marked are false"),
        ("Shift+m", "mark all rows shown, or take their marks off"),
        ("/ or F3", "type a filter; Enter or Esc goes back to the list, Esc once more takes it off"),
        ("z", "in the ranking: the whole family, or near the boundary"),
        ("F5", "load the campaign again"),
        ("F1 or ?", "this page; Esc goes back"),
        ("q or Ctrl+Q", "quit"),
    ];

    private static readonly (string Filter, string Shows)[] Filters =
    [
        ("gloss primer", "both words in code, title, response or status"),
        ("p<0.01 adjusted<=0.05", "also n, groups, statistic, with < <= > >= ="),
        ("survives:yes", "or survives:no, survives:open"),
    ];

    /// <summary>Paints the page, as high as it needs.</summary>
    /// <param name="model">The campaign.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(DashboardModel model, int width, GlyphSet glyphs)
    {
        List<(string Left, string Right, Ink Ink)> rows = [("keys", "", Ink.Heading)];
        rows.AddRange(Keys.Select(k => (k.Key, k.Does, Ink.Text)));
        rows.Add(("", "", Ink.Text));
        rows.Add(("filter", "", Ink.Heading));
        rows.AddRange(Filters.Select(f => (f.Filter, f.Shows, Ink.Text)));
        rows.Add(("", "", Ink.Text));
        rows.Add(("signs", "", Ink.Heading));
        rows.Add((ListPainter.SurvivalText(true, glyphs), "survives: its adjusted p-value is at most the level", Ink.Survivor));
        rows.Add((ListPainter.SurvivalText(false, glyphs), "does not survive", Ink.Text));
        rows.Add((ListPainter.SurvivalText(null, glyphs), "has no result (the status says why) and counts as p = 1 in the family", Ink.Open));
        rows.Add((glyphs.Marked + " behind a code", "marked by you: " + MarksPainter.Meaning, Ink.Text));
        rows.Add(("numbers", "p with four decimals, below 0.0001 as 3.2e-7; others with four significant digits", Ink.Text));
        rows.Add(("", "", Ink.Text));
        rows.Add(("this campaign", "", Ink.Heading));
        rows.Add(("holds", string.Join(", ", model.Heading.Held), Ink.Text));
        rows.Add(("guarantee", model.Heading.Meaning, Ink.Text));
        if (model.Correction is { } correction && model.Heading.ValidUnder is { } dependence)
        {
            rows.Add(("dependence", dependence, Ink.Text));
            rows.Add(("published in", correction.Source, Ink.Text));
        }

        rows.Add(("what it is not", "Survival is evidence, under these assumptions, that group means differ. It is no release, safety or compliance decision.", Ink.Text));
        return Table(rows, width);
    }

    private static TextCanvas Table(List<(string Left, string Right, Ink Ink)> rows, int width)
    {
        int left = Math.Min(KeyWidth, width / 2);
        var broken = rows.Select(r => (r.Left, Lines: CellText.Wrap(r.Right, Math.Max(1, width - left)), r.Ink)).ToList();
        TextCanvas canvas = new(width, broken.Sum(r => Math.Max(1, r.Lines.Count)));
        int y = 0;
        foreach ((string name, IReadOnlyList<string> lines, Ink ink) in broken)
        {
            canvas.Write(0, y, name, Ink.Heading);
            for (int i = 0; i < lines.Count; i++)
            {
                canvas.Write(left, y + i, lines[i], ink);
            }

            y += Math.Max(1, lines.Count);
        }

        return canvas;
    }
}
