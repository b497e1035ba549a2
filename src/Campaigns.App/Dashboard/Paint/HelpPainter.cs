using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the keys, the signs, and what the campaign's correction means.</summary>
public static class HelpPainter
{
    private const int KeyWidth = 24;

    private static readonly (string Key, string Does)[] Everywhere =
    [
        ("1 2 3 ...", "turn to a page (or click its name)"),
        ("a", "everything that can be done with the campaign, to choose from"),
        ("l t v w x o", "at once: load a file, test, take a review, withdraw experiments, exclude an observation, write the report; each shows first what will happen"),
        ("F5", "load the campaign again"),
        ("F1 or ?", "this page, about the one you came from; Esc goes back"),
        ("q, Ctrl+Q, Ctrl+C", "quit"),
    ];

    /// <summary>Paints the page, as high as it needs.</summary>
    /// <param name="model">The campaign.</param>
    /// <param name="subject">The page that is explained first; null for none.</param>
    /// <param name="width">Cells across.</param>
    public static TextCanvas Paint(DashboardModel model, (string Name, IReadOnlyList<(string Key, string Does)> Help)? subject, int width)
    {
        ArgumentNullException.ThrowIfNull(model);
        List<(string Left, string Right, Ink Ink)> rows = [];
        if (subject is { } page)
        {
            rows.Add(("on the page " + page.Name, "", Ink.Heading));
            rows.AddRange(page.Help.Select(k => (k.Key, k.Does, Ink.Text)));
            rows.Add(("", "", Ink.Text));
        }

        rows.Add(("on every page", "", Ink.Heading));
        rows.AddRange(Everywhere.Select(k => (k.Key, k.Does, Ink.Text)));
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
