namespace Campaigns.Catalog.Loading;

/// <summary>The one character that separates the whole part of a typed number from its decimals; a file has one for all its numbers.</summary>
public enum DecimalMark
{
    /// <summary>A point: 1.5.</summary>
    Point,

    /// <summary>A comma: 1,5.</summary>
    Comma,
}
