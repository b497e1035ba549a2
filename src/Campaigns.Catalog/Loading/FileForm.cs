namespace Campaigns.Catalog.Loading;

/// <summary>How the text of a file was read, in words.</summary>
/// <param name="Encoding">"utf-8", "utf-8 with mark", "utf-16le" or "utf-16be".</param>
/// <param name="Separator">"comma", "semicolon" or "tab".</param>
/// <param name="DecimalMark">"point" or "comma".</param>
/// <param name="Columns">A line for each of our columns that was found: NAME=HEADER.</param>
public sealed record FileForm(string Encoding, string Separator, string DecimalMark, string Columns)
{
    /// <summary>Of a file without a readable header.</summary>
    public static FileForm Unknown { get; } = new("", "", "", "");

    internal static FileForm Of(DelimitedFile file, DecimalMark mark, ColumnFinder columns) => new(
        file.Encoding switch
        {
            SourceKind.Utf16Little => "utf-16le",
            SourceKind.Utf16Big => "utf-16be",
            _ => file.HasMark ? "utf-8 with mark" : "utf-8",
        },
        file.Separator switch { ';' => "semicolon", '\t' => "tab", _ => "comma" },
        mark == Loading.DecimalMark.Comma ? "comma" : "point",
        string.Join('\n', columns.Found));
}
