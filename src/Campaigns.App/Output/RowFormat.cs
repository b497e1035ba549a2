namespace Campaigns.App.Output;

/// <summary>How rows are written.</summary>
internal enum RowFormat
{
    /// <summary>Aligned columns for people.</summary>
    Table,

    /// <summary>RFC 4180, UTF-8, lines ended by a line feed, numbers that read back as the same double.</summary>
    Csv,

    /// <summary>One array of objects, RFC 8259.</summary>
    Json,
}
