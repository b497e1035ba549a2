using System.Text;
using System.Xml;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;

namespace Campaigns.App.Figures;

/// <summary>Text in a figure: made safe, measured, cut and wrapped without asking for a font.</summary>
internal static class FigureText
{
    /// <summary>Height of a line, in letter heights.</summary>
    public const double LineHeight = 1.2;

    /// <summary>From the top of a line to the foot of its letters, in letter heights.</summary>
    public const double Ascent = 0.95;

    /// <summary>Fonts that every system has one of; none is loaded.</summary>
    public const string Fonts = "Helvetica, Arial, 'Liberation Sans', 'DejaVu Sans', sans-serif";

    // Some systems answer with a wider font than the first one named.
    private const double Allowance = 1.08;
    private const double BoldAllowance = 1.07;
    private const char Cut = '\u2026';

    // Advance widths of Helvetica in thousandths of the letter height, from the space to the tilde (Adobe Font Metrics of the standard fonts, 1985).
    private static readonly short[] Widths =
    [
        278, 278, 355, 556, 556, 889, 667, 191, 333, 333, 389, 584, 278, 333, 278, 278, 556, 556, 556, 556, 556, 556, 556, 556, 556, 556, 278, 278, 584, 584, 584, 556,
        1015, 667, 667, 722, 722, 667, 611, 778, 722, 278, 500, 667, 556, 833, 722, 778, 667, 778, 722, 667, 611, 722, 667, 944, 667, 667, 611, 278, 278, 278, 469, 556,
        333, 556, 556, 500, 556, 556, 278, 556, 556, 222, 222, 500, 222, 833, 556, 556, 556, 556, 333, 500, 278, 556, 500, 722, 500, 500, 500, 334, 260, 334, 584,
    ];

    /// <summary>Text as a figure shows it: what would be obeyed, would reorder the line, or may not stand in XML, is shown as its code.</summary>
    public static string Safe(string text)
    {
        string safe = SafeText.Escape(text);
        if (safe.All(c => char.IsSurrogate(c) || XmlConvert.IsXmlChar(c)))
        {
            return safe;
        }

        StringBuilder shown = new(safe.Length + 8);
        foreach (char c in safe)
        {
            _ = char.IsSurrogate(c) || XmlConvert.IsXmlChar(c) ? shown.Append(c) : shown.Append(SafeText.CodeOf(c));
        }

        return shown.ToString();
    }

    /// <summary>Escaped for the text and the attributes of XML and of HTML.</summary>
    public static string Xml(string text) => text
        .Replace("&", "&amp;", StringComparison.Ordinal)
        .Replace("<", "&lt;", StringComparison.Ordinal)
        .Replace(">", "&gt;", StringComparison.Ordinal)
        .Replace("\"", "&quot;", StringComparison.Ordinal);

    /// <summary>Width of a line in the units of the drawing.</summary>
    public static double WidthOf(string line, double size, bool isBold = false)
    {
        double sum = 0;
        foreach (Rune rune in line.EnumerateRunes())
        {
            sum += rune.Value is >= ' ' and <= '~' ? Widths[rune.Value - ' '] : CellText.Width(rune.ToString()) switch { 0 => 0, 1 => 600, _ => 1000 };
        }

        return sum / 1000 * size * Allowance * (isBold ? BoldAllowance : 1);
    }

    /// <summary>A line cut to a width, with a mark where something was left out.</summary>
    public static string Fit(string line, double size, double width, bool isBold = false)
    {
        if (WidthOf(line, size, isBold) <= width)
        {
            return line;
        }

        Rune[] runes = [.. line.EnumerateRunes()];
        int kept = runes.Length;
        string cut;
        do
        {
            kept--;
            cut = string.Concat(runes.Take(kept)).TrimEnd() + Cut;
        }
        while (kept > 1 && WidthOf(cut, size, isBold) > width);
        return cut;
    }

    /// <summary>Text broken into lines of a width at most, at blanks; a word longer than a line is cut.</summary>
    public static IReadOnlyList<string> Wrap(string text, double size, double width, bool isBold = false)
    {
        var lines = new List<string>();
        string line = "";
        foreach (string word in text.Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            string longer = line.Length == 0 ? word : $"{line} {word}";
            if (line.Length > 0 && WidthOf(longer, size, isBold) > width)
            {
                lines.Add(Fit(line, size, width, isBold));
                longer = word;
            }

            line = longer;
        }

        lines.Add(Fit(line, size, width, isBold));
        return lines;
    }
}
