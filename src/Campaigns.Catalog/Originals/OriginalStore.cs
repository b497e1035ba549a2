using System.Globalization;
using System.Security.Cryptography;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Originals;

/// <summary>Reads the bytes of loaded files back as they were.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class OriginalStore(Catalog catalog)
{
    /// <summary>The files of a campaign in the order in which they were loaded, kept or not.</summary>
    /// <param name="code">The campaign.</param>
    public IReadOnlyList<OriginalFile> All(string code)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT l.id, l.file_name, l.sha256, l.byte_count, l.loaded_at, o.encoding, o.separator, o.decimal_mark, o.columns, o.compression
            FROM loads l LEFT JOIN originals o ON o.load_id = l.id WHERE l.campaign_id = ?1 ORDER BY l.id
            """);
        select.Bind(1, new CampaignStore(catalog).Get(code).Id);
        var files = new List<OriginalFile>();
        while (select.Read())
        {
            FileForm? form = select.IsNull(5) ? null : new FileForm(select.Text(5), select.Text(6), select.Text(7), select.Text(8));
            files.Add(new OriginalFile(select.Integer(0), files.Count + 1, select.Text(1), select.Text(2), select.Integer(3), Instants.FromMicroseconds(select.Integer(4)), form, select.NullableText(9)));
        }

        return files;
    }

    /// <summary>Writes the bytes of a kept file, piece by piece, and holds them against the digest that was taken when it was loaded. O(bytes), memory of one piece.</summary>
    /// <param name="file">Which.</param>
    /// <param name="target">Where to; holds damaged bytes where the exception comes.</param>
    /// <exception cref="RecordException">What is kept is not what was loaded: the catalog is damaged or was changed by hand.</exception>
    /// <exception cref="CatalogException">It is kept in a way that this version does not read.</exception>
    public void CopyTo(OriginalFile file, Stream target)
    {
        ArgumentNullException.ThrowIfNull(file);
        ArgumentNullException.ThrowIfNull(target);
        if (file.Compression != PieceCompression.Word)
        {
            throw new CatalogException($"The bytes of '{file.FileName}' are not kept in a way that this version of the program reads ({file.Compression ?? "none"}); use the one that loaded the file.");
        }

        using SqliteStatement select = catalog.Prepare("SELECT position, byte_count, content FROM original_pieces WHERE load_id = ?1 ORDER BY position");
        select.Bind(1, file.LoadId);
        using IncrementalHash hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        byte[] buffer = [];
        long size = 0;
        while (select.Read())
        {
            long count = select.Integer(1);
            if (count is < 1 or > OriginalTap.PieceSize)
            {
                throw Damaged(file);
            }

            if (buffer.Length < count)
            {
                buffer = new byte[count];
            }

            Span<byte> bytes = buffer.AsSpan(0, (int)count);
            if (!PieceCompression.TryExpand(select.Blob(2), bytes))
            {
                throw Damaged(file);
            }

            hash.AppendData(bytes);
            target.Write(bytes);
            size += count;
        }

        if (size != file.ByteCount || Convert.ToHexStringLower(hash.GetHashAndReset()) != file.Sha256)
        {
            throw Damaged(file);
        }
    }

    private RecordException Damaged(OriginalFile file) => new(string.Create(
        CultureInfo.InvariantCulture,
        $"The bytes of '{file.FileName}' (load {file.Number}) in the catalog '{catalog.Path}' are not those that were loaded: its SHA-256 does not match. Restore the catalog from a copy."));
}
