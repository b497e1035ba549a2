using OxyPlot;
using OxyPlot.Series;

namespace Campaigns.App.Figures;

/// <summary>Marks at points, in a group that bears their name.</summary>
internal sealed class Marks : ScatterSeries
{
    private readonly string _name;

    /// <summary>Makes a series without points.</summary>
    /// <param name="name">What the marks are, for the legend and the group.</param>
    /// <param name="shape">Their shape.</param>
    /// <param name="colour">Their colour.</param>
    /// <param name="isHollow">Whether they are drawn as outlines on white.</param>
    /// <param name="size">Half their width.</param>
    public Marks(string name, MarkerType shape, OxyColor colour, bool isHollow = false, double size = FigureStyle.MarkSize)
    {
        _name = name;
        Title = FigureText.Safe(name);
        MarkerType = shape;
        MarkerSize = size;
        MarkerFill = isHollow ? OxyColors.White : colour;
        MarkerStroke = colour;
        MarkerStrokeThickness = isHollow ? 1.2 : shape is MarkerType.Cross or MarkerType.Plus ? 1.5 : 0.5;
    }

    /// <summary>Adds a mark.</summary>
    public void Add(double x, double y) => Points.Add(new ScatterPoint(x, y));

    /// <inheritdoc/>
    public override void Render(IRenderContext rc)
    {
        FigureCanvas.Open(rc, _name);
        base.Render(rc);
        FigureCanvas.Close(rc);
    }
}

/// <summary>How a line stands in the legend: as it stands in the plot, so that lines differ there in form and not in colour alone.</summary>
internal enum LegendForm
{
    /// <summary>A level line.</summary>
    Level,

    /// <summary>A level line with a short upright one at either end.</summary>
    Capped,

    /// <summary>An upright line.</summary>
    Upright,
}

/// <summary>Lines through points, broken where <see cref="Break"/> was called, in a group that bears their name.</summary>
internal sealed class Strokes : LineSeries
{
    /// <summary>Room between the last cap in the legend and its words.</summary>
    private const double CapGap = 4;

    private readonly string _name;

    /// <summary>Makes a series without points.</summary>
    /// <param name="name">What the lines are, for the legend and the group.</param>
    /// <param name="colour">Their colour.</param>
    /// <param name="thickness">Their width.</param>
    /// <param name="dash">Their dashes.</param>
    public Strokes(string name, OxyColor colour, double thickness = 1.5, LineStyle dash = LineStyle.Solid)
    {
        _name = name;
        Title = FigureText.Safe(name);
        Color = colour;
        StrokeThickness = thickness;
        LineStyle = dash;
        Decimator = null;
        MinimumSegmentLength = 0.5;
    }

    /// <summary>How the line stands in the legend.</summary>
    public LegendForm Form { get; init; }

    /// <inheritdoc/>
    public override void RenderLegend(IRenderContext rc, OxyRect legendBox)
    {
        double x = (legendBox.Left + legendBox.Right) / 2, y = (legendBox.Top + legendBox.Bottom) / 2, half = legendBox.Height * 0.42;
        if (Form == LegendForm.Upright)
        {
            rc.DrawLine([new(x, y - half), new(x, y + half)], Color, StrokeThickness, EdgeRenderingMode, LineStyle.GetDashArray(), LineJoin);
            return;
        }

        if (Form == LegendForm.Level)
        {
            base.RenderLegend(rc, legendBox);
        }
        else
        {
            double cap = half * 0.7, left = legendBox.Left, right = legendBox.Right - CapGap;
            rc.DrawLineSegments([new(left, y), new(right, y), new(left, y - cap), new(left, y + cap), new(right, y - cap), new(right, y + cap)], Color, StrokeThickness, EdgeRenderingMode, null, LineJoin);
        }
    }

    /// <summary>Adds a point.</summary>
    public void Add(double x, double y) => Points.Add(new DataPoint(x, y));

    /// <summary>Ends the line; the next point begins another.</summary>
    public void Break() => Points.Add(DataPoint.Undefined);

    /// <summary>Adds a line of its own between two points.</summary>
    public void Add(double x1, double y1, double x2, double y2)
    {
        Add(x1, y1);
        Add(x2, y2);
        Break();
    }

    /// <inheritdoc/>
    public override void Render(IRenderContext rc)
    {
        FigureCanvas.Open(rc, _name);
        base.Render(rc);
        FigureCanvas.Close(rc);
    }
}
