using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The families of a campaign, a row each, with the one shown and the gates that are closed.</summary>
public static class FamiliesPainter
{
    /// <summary>Rows above the first family.</summary>
    public const int HeaderRows = 1;

    /// <summary>Paints the rows; those around the family shown where not all fit.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(RankingModel model, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        IReadOnlyList<FamilyStanding> families = model.Standing.Families;
        canvas.Write(1, 0, CellText.Fit(string.Create(CultureInfo.InvariantCulture, $"{families.Count} families, f shows the next"), width - 1, glyphs.Cut), Ink.Heading);
        int first = FirstOf(model, height);
        for (int y = HeaderRows; y < height && first + y - HeaderRows < families.Count; y++)
        {
            int place = first + y - HeaderRows;
            FamilyStanding family = families[place];
            bool isShown = place == model.FamilyPlace;
            canvas.Write(1, y, CellText.FirstThatFits(width - 1, glyphs.Cut, Ways(family, isShown, glyphs)), family.IsOpen ? Ink.Text : Ink.Warning);
            if (isShown)
            {
                canvas.InkRow(y, Ink.Selected);
            }
        }

        Waiting(canvas, model.Family, HeaderRows + families.Count + 1);
        return canvas;
    }

    // What the family shown waits for, where its row has no room for it and there is some below.
    private static void Waiting(TextCanvas canvas, FamilyStanding family, int y)
    {
        foreach (string line in CellText.Wrap(family.Waits is { } waits ? $"{family.Name} {waits}." : "", Math.Max(20, canvas.Width - 2)))
        {
            if (y < canvas.Height)
            {
                canvas.Write(1, y++, line, Ink.Warning);
            }
        }
    }

    /// <summary>The family in a row; null beside all.</summary>
    /// <param name="model">As it was painted.</param>
    /// <param name="height">As it was painted.</param>
    /// <param name="y">Row from 0.</param>
    public static int? PlaceAt(RankingModel model, int height, int y)
    {
        ArgumentNullException.ThrowIfNull(model);
        int place = FirstOf(model, height) + y - HeaderRows;
        return y >= HeaderRows && place < model.Standing.Families.Count ? place : null;
    }

    private static int FirstOf(RankingModel model, int height) =>
        RowWindow.Follow(0, model.FamilyPlace, model.Standing.Families.Count, height - HeaderRows);

    /// <summary>What a family is waiting for, in full where there is room, and the word "closed" alone where there is little.</summary>
    private static IReadOnlyList<string> Ways(FamilyStanding family, bool isShown, GlyphSet glyphs)
    {
        string name = $"{(isShown ? glyphs.Marked : " ")} {family.Name}: {(family.IsOpen ? "open" : glyphs.Warns + " closed")}";
        string survive = string.Create(CultureInfo.InvariantCulture, $"{family.Survivors} {(family.Survivors == 1 ? "survives" : "survive")}");
        string counts = string.Create(CultureInfo.InvariantCulture, $"{family.Correction} at {FamilyText.Level(family.Level)}, {family.Tested} of {family.Planned} tested, {survive}");
        string few = string.Create(CultureInfo.InvariantCulture, $"{family.Correction} {FamilyText.Level(family.Level)}, {family.Tested}/{family.Planned} tested, {survive}");
        return [.. family.Waits is { } waits ? [$"{name}, {counts}; {waits}", $"{name}, {few}; {waits}"] : (string[])[], $"{name}, {counts}", $"{name}, {few}", string.Create(CultureInfo.InvariantCulture, $"{name}, {family.Tested}/{family.Planned} tested, {survive}")];
    }
}
