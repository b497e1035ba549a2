using OxyPlot;

namespace Campaigns.App.Figures;

/// <summary>One figure: what it is called, what it says in words, and the picture, where there is one.</summary>
/// <param name="Key">Its key, as commands and files name it.</param>
/// <param name="Title">Its title: what is shown, of what.</param>
/// <param name="Alternative">What the figure says, in one to three sentences with numbers, for who cannot see it; where there is no picture, why there is none.</param>
public sealed record Figure(string Key, string Title, string Alternative)
{
    /// <summary>Usual width of a figure, in the units of its drawing; letters are 12 of them high.</summary>
    public const double UsualWidth = 460;

    /// <summary>Usual height of a figure's plot.</summary>
    public const double UsualHeight = 300;

    /// <summary>The plot; null where the data have no picture, which <see cref="Alternative"/> then explains.</summary>
    public PlotModel? Plot { get; init; }

    /// <summary>What stands in small letters below the plot: the procedure, what it assumes, and what was thinned out.</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];

    /// <summary>Width of the drawing, in its own units.</summary>
    public double Width { get; init; } = UsualWidth;

    /// <summary>Height of the plot with its axes and legend, in the same units; title and notes come on top of it.</summary>
    public double PlotHeight { get; init; } = UsualHeight;

    /// <summary>Whether there is something to draw.</summary>
    public bool HasPicture => Plot is not null;
}
