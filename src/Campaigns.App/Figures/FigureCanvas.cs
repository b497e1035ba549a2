using System.Globalization;
using System.Text;
using OxyPlot;

namespace Campaigns.App.Figures;

/// <summary>Takes what the plotting library draws and writes it as elements of SVG: text stays text, many marks of one kind become one path, and every number has two decimals at most.</summary>
/// <param name="idPrefix">What the ids of this figure begin with, so that many stand in one page.</param>
internal sealed class FigureCanvas(string idPrefix) : ClippingRenderContext
{
    private const double Farthest = 1e5;
    private readonly StringBuilder _svg = new();
    private int _clips;

    /// <summary>What was written so far.</summary>
    public string Elements => _svg.ToString();

    /// <summary>Opens a group that bears the name of what is drawn in it.</summary>
    /// <param name="context">Where a series draws; groups are written only on a canvas of ours.</param>
    /// <param name="name">The name; not shown.</param>
    public static void Open(IRenderContext context, string name)
    {
        if (context is FigureCanvas canvas)
        {
            canvas._svg.Append("<g data-series=\"").Append(FigureText.Xml(name)).Append("\">\n");
        }
    }

    /// <summary>Closes that group.</summary>
    public static void Close(IRenderContext context)
    {
        if (context is FigureCanvas canvas)
        {
            canvas._svg.Append("</g>\n");
        }
    }

    /// <inheritdoc/>
    public override void DrawEllipse(OxyRect extents, OxyColor fill, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode) =>
        DrawEllipses([extents], fill, stroke, thickness, edgeRenderingMode);

    /// <inheritdoc/>
    public override void DrawEllipses(IList<OxyRect> extents, OxyColor fill, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode)
    {
        StringBuilder path = new();
        foreach (OxyRect r in extents)
        {
            string radii = $"{Number(r.Width / 2)} {Number(r.Height / 2)}", across = Number(r.Width);
            path.Append('M').Append(Number(r.Left)).Append(' ').Append(Number((r.Top + r.Bottom) / 2))
                .Append('a').Append(radii).Append(" 0 1 0 ").Append(across).Append(" 0a").Append(radii).Append(" 0 1 0 -").Append(across).Append(" 0z");
        }

        Path(path, fill, stroke, thickness, null, LineJoin.Miter);
    }

    /// <inheritdoc/>
    public override void DrawLine(IList<ScreenPoint> points, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode, double[]? dashArray, LineJoin lineJoin)
    {
        StringBuilder path = new();
        Append(path, points, isClosed: false);
        Path(path, OxyColors.Undefined, stroke, thickness, dashArray, lineJoin);
    }

    /// <inheritdoc/>
    public override void DrawLineSegments(IList<ScreenPoint> points, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode, double[]? dashArray, LineJoin lineJoin)
    {
        StringBuilder path = new();
        for (int i = 0; i + 1 < points.Count; i += 2)
        {
            Append(path, [points[i], points[i + 1]], isClosed: false);
        }

        Path(path, OxyColors.Undefined, stroke, thickness, dashArray, lineJoin);
    }

    /// <inheritdoc/>
    public override void DrawPolygon(IList<ScreenPoint> points, OxyColor fill, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode, double[]? dashArray, LineJoin lineJoin) =>
        DrawPolygons([points], fill, stroke, thickness, edgeRenderingMode, dashArray, lineJoin);

    /// <inheritdoc/>
    public override void DrawPolygons(IList<IList<ScreenPoint>> polygons, OxyColor fill, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode, double[]? dashArray, LineJoin lineJoin)
    {
        StringBuilder path = new();
        foreach (IList<ScreenPoint> polygon in polygons)
        {
            Append(path, polygon, isClosed: true);
        }

        Path(path, fill, stroke, thickness, dashArray, lineJoin);
    }

    /// <inheritdoc/>
    public override void DrawRectangle(OxyRect rectangle, OxyColor fill, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode) =>
        DrawRectangles([rectangle], fill, stroke, thickness, edgeRenderingMode);

    /// <inheritdoc/>
    public override void DrawRectangles(IList<OxyRect> rectangles, OxyColor fill, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode)
    {
        StringBuilder path = new();
        foreach (OxyRect r in rectangles)
        {
            path.Append('M').Append(Number(r.Left)).Append(' ').Append(Number(r.Top)).Append('h').Append(Number(r.Width)).Append('v').Append(Number(r.Height)).Append('h').Append(Number(-r.Width)).Append('z');
        }

        Path(path, fill, stroke, thickness, null, LineJoin.Miter);
    }

