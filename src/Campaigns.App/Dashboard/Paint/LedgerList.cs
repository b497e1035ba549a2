using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the entries of the ledger, a row each: number, when, who, what and why.</summary>
public static class LedgerList
{
    /// <summary>Rows above the first entry.</summary>
    public const int HeaderRows = 1;

    private const int WhenWidth = 16;
    private const int ShortestNumber = 3;
    private const int WhoWidth = 10;

    /// <summary>Paints the list.</summary>
    /// <param name="ledger">What is shown.</param>
    /// <param name="top">The first row shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows, the names included.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(LedgerModel ledger, int top, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(ledger);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        int number = Math.Max(ShortestNumber, Whole(ledger.EntryCount).Length);
        int when = number + 1, who = when + WhenWidth + 1, what = who + WhoWidth + 1;
        canvas.WriteRight(number - 1, 0, "no.", Ink.Heading);
        canvas.Write(when, 0, "when, UTC " + (ledger.IsOldestFirst ? glyphs.Rising : glyphs.Falling), Ink.Heading);
        canvas.Write(who, 0, "who", Ink.Heading);
        canvas.Write(what, 0, "what was done", Ink.Heading);
        for (int y = HeaderRows; y < height && top + y - HeaderRows < ledger.RowCount; y++)
        {
            LedgerEntry entry = ledger.At(top + y - HeaderRows);
            canvas.WriteRight(number - 1, y, Whole(entry.Sequence));
            canvas.Write(when, y, entry.At.UtcDateTime.ToString("yyyy-MM-dd HH:mm", CultureInfo.InvariantCulture), Ink.Quiet);
            canvas.Write(who, y, CellText.Fit(entry.By.ActingAs ?? entry.By.Account, WhoWidth, glyphs.Cut));
            string why = entry.Reason is { } reason ? $". Reason: {reason}" : "";
            string deed = CellText.Width(LedgerText.Deed(entry)) <= width - what ? LedgerText.Deed(entry) : LedgerText.ShortDeed(entry);
            canvas.Write(what, y, CellText.Fit(deed + why, width - what, glyphs.Cut), entry.Reason is null ? Ink.Text : Ink.Warning);
            if (top + y - HeaderRows == ledger.Row)
            {
                canvas.InkRow(y, Ink.Selected);
            }
        }

        if (ledger.RowCount == 0)
        {
            canvas.Write(1, HeaderRows, CellText.Fit(ledger.EntryCount == 0 ? "Nothing was done yet." : "Nothing that was done fits. Esc takes the filter off.", width - 2, glyphs.Cut), Ink.Open);
        }

        return canvas;
    }

    /// <summary>Which row is selected of how many, of what, and in which order.</summary>
    /// <param name="ledger">What is shown.</param>
    /// <param name="campaign">Code of the open campaign.</param>
    /// <returns>The ways to say it, the fullest first.</returns>
    public static IReadOnlyList<string> Caption(LedgerModel ledger, string campaign)
    {
        ArgumentNullException.ThrowIfNull(ledger);
        string rows = ledger.RowCount == 0 ? $"none of {Whole(ledger.EntryCount)} entries shown"
            : ledger.RowCount == ledger.EntryCount ? $"row {Whole(ledger.Row + 1)} of {Whole(ledger.EntryCount)}"
            : $"row {Whole(ledger.Row + 1)} of {Whole(ledger.RowCount)} shown, {Whole(ledger.EntryCount)} in all";
        string of = ledger.IsCampaignOnly ? campaign + " alone" : "whole catalog", first = ledger.IsOldestFirst ? "oldest first" : "newest first";
        return [$"{rows}; {of}, {first}", $"{rows}; {of}", rows];
    }

    private static string Whole(long n) => n.ToString(CultureInfo.InvariantCulture);
}
