using System.Globalization;
using System.Text;
using Campaigns.App.Output;
using Wcwidth;

namespace Campaigns.App.Dashboard.Canvas;

/// <summary>Text measured in the cells of a terminal: a letter takes one, a Chinese character two. Everything is made safe by <see cref="SafeText"/> first.</summary>
public static class CellText
{
    /// <summary>The user-perceived characters of a text with their widths, each 1 or 2; what would be invisible is shown as its code.</summary>
    /// <param name="text">Any text.</param>
    public static IEnumerable<(string Sign, int Width)> Cells(string text)
    {
        string safe = SafeText.Escape(text);
        for (int at = 0; at < safe.Length;)
        {
            int length = safe[at] is >= ' ' and <= '~' && (at + 1 == safe.Length || safe[at + 1] <= '~')
                ? 1
                : StringInfo.GetNextTextElementLength(safe, at);
            string sign = safe.Substring(at, length);
            at += length;
            int width = WidthOf(sign);
            if (width > 0)
            {
                yield return (sign, width);
                continue;
            }

            foreach (char c in string.Concat(sign.EnumerateRunes().Select(r => SafeText.CodeOf(r.Value))))
            {
                yield return (c.ToString(), 1);
            }
        }
    }

    /// <summary>Cells that a text takes.</summary>
    /// <param name="text">Any text.</param>
    public static int Width(string text) => IsPlain(text) ? text.Length : Cells(text).Sum(c => c.Width);

    /// <summary>A text cut to a width, the cut marked.</summary>
    /// <param name="text">Any text.</param>
    /// <param name="width">Cells at hand.</param>
    /// <param name="cut">One-cell sign that stands where text was cut.</param>
    /// <returns>At most <paramref name="width"/> cells, made safe.</returns>
    public static string Fit(string text, int width, string cut)
    {
        if (IsPlain(text))
        {
            return text.Length <= width ? text : width <= 0 ? "" : string.Concat(text.AsSpan(0, width - 1), cut);
        }

        List<(string Sign, int Width)> cells = [.. Cells(text)];
        if (cells.Sum(c => c.Width) <= width)
        {
            return string.Concat(cells.Select(c => c.Sign));
        }

        StringBuilder kept = new();
        int used = 0;
        foreach ((string sign, int w) in cells)
        {
            if (used + w > width - 1)
            {
                break;
            }

            kept.Append(sign);
            used += w;
        }

        return width <= 0 ? "" : kept.Append(cut).ToString();
    }

    /// <summary>Of several ways to say the same the first that fits a width; where none does, the last one, cut.</summary>
    /// <param name="width">Cells at hand.</param>
    /// <param name="cut">One-cell sign that stands where text was cut.</param>
    /// <param name="ways">The ways, the fullest first.</param>
    public static string FirstThatFits(int width, string cut, params IReadOnlyList<string> ways)
    {
        ArgumentNullException.ThrowIfNull(ways);
        return Fit(ways.FirstOrDefault(w => Width(w) <= width) ?? ways[^1], width, cut);
    }

    /// <summary>A text broken at spaces into lines of a width; a longer word is broken anywhere.</summary>
    /// <param name="text">Any text.</param>
    /// <param name="width">Cells of a line, at least 1.</param>
    public static IReadOnlyList<string> Wrap(string text, int width)
    {
        List<string> lines = [];
        StringBuilder line = new();
        int used = 0;
        foreach (string word in text.Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            int w = Width(word);
            if (used > 0 && used + 1 + w > width)
            {
                lines.Add(line.ToString());
                line.Clear();
                used = 0;
            }

            if (used > 0)
            {
                line.Append(' ');
                used++;
            }

            foreach ((string sign, int signWidth) in Cells(word))
            {
                if (used > 0 && used + signWidth > width)
                {
                    lines.Add(line.ToString());
                    line.Clear();
                    used = 0;
                }

                line.Append(sign);
                used += signWidth;
            }
        }

        if (used > 0)
        {
            lines.Add(line.ToString());
        }

        return lines;
    }

    private static bool IsPlain(string text) => !text.AsSpan().ContainsAnyExceptInRange(' ', '~');

    private static int WidthOf(string sign)
    {
        int width = 0;
        foreach (Rune rune in sign.EnumerateRunes())
        {
            width = Math.Max(width, UnicodeCalculator.GetWidth(rune.Value));
        }

        return Math.Min(width, 2);
    }
}