    /// <inheritdoc/>
    public override void DrawText(ScreenPoint p, string text, OxyColor fill, string? fontFamily, double fontSize, double fontWeight, double rotation, HorizontalAlignment horizontalAlignment, VerticalAlignment verticalAlignment, OxySize? maxSize)
    {
        if (string.IsNullOrEmpty(text) || !fill.IsVisible())
        {
            return;
        }

        string anchor = horizontalAlignment switch { HorizontalAlignment.Left => "start", HorizontalAlignment.Right => "end", _ => "middle" };
        string[] lines = text.Split('\n');
        double line = fontSize * FigureText.LineHeight;
        double top = verticalAlignment switch { VerticalAlignment.Top => p.Y, VerticalAlignment.Bottom => p.Y - (line * lines.Length), _ => p.Y - (line * lines.Length / 2) };
        for (int i = 0; i < lines.Length; i++)
        {
            double foot = top + (line * i) + (FigureText.Ascent * fontSize);
            _svg.Append("<text x=\"").Append(Number(p.X)).Append("\" y=\"").Append(Number(foot)).Append("\" font-size=\"").Append(Number(fontSize)).Append("\" fill=\"").Append(Colour(fill)).Append('"');
            _ = anchor != "start" ? _svg.Append(" text-anchor=\"").Append(anchor).Append('"') : _svg;
            _ = fontWeight > FontWeights.Normal ? _svg.Append(" font-weight=\"bold\"") : _svg;
            _ = rotation != 0 ? _svg.Append(" transform=\"rotate(").Append(Number(rotation)).Append(' ').Append(Number(p.X)).Append(' ').Append(Number(p.Y)).Append(")\"") : _svg;
            _svg.Append('>').Append(FigureText.Xml(FigureText.Safe(lines[i]))).Append("</text>\n");
        }
    }

    /// <inheritdoc/>
    public override OxySize MeasureText(string text, string? fontFamily, double fontSize, double fontWeight)
    {
        if (string.IsNullOrEmpty(text))
        {
            return OxySize.Empty;
        }

        string[] lines = text.Split('\n');
        bool isBold = fontWeight > FontWeights.Normal;
        return new OxySize(lines.Max(l => FigureText.WidthOf(FigureText.Safe(l), fontSize, isBold)), lines.Length * fontSize * FigureText.LineHeight);
    }

    /// <inheritdoc/>
    protected override void SetClip(OxyRect clippingRectangle)
    {
        _clips++;
        string id = string.Create(CultureInfo.InvariantCulture, $"{idPrefix}-clip{_clips}");
        _svg.Append("<clipPath id=\"").Append(id).Append("\"><rect x=\"").Append(Number(clippingRectangle.Left)).Append("\" y=\"").Append(Number(clippingRectangle.Top))
            .Append("\" width=\"").Append(Number(clippingRectangle.Width)).Append("\" height=\"").Append(Number(clippingRectangle.Height)).Append("\"/></clipPath>\n<g clip-path=\"url(#").Append(id).Append(")\">\n");
    }

    /// <inheritdoc/>
    protected override void ResetClip() => _svg.Append("</g>\n");

    /// <summary>A coordinate or length: two decimals at most, never a number that a reader would refuse.</summary>
    public static string Number(double value)
    {
        double rounded = Math.Round(Math.Clamp(double.IsNaN(value) ? 0 : value, -Farthest, Farthest), 2);
        return (rounded == 0 ? 0 : rounded).ToString("0.##", CultureInfo.InvariantCulture);
    }

    private static string Colour(OxyColor colour) => string.Create(CultureInfo.InvariantCulture, $"#{colour.R:x2}{colour.G:x2}{colour.B:x2}");

    private static void Append(StringBuilder path, IList<ScreenPoint> points, bool isClosed)
    {
        for (int i = 0; i < points.Count; i++)
        {
            path.Append(i == 0 ? 'M' : 'L').Append(Number(points[i].X)).Append(' ').Append(Number(points[i].Y));
        }

        _ = isClosed && points.Count > 0 ? path.Append('z') : path;
    }

    private void Path(StringBuilder path, OxyColor fill, OxyColor stroke, double thickness, double[]? dashes, LineJoin join)
    {
        bool isStroked = stroke.IsVisible() && thickness > 0;
        if (path.Length == 0 || (!isStroked && !fill.IsVisible()))
        {
            return;
        }

        _svg.Append("<path d=\"").Append(path).Append("\" fill=\"").Append(fill.IsVisible() ? Colour(fill) : "none").Append('"');
        _ = fill.IsVisible() && fill.A < byte.MaxValue ? _svg.Append(" fill-opacity=\"").Append(Number(fill.A / 255.0)).Append('"') : _svg;
        if (isStroked)
        {
            _svg.Append(" stroke=\"").Append(Colour(stroke)).Append("\" stroke-width=\"").Append(Number(thickness)).Append('"');
            _ = stroke.A < byte.MaxValue ? _svg.Append(" stroke-opacity=\"").Append(Number(stroke.A / 255.0)).Append('"') : _svg;
            _ = join == LineJoin.Round ? _svg.Append(" stroke-linejoin=\"round\"") : _svg;
            if (dashes is { Length: > 0 })
            {
                // The library counts dashes in line widths.
                _svg.Append(" stroke-dasharray=\"").AppendJoin(' ', dashes.Select(d => Number(d * thickness))).Append('"');
            }
        }

        _svg.Append("/>\n");
    }
}
