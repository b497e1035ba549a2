namespace Campaigns.Catalog.Loading;

/// <summary>What the first bytes of a file say of its form.</summary>
internal enum SourceKind
{
    /// <summary>UTF-8, with or without its mark.</summary>
    Utf8,

    /// <summary>UTF-16, low byte first, with its mark.</summary>
    Utf16Little,

    /// <summary>UTF-16, high byte first, with its mark.</summary>
    Utf16Big,

    /// <summary>Every other byte is NUL, and there is no mark.</summary>
    Utf16Unmarked,

    /// <summary>A ZIP archive, which spreadsheet workbooks are.</summary>
    Workbook,
}
