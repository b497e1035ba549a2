using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Originals;

/// <summary>A loaded file and what is kept of it.</summary>
/// <param name="LoadId">Key of its load.</param>
/// <param name="Number">Place among the campaign's loads, from 1.</param>
/// <param name="FileName">Its name as it was, without its folder.</param>
/// <param name="Sha256">SHA-256 of its bytes, lower-case hexadecimal.</param>
/// <param name="ByteCount">Its size in bytes.</param>
/// <param name="LoadedAt">When it was loaded.</param>
/// <param name="Form">How it was read; null where the bytes are not kept, as of files that earlier versions of the program loaded.</param>
/// <param name="Compression">The word of how its pieces are compressed; null where they are not kept.</param>
public sealed record OriginalFile(long LoadId, int Number, string FileName, string Sha256, long ByteCount, DateTimeOffset LoadedAt, FileForm? Form, string? Compression)
{
    /// <summary>Whether the bytes are kept.</summary>
    public bool IsKept => Form is not null;
}
