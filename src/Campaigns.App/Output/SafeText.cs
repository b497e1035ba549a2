using System.Globalization;
using System.Text;

namespace Campaigns.App.Output;

/// <summary>Makes text from files and catalogs harmless to a terminal and honest to the eye.</summary>
public static class SafeText
{
    /// <summary>Shows every character that a terminal would obey, or that would reorder or break the line, as its code: <c>\u{1B}</c>.</summary>
    /// <param name="text">Any text.</param>
    /// <returns>
    /// The text itself where nothing needs it; otherwise with C0 controls, DEL, C1 controls, line and paragraph separators,
    /// bidirectional controls (Unicode Standard Annex 9, section 2) and lone surrogates written as <c>\u{...}</c>, hexadecimal, at least two digits.
    /// </returns>
    public static string Escape(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        int first = FirstUnsafe(text);
        if (first < 0)
        {
            return text;
        }

        StringBuilder safe = new(text, 0, first, text.Length + 16);
        for (int i = first; i < text.Length; i++)
        {
            if (IsPair(text, i))
            {
                safe.Append(text[i]).Append(text[i + 1]);
                i++;
            }
            else if (IsUnsafe(text[i]))
            {
                safe.Append(CodeOf(text[i]));
            }
            else
            {
                safe.Append(text[i]);
            }
        }

        return safe.ToString();
    }

    /// <summary>The visible code of one character: <c>\u{1B}</c>.</summary>
    /// <param name="codePoint">A Unicode code point, surrogates included.</param>
    public static string CodeOf(int codePoint) => string.Create(CultureInfo.InvariantCulture, $"\\u{{{codePoint:X2}}}");

    private static int FirstUnsafe(string text)
    {
        for (int i = 0; i < text.Length; i++)
        {
            if (IsPair(text, i))
            {
                i++;
            }
            else if (IsUnsafe(text[i]))
            {
                return i;
            }
        }

        return -1;
    }

    private static bool IsPair(string text, int i) => char.IsHighSurrogate(text[i]) && i + 1 < text.Length && char.IsLowSurrogate(text[i + 1]);

    private static bool IsUnsafe(char c) =>
        char.IsControl(c)
        || char.IsSurrogate(c)
        || c is '\u2028' or '\u2029' or '\u061C' or '\u200E' or '\u200F' or (>= '\u202A' and <= '\u202E') or (>= '\u2066' and <= '\u2069');
}
