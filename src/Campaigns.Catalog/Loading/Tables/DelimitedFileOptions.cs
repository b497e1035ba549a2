namespace Campaigns.Catalog.Loading;

/// <summary>How a delimited text file is read; the default suits a comma, semicolon or tab separated file with decimal points.</summary>
public sealed record DelimitedFileOptions
{
    /// <summary>Separator found from the header line, decimal point, no other column names.</summary>
    public static DelimitedFileOptions Default { get; } = new();

    /// <summary>The character between fields: comma, semicolon or tab; null finds it from the header line.</summary>
    public char? Separator { get; init; }

    /// <summary>The decimal mark of all numbers in the file.</summary>
    public DecimalMark DecimalMark { get; init; } = DecimalMark.Point;

    /// <summary>Other names of columns: from our name to the header of the file.</summary>
    public ColumnMap Columns { get; init; } = ColumnMap.Empty;
}
