using System.Text;
using OxyPlot;

namespace Campaigns.App.Figures;

/// <summary>Writes a figure as SVG that stands in a file of its own or inside a page: it scales with its place, loads nothing, and tells in words what it shows.</summary>
public static class FigureSvg
{
    private const double Margin = 8;
    private const double TitleSize = 13;
    private const double NoteSize = 11;
    private const double Gap = 6;

    /// <summary>The figure as one svg element; the same figure gives the same bytes.</summary>
    /// <param name="figure">A figure with a picture.</param>
    /// <param name="idPrefix">What its ids begin with: a letter, then letters, digits, hyphens; different for each figure of a page.</param>
    /// <param name="withWords">Whether the title stands above the plot and the notes below it, as in a file of its own; false for a page that sets both as its own text. Title and description for who cannot see are there in any case.</param>
    /// <returns>The element, without an XML declaration, ending in a line feed.</returns>
    /// <exception cref="ArgumentException">The prefix could not stand in an id.</exception>
    /// <exception cref="InvalidOperationException">The figure has no picture.</exception>
    public static string Write(Figure figure, string idPrefix, bool withWords = true)
    {
        ArgumentNullException.ThrowIfNull(figure);
        if (string.IsNullOrEmpty(idPrefix) || !char.IsAsciiLetter(idPrefix[0]) || !idPrefix.All(c => char.IsAsciiLetterOrDigit(c) || c == '-'))
        {
            throw new ArgumentException("An id prefix is a letter, then letters, digits or hyphens.", nameof(idPrefix));
        }

        if (figure.Plot is not { } plot)
        {
            throw new InvalidOperationException($"The figure '{figure.Key}' has no picture: {figure.Alternative}");
        }

        FigureCanvas canvas = new(idPrefix);
        double across = figure.Width - (2 * Margin);
        double y = withWords ? Lines(canvas, [FigureText.Safe(figure.Title)], Margin, TitleSize, across, isBold: true) + Gap : 0;
        ((IPlotModel)plot).Update(true);
        ((IPlotModel)plot).Render(canvas, new OxyRect(0, y, figure.Width, figure.PlotHeight));
        y += figure.PlotHeight;
        y = withWords && figure.Notes.Count > 0 ? Lines(canvas, figure.Notes.Select(FigureText.Safe), y + Gap, NoteSize, across, isBold: false) + Margin : y;

        string width = FigureCanvas.Number(figure.Width), height = FigureCanvas.Number(Math.Ceiling(y));
        return new StringBuilder(canvas.Elements.Length + 1024)
            .Append("<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 ").Append(width).Append(' ').Append(height).Append("\" width=\"").Append(width).Append("\" height=\"").Append(height)
            .Append("\" role=\"img\" aria-labelledby=\"").Append(idPrefix).Append("-title ").Append(idPrefix).Append("-desc\" font-family=\"").Append(FigureText.Xml(FigureText.Fonts)).Append("\">\n")
            .Append("<title id=\"").Append(idPrefix).Append("-title\">").Append(FigureText.Xml(FigureText.Safe(figure.Title))).Append("</title>\n")
            .Append("<desc id=\"").Append(idPrefix).Append("-desc\">").Append(FigureText.Xml(FigureText.Safe(figure.Alternative))).Append("</desc>\n")
            .Append("<rect width=\"").Append(width).Append("\" height=\"").Append(height).Append("\" fill=\"#ffffff\"/>\n")
            .Append(canvas.Elements).Append("</svg>\n").ToString();
    }

    private static double Lines(FigureCanvas canvas, IEnumerable<string> texts, double y, double size, double width, bool isBold)
    {
        foreach (string line in texts.SelectMany(text => FigureText.Wrap(text, size, width, isBold)))
        {
            canvas.DrawText(new ScreenPoint(Margin, y), line, isBold ? FigureStyle.Text : FigureStyle.Quiet, null, size, isBold ? FontWeights.Bold : FontWeights.Normal, 0, HorizontalAlignment.Left, VerticalAlignment.Top, null);
            y += size * FigureText.LineHeight;
        }

        return y;
    }
}
