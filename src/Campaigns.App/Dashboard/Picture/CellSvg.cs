using System.Globalization;
using System.Text;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Figures;
using Terminal.Gui.Drawing;

namespace Campaigns.App.Dashboard.Picture;

/// <summary>Writes the cells of a text screen as SVG: every word stands over its cells, and every sign that is no plain letter in the middle of its own, whatever font there is, and colours are dark enough on white to be read and printed.</summary>
internal static class CellSvg
{
    private const double CellWidth = 7.8;
    private const double CellHeight = 16;
    private const double LetterSize = 13;
    private const double Foot = 12;
    private const double Margin = 8;
    private const string Fonts = "'DejaVu Sans Mono', Menlo, Consolas, 'Liberation Mono', monospace";
    private const string Paper = "#ffffff";
    private const string Ink = "#1b1b1b";
    private const string Faint = "#5b5b5b";

    /// <summary>The screen as one svg element.</summary>
    /// <param name="cells">Its cells, by row and column.</param>
    /// <param name="title">What it is.</param>
    /// <param name="description">What it shows.</param>
    public static string Write(Cell[,] cells, string title, string description)
    {
        int rows = cells.GetLength(0), columns = cells.GetLength(1);
        string width = Number((columns * CellWidth) + (2 * Margin)), height = Number((rows * CellHeight) + (2 * Margin));
        StringBuilder svg = new();
        svg.Append(CultureInfo.InvariantCulture, $"<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 {width} {height}\" width=\"{width}\" height=\"{height}\" role=\"img\" aria-labelledby=\"screen-title screen-desc\" font-family=\"{FigureText.Xml(Fonts)}\" font-size=\"{Number(LetterSize)}\" text-anchor=\"middle\">\n")
            .Append(CultureInfo.InvariantCulture, $"<title id=\"screen-title\">{Text(title)}</title>\n<desc id=\"screen-desc\">{Text(description)}</desc>\n<rect width=\"{width}\" height=\"{height}\" fill=\"{Paper}\"/>\n");
        for (int y = 0; y < rows; y++)
        {
            for (int x = 0; x < columns;)
            {
                x = Run(svg, cells, y, x);
            }
        }

        return svg.Append("</svg>\n").ToString();
    }

    /// <summary>Writes the cells from one on that look alike.</summary>
    /// <returns>The first column after them.</returns>
    private static int Run(StringBuilder svg, Cell[,] cells, int y, int start)
    {
        Look look = Look.Of(cells[y, start]);
        List<(string Signs, int Start, int Wide)> words = [];
        int x = start;
        while (x < cells.GetLength(1) && Look.Of(cells[y, x]) == look)
        {
            string sign = cells[y, x].Grapheme;
            int wide = Math.Max(1, CellText.Width(sign));
            if (!string.IsNullOrWhiteSpace(sign))
            {
                // Letters that every fixed-width font has go by words; any other sign may come from another font, and stands alone.
                if (words.Count > 0 && words[^1] is var last && last.Start + last.Wide == x && Ascii.IsValid(sign) && Ascii.IsValid(last.Signs))
                {
                    words[^1] = (last.Signs + sign, last.Start, last.Wide + wide);
                }
                else
                {
                    words.Add((sign, x, wide));
                }
            }

            x += wide;
        }

        double top = Margin + (y * CellHeight);
        if (look.Back != Paper)
        {
            svg.Append(CultureInfo.InvariantCulture, $"<rect x=\"{Number(Margin + (start * CellWidth))}\" y=\"{Number(top)}\" width=\"{Number((x - start) * CellWidth)}\" height=\"{Number(CellHeight)}\" fill=\"{look.Back}\"/>\n");
        }

        foreach ((string signs, int first, int wide) in words)
        {
            // One place for a word, since some programs that draw SVG know no place for every letter.
            string length = Ascii.IsValid(signs) && wide > 1 ? $" textLength=\"{Number(wide * CellWidth)}\"" : "";
            svg.Append(CultureInfo.InvariantCulture, $"<text x=\"{Number(Margin + ((first + (wide / 2.0)) * CellWidth))}\" y=\"{Number(top + Foot)}\"{length} fill=\"{look.Fore}\"{(look.IsBold ? " font-weight=\"bold\"" : "")}{(look.IsUnderlined ? " text-decoration=\"underline\"" : "")}>{Text(signs)}</text>\n");
        }

        return x;
    }

    private static string Text(string text) => FigureText.Xml(FigureText.Safe(text));

    private static string Number(double value) => FigureCanvas.Number(value);

    /// <summary>How a cell looks on paper.</summary>
    private readonly record struct Look(string Fore, string Back, bool IsBold, bool IsUnderlined)
    {
        public static Look Of(Cell cell)
        {
            TextStyle style = cell.Attribute?.Style ?? TextStyle.None;
            string fore = style.HasFlag(TextStyle.Faint) ? Faint : Dark(cell.Attribute?.Foreground);
            return style.HasFlag(TextStyle.Reverse)
                ? new Look(Paper, fore, style.HasFlag(TextStyle.Bold), style.HasFlag(TextStyle.Underline))
                : new Look(fore, Paper, style.HasFlag(TextStyle.Bold), style.HasFlag(TextStyle.Underline));
        }

        /// <summary>A colour of the terminal's sixteen as one that can be read on white.</summary>
        private static string Dark(Color? colour) => colour is not { } given || given == Color.None ? Ink
            : given == Color.Green ? "#1d6b33"
            : given == Color.Cyan ? "#0b6472"
            : given == Color.Red ? "#a3123f"
            : given == Color.Blue ? "#0f4c81"
            : Ink;
    }
}
