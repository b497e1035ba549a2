using System.Globalization;
using System.Text;

namespace Campaigns.Catalog.Loading;

/// <summary>Foreign text as a message may show it: short, in quotation marks, and without anything that could command a terminal.</summary>
internal static class ShownText
{
    private const int LongestShown = 40;

    /// <summary>UTF-8 text, quoted.</summary>
    public static string Quote(ReadOnlySpan<byte> utf8)
    {
        // Four bytes hold at least one character, so this many are enough for a shortened text.
        bool isCut = utf8.Length > 4 * LongestShown;
        string text = Encoding.UTF8.GetString(isCut ? utf8[..(4 * LongestShown)] : utf8);
        return Quote(isCut ? text + new string(' ', LongestShown) : text);
    }

    /// <summary>The name of a file, whole, without quotation marks.</summary>
    public static string Path(string path) => Quote(path, int.MaxValue)[1..^1];

    /// <summary>Text, quoted.</summary>
    public static string Quote(string text) => Quote(text, LongestShown);

    private static string Quote(string text, int longest)
    {
        StringBuilder shown = new("\"");
        int count = 0;
        foreach (Rune rune in text.EnumerateRunes())
        {
            if (count++ == longest)
            {
                shown.Append('…');
                break;
            }

            UnicodeCategory category = Rune.GetUnicodeCategory(rune);
            if (category is UnicodeCategory.Control or UnicodeCategory.Format or UnicodeCategory.LineSeparator or UnicodeCategory.ParagraphSeparator)
            {
                shown.Append(CultureInfo.InvariantCulture, $"\\u{rune.Value:X4}");
            }
            else
            {
                shown.Append(rune);
            }
        }

        return shown.Append('"').ToString();
    }
}
