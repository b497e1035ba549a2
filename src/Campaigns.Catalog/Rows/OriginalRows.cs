namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table originals: how the bytes of a loaded file are kept, and how they were read.</summary>
public sealed class OriginalRow
{
    /// <summary>The load.</summary>
    public long LoadId { get; set; }

    /// <summary>The encoding that was found, for example "utf-8".</summary>
    public string Encoding { get; set; } = "";

    /// <summary>What parted the columns: comma, semicolon or tab.</summary>
    public string Separator { get; set; } = "";

    /// <summary>The decimal mark: point or comma.</summary>
    public string DecimalMark { get; set; } = "";

    /// <summary>Which header was taken for which column, as NAME=HEADER lines.</summary>
    public string Columns { get; set; } = "";

    /// <summary>How each piece is compressed, for example "brotli".</summary>
    public string Compression { get; set; } = "";

    /// <summary>Pieces.</summary>
    public int PieceCount { get; set; }
}

/// <summary>A line of the table original_pieces: a stretch of a loaded file, compressed on its own.</summary>
public sealed class OriginalPieceRow
{
    /// <summary>The load.</summary>
    public long LoadId { get; set; }

    /// <summary>Place in the file, from 1.</summary>
    public int Position { get; set; }

    /// <summary>Bytes of the file in this piece.</summary>
    public int ByteCount { get; set; }

    /// <summary>Those bytes, compressed.</summary>
    public byte[] Content { get; set; } = [];
}
