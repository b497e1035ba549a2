using OxyPlot;
using OxyPlot.Legends;
using OxyPlot.Series;

namespace Campaigns.App.Figures;

/// <summary>Colours, lines and letter sizes of all figures. What differs in colour differs in shape or dash too, and every colour is dark enough on white to be read and printed.</summary>
internal static class FigureStyle
{
    /// <summary>Letter height of axes and legends.</summary>
    public const double LetterSize = 12;

    /// <summary>Half the width of a usual mark.</summary>
    public const double MarkSize = 3.2;

    /// <summary>Titles and names.</summary>
    public static readonly OxyColor Text = OxyColor.FromRgb(0x1b, 0x1b, 0x1b);

    /// <summary>Notes and ticks.</summary>
    public static readonly OxyColor Quiet = OxyColor.FromRgb(0x4d, 0x4d, 0x4d);

    /// <summary>Axis lines, and lines at 0.</summary>
    public static readonly OxyColor Axis = OxyColor.FromRgb(0x70, 0x70, 0x70);

    /// <summary>Lines that lead the eye from a tick across the plot.</summary>
    public static readonly OxyColor Grid = OxyColor.FromRgb(0xe3, 0xe3, 0xe3);

    /// <summary>What survives: diamonds.</summary>
    public static readonly OxyColor Survivor = OxyColor.FromRgb(0x0f, 0x4c, 0x81);

    /// <summary>What does not survive: open circles; and single values.</summary>
    public static readonly OxyColor Other = OxyColor.FromRgb(0x6a, 0x6a, 0x62);

    /// <summary>The control: squares.</summary>
    public static readonly OxyColor Control = OxyColor.FromRgb(0x8f, 0x4a, 0x08);

    /// <summary>The boundary of the sealed correction.</summary>
    public static readonly OxyColor Boundary = OxyColor.FromRgb(0xa3, 0x12, 0x3f);

    /// <summary>A second line beside it.</summary>
    public static readonly OxyColor Second = OxyColor.FromRgb(0x2b, 0x6a, 0x3d);

    /// <summary>A third one.</summary>
    public static readonly OxyColor Third = OxyColor.FromRgb(0x6b, 0x3f, 0x87);

    /// <summary>Areas behind lines.</summary>
    public static readonly OxyColor Area = OxyColor.FromRgb(0xd5, 0xe0, 0xea);

    /// <summary>An empty plot in our letters, without a border of its own: the axes draw the lines that are needed.</summary>
    public static PlotModel NewPlot() => new()
    {
        DefaultFont = "inherit",
        DefaultFontSize = LetterSize,
        TextColor = Text,
        PlotAreaBorderThickness = new OxyThickness(0),
        Padding = new OxyThickness(8, 6, 14, 6),
        Culture = System.Globalization.CultureInfo.InvariantCulture,
        IsLegendVisible = true,
    };

    /// <summary>Adds the series that have points, one over the other in this order, and a legend of those that are named there.</summary>
    /// <param name="plot">The plot.</param>
    /// <param name="series">Its series.</param>
    public static void Draw(PlotModel plot, params ReadOnlySpan<Series> series)
    {
        foreach (Series one in series)
        {
            if (one is not (ScatterSeries { Points.Count: 0 } or LineSeries { Points.Count: 0 }))
            {
                plot.Series.Add(one);
            }
        }

        plot.Legends.Add(NewLegend());
    }

    /// <summary>A legend below the plot, its entries side by side.</summary>
    private static Legend NewLegend() => new()
    {
        LegendPlacement = LegendPlacement.Outside,
        LegendPosition = LegendPosition.BottomCenter,
        LegendOrientation = LegendOrientation.Horizontal,
        LegendBorderThickness = 0,
        LegendPadding = 2,
        LegendMargin = 4,
        LegendSymbolLength = 22,
        LegendItemSpacing = 18,
        LegendFontSize = LetterSize,
        LegendTextColor = Text,
        AllowUseFullExtent = true,
    };
}
