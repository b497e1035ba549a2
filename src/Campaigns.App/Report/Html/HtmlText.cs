using System.Globalization;
using System.Text;
using Campaigns.App.Output;

namespace Campaigns.App.Report.Html;

/// <summary>Text from files and catalogs as text of a page: no part of it is ever taken for markup, and nothing of it is hidden.</summary>
internal static class HtmlText
{
    private const int LongestWord = 18;

    /// <summary>The text for an element or for an attribute in double quotation marks; what would reorder or break a line is shown as its code.</summary>
    /// <param name="text">Any text.</param>
    public static string Escape(string text)
    {
        string safe = SafeText.Escape(text);
        StringBuilder? escaped = null;
        for (int i = 0; i < safe.Length; i++)
        {
            if (Replacement(safe, ref i, out int start) is not { } replacement)
            {
                escaped?.Append(safe, start, i - start + 1);
                continue;
            }

            escaped ??= new StringBuilder(safe, 0, start, safe.Length + 32);
            escaped.Append(replacement);
        }

        return escaped?.ToString() ?? safe;
    }

    /// <summary>Whether a word of the text is so long that a narrow column cannot hold it.</summary>
    public static bool HasLongWord(string text) => text.Length > LongestWord && text.Split(' ').Any(word => word.Length > LongestWord);

    /// <summary>The text for an element, where a long list of names may be broken between them.</summary>
    public static string Breakable(string text) => HasLongWord(text) ? Escape(text).Replace("|", "|<wbr>", StringComparison.Ordinal) : Escape(text);

    /// <summary>What stands in the place of a character; null where it stands for itself. A pair of surrogates is taken as one.</summary>
    private static string? Replacement(string text, ref int i, out int start)
    {
        start = i;
        int code = text[i];
        if (char.IsHighSurrogate(text[i]) && i + 1 < text.Length && char.IsLowSurrogate(text[i + 1]))
        {
            code = char.ConvertToUtf32(text[i], text[i + 1]);
            i++;
        }

        return code switch
        {
            '&' => "&amp;",
            '<' => "&lt;",
            '>' => "&gt;",
            '"' => "&quot;",
            '\'' => "&#39;",
            // No page may hold these (HTML, section 13.2.3.5).
            _ when (code & 0xFFFE) == 0xFFFE || code is >= 0xFDD0 and <= 0xFDEF => SafeText.CodeOf(code),
            _ => null,
        };
    }

    /// <summary>A whole number.</summary>
    public static string Whole(long value) => value.ToString(CultureInfo.InvariantCulture);
}
