using System.Globalization;
using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Every correction side by side: what survives under each, what it holds, and the sign of its boundary.</summary>
public static class CorrectionsPainter
{
    /// <summary>Rows above the first correction.</summary>
    public const int HeaderRows = 2;

    private const int KeyColumn = 4;
    private const int CountEnd = 30;
    private const int RateColumn = 33;
    private const int UnderColumn = 50;

    /// <summary>Paints the rows and what they are not for.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="takesKeys">Whether the row that the keys act on is shown.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(RankingModel model, bool takesKeys, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        IReadOnlyList<CorrectionRow> rows = model.Rows;
        canvas.Write(1, 0, CellText.Fit("under every correction (c points, b draws)", width - 1, glyphs.Cut), Ink.Heading);
        if (rows.Count == 0)
        {
            canvas.Write(1, 1, CellText.Fit($"This program knows no correction named {model.Standing.Campaign.Correction}.", width - 1, glyphs.Cut), Ink.Warning);
            return canvas;
        }

        canvas.Write(KeyColumn, 1, "correction", Ink.Heading);
        canvas.WriteRight(CountEnd, 1, "survive", Ink.Heading);
        canvas.Write(RateColumn, 1, "holds", Ink.Heading);
        canvas.Write(UnderColumn, 1, "under", Ink.Heading);
        for (int i = 0; i < rows.Count; i++)
        {
            Row(canvas, model, rows[i], HeaderRows + i, glyphs);
            if (takesKeys && i == model.Pointed)
            {
                canvas.InkRow(HeaderRows + i, Ink.Selected);
            }
        }

        // What the table is not for comes first, and never cut: more is said where there is room for all of it.
        int first = HeaderRows + rows.Count;
        string full = Note(model, glyphs, isBrief: false);
        Notes(canvas, CellText.Wrap(full, Math.Max(20, width - 2)).Count <= height - first ? full : Note(model, glyphs, isBrief: true), first, width, height, glyphs);
        return canvas;
    }

    private static void Row(TextCanvas canvas, RankingModel model, CorrectionRow row, int y, GlyphSet glyphs)
    {
        Ink ink = row.IsSealed ? Ink.Heading : Ink.Text;
        canvas.Write(1, y, SignOf(row, model, glyphs), row.IsSealed ? Ink.Boundary : Ink.Text);
        canvas.Write(2, y, row.IsDrawn ? glyphs.Marked : " ");
        canvas.Write(KeyColumn, y, row.IsSealed ? row.Key + " (sealed)" : row.Key, ink);
        canvas.WriteRight(CountEnd, y, row.Survivors?.ToString(CultureInfo.InvariantCulture) ?? glyphs.Cut, row.IsSealed ? Ink.Survivor : Ink.Text);
        canvas.Write(RateColumn, y, RateWord(row.Procedure.Controls), ink);
        canvas.Write(UnderColumn, y, CellText.FirstThatFits(canvas.Width - UnderColumn, glyphs.Cut, CorrectionsText.Under(row.Procedure.ValidUnder), CorrectionsText.UnderBriefly(row.Procedure.ValidUnder)), Ink.Quiet);
    }

    // A correction without a letter either is drawn with the sign of the sealed boundary, as the family shown was sealed with it, or has none that depends on rank alone.
    private static string SignOf(CorrectionRow row, RankingModel model, GlyphSet glyphs) =>
        row.IsSealed || row.Key == model.Family.Correction ? glyphs.Boundary : row.Letter ?? glyphs.None;

    private static string Note(RankingModel model, GlyphSet glyphs, bool isBrief)
    {
        CampaignStanding standing = model.Standing;
        string hanging = model.Hanging is { } count ? CorrectionsText.Hanging(count, CampaignText.RateWords(standing.Campaign.ErrorRate)) + ". " : "The others are reckoned in a moment. ";
        string families = standing.Families.Count > 1 ? "Over all families, each at its level and behind its gate. " : "";
        ErrorProcedure pointed = model.Rows[model.Pointed].Procedure;
        string under = $"{pointed.Name}: under {CorrectionsText.Under(pointed.ValidUnder)}.";
        return isBrief
            ? $"{CorrectionsText.NeverToChooseBriefly} {under}"
            : $"{under} {CorrectionsText.NeverToChoose} {hanging}{families}All at the sealed level. A letter is the sign of a boundary, {glyphs.Marked} behind it: drawn; {glyphs.None}: no simple one.";
    }

    private static void Notes(TextCanvas canvas, string text, int y, int width, int height, GlyphSet glyphs)
    {
        IReadOnlyList<string> lines = CellText.Wrap(text, Math.Max(20, width - 2));
        for (int i = 0; i < lines.Count && y + i < height; i++)
        {
            bool isCut = y + i == height - 1 && i < lines.Count - 1;
            canvas.Write(1, y + i, isCut ? CellText.Fit(lines[i] + " " + lines[i + 1], width - 2, glyphs.Cut) : lines[i], Ink.Quiet);
        }
    }

    private static string RateWord(ErrorRate rate) => rate switch
    {
        ErrorRate.Familywise => "familywise",
        ErrorRate.FalseDiscovery => "false discovery",
        _ => "each test alone",
    };
}
