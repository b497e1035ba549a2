namespace Campaigns.Catalog.Originals;

/// <summary>A stretch of a loaded file, compressed on its own.</summary>
/// <param name="Position">Place in the file, from 1.</param>
/// <param name="ByteCount">Bytes of the file in it.</param>
/// <param name="Content">Those bytes, compressed.</param>
internal sealed record OriginalPiece(int Position, int ByteCount, ReadOnlyMemory<byte> Content);
