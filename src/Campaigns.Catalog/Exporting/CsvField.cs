namespace Campaigns.Catalog.Exporting;

/// <summary>A field of a line of comma-separated values. Text becomes one by itself and is guarded; what is to stand as it is must say so.</summary>
public readonly struct CsvField
{
    private readonly string? _content;

    private CsvField(string content) => _content = content;

    /// <summary>What stands in the file, before quotation.</summary>
    public string Content => _content ?? "";

    /// <summary>A text; see <see cref="SpreadsheetText"/>.</summary>
    /// <param name="text">The text.</param>
    public static implicit operator CsvField(string text) => FromString(text);

    /// <summary>A text; see <see cref="SpreadsheetText"/>.</summary>
    /// <param name="text">The text.</param>
    public static CsvField FromString(string text) => new(SpreadsheetText.Guarded(text));

    /// <summary>A number, an instant or a word of the program's own, which no spreadsheet takes for a formula.</summary>
    /// <param name="content">What is to stand in the file.</param>
    public static CsvField AsItStands(string content) => new(content);
}
