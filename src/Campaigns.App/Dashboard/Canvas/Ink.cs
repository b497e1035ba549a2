namespace Campaigns.App.Dashboard.Canvas;

/// <summary>What a cell of a canvas means. The screen chooses the colour, and no meaning rests on colour alone.</summary>
public enum Ink
{
    /// <summary>Ordinary text.</summary>
    Text,

    /// <summary>Less important text.</summary>
    Quiet,

    /// <summary>A heading or a column's name.</summary>
    Heading,

    /// <summary>The header bar and the bar of keys.</summary>
    Bar,

    /// <summary>The name of a key.</summary>
    KeyName,

    /// <summary>The row that the keys act on.</summary>
    Selected,

    /// <summary>Something that survives the correction.</summary>
    Survivor,

    /// <summary>Something without a result.</summary>
    Open,

    /// <summary>The boundary of the correction.</summary>
    Boundary,

    /// <summary>Axes, frames and tick labels.</summary>
    Axis,

    /// <summary>A mean with its interval.</summary>
    Mean,

    /// <summary>Something to look at: a problem, an amendment, a review that is behind.</summary>
    Warning,
}
