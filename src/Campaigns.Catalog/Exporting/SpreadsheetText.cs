using System.Text;

namespace Campaigns.Catalog.Exporting;

/// <summary>Keeps text in files from being taken for a formula by a spreadsheet that opens them.</summary>
/// <remarks>
/// A text whose first character, after blanks and quotation marks, is one of = + - @ or its full-width form, or that begins with a tab or a line break,
/// gets an apostrophe before it, which spreadsheets do not show as part of a value. A text that has apostrophes before such a start gets one more, so that
/// taking one off gives back every text as it was. Numbers are no text and stay as they are.
/// </remarks>
public static class SpreadsheetText
{
    private const char Guard = '\'';

    /// <summary>The text as it stands in a file for people.</summary>
    /// <param name="text">Any text.</param>
    public static string Guarded(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        return text.Length > 0 && !char.IsAsciiLetterOrDigit(text[0]) && NeedsGuard(text) ? Guard + text : text;
    }

    /// <summary>The text as it was before it was guarded; one that is not guarded stays as it is.</summary>
    /// <param name="text">A cell of a file.</param>
    public static string Restored(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        return IsGuarded(text) ? text[1..] : text;
    }

    /// <summary>Takes the guard off a cell in UTF-8.</summary>
    /// <param name="text">A cell of a file.</param>
    public static ReadOnlySpan<byte> Restored(ReadOnlySpan<byte> text) =>
        !text.IsEmpty && text[0] == (byte)Guard && IsGuarded(Encoding.UTF8.GetString(text)) ? text[1..] : text;

    private static bool IsGuarded(string text) => text.Length > 1 && text[0] == Guard && NeedsGuard(text);

    /// <summary>Whether the text behind any apostrophes could start a formula.</summary>
    private static bool NeedsGuard(ReadOnlySpan<char> text)
    {
        text = text.TrimStart(Guard);
        if (!text.IsEmpty && text[0] is '\t' or '\r' or '\n')
        {
            return true;
        }

        foreach (char c in text)
        {
            if (!char.IsWhiteSpace(c) && !IsQuotation(c))
            {
                return c is '=' or '+' or '-' or '@' or '\uFF1D' or '\uFF0B' or '\uFF0D' or '\uFF20';
            }
        }

        return false;
    }

    private static bool IsQuotation(char c) => c is '"' or '\u201C' or '\u201D' or '\u201E' or '\uFEFF' or '\u200B';
}
