using System.Text;
using Campaigns.App.Output;

namespace Campaigns.App.Report.Markdown;

/// <summary>Text from files and catalogs as text of a Markdown document: no part of it is ever taken for markup.</summary>
internal static class MarkdownText
{
    /// <summary>The text on one line; a character that would be markup stands behind a backslash, what would reorder or break the line is shown as its code.</summary>
    /// <param name="text">Any text.</param>
    public static string Escape(string text)
    {
        // Blanks before a line could make it a block of code.
        string safe = SafeText.Escape(text).Trim();
        StringBuilder escaped = new(safe.Length + 16);
        for (int i = 0; i < safe.Length; i++)
        {
            if (IsMarkup(safe, i))
            {
                escaped.Append('\\');
            }

            escaped.Append(safe[i]);
        }

        return escaped.ToString();
    }

    /// <summary>Where a reader of Markdown would see more than a character: anywhere in a line, at the beginning of one, or in what it would take for an address.</summary>
    private static bool IsMarkup(string text, int i) => text[i] switch
    {
        '\\' or '`' or '*' or '_' or '[' or ']' or '<' or '>' or '&' or '|' or '~' or '$' or '!' or '^' or '{' or '}' or '@' => true,
        '#' or '+' or '-' or '=' or ':' => i == 0 || IsOnlyBlank(text, i) || (text[i] == ':' && EndsScheme(text, i)) || (text[i] is '=' or '+' && Doubles(text, i)),
        '.' or ')' => IsListNumber(text, i) || IsHost(text, i),
        _ => false,
    };

    /// <summary>A colon between a letter and more of the same word, as in an address, or two of them.</summary>
    private static bool EndsScheme(string text, int i) => i + 1 < text.Length && !char.IsWhiteSpace(text[i + 1]) && (char.IsAsciiLetter(text[i - 1]) || text[i + 1] == ':' || text[i - 1] == ':');

    private static bool IsOnlyBlank(string text, int end) => text.AsSpan(0, end).IsWhiteSpace();

    /// <summary>Two of a kind mark text in some readers.</summary>
    private static bool Doubles(string text, int i) => (i > 0 && text[i - 1] == text[i]) || (i + 1 < text.Length && text[i + 1] == text[i]);

    /// <summary>A number that begins a line, with what would make it an item of a list.</summary>
    private static bool IsListNumber(string text, int i)
    {
        ReadOnlySpan<char> before = text.AsSpan(0, i).TrimStart();
        return before.Length > 0 && before.IndexOfAnyExceptInRange('0', '9') < 0;
    }

    /// <summary>The point of "www.", which some readers take for an address.</summary>
    private static bool IsHost(string text, int i) => text[i] == '.' && i >= 3 && text.AsSpan(i - 3, 3).Equals("www", StringComparison.OrdinalIgnoreCase);
}
