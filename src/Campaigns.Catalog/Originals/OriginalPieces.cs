using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Originals;

/// <summary>Stores the pieces of one file as they come, inside the transaction of its load.</summary>
internal sealed class OriginalPieces : IDisposable
{
    private readonly Catalog _catalog;
    private readonly long _loadId;
    private readonly SqliteStatement _insert;
    private int _count;

    /// <param name="catalog">The open catalog.</param>
    /// <param name="loadId">Key of the load.</param>
    public OriginalPieces(Catalog catalog, long loadId)
    {
        _catalog = catalog;
        _loadId = loadId;
        _insert = catalog.Prepare("INSERT INTO original_pieces (load_id, position, byte_count, content) VALUES (?1, ?2, ?3, ?4)");
    }

    /// <summary>Stores the next piece.</summary>
    public void Add(OriginalPiece piece)
    {
        _insert.Bind(1, _loadId).Bind(2, (long)piece.Position).Bind(3, (long)piece.ByteCount).BindBlob(4, piece.Content.Span).Run();
        _count++;
    }

    /// <summary>Says how the file was read, after its last piece.</summary>
    public void Finish(FileForm form)
    {
        using SqliteStatement insert = _catalog.Prepare(
            "INSERT INTO originals (load_id, encoding, separator, decimal_mark, columns, compression, piece_count) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7)");
        insert.Bind(1, _loadId).Bind(2, form.Encoding).Bind(3, form.Separator).Bind(4, form.DecimalMark).Bind(5, form.Columns)
            .Bind(6, PieceCompression.Word).Bind(7, (long)_count).Run();
    }

    public void Dispose() => _insert.Dispose();
}
