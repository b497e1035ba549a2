using Campaigns.App.Figures;

namespace Campaigns.App.Report.Document;

/// <summary>A figure; where it has no picture, its words stand in its place.</summary>
/// <param name="Figure">The figure.</param>
internal sealed record FigureBlock(Figure Figure) : Block
{
    /// <summary>Whether its notes stand below it; false where the text beside it says the same.</summary>
    public bool WithNotes { get; init; } = true;
}
