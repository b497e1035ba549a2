using System.Security.Cryptography;

namespace Campaigns.Catalog.Loading;

/// <summary>What identifies the content of a file: its SHA-256 and its size.</summary>
/// <param name="Hex">The SHA-256 of all bytes, 64 lower-case hexadecimal digits.</param>
/// <param name="Size">Bytes.</param>
public sealed record FileDigest(string Hex, long Size)
{
    /// <summary>Reads a file once, in pieces, and digests it.</summary>
    /// <param name="path">The file.</param>
    /// <exception cref="LoadingException">The file is not there or cannot be read.</exception>
    public static FileDigest Sha256(string path)
    {
        using Stream file = FileOpening.Open(path);
        using IncrementalHash hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        byte[] buffer = new byte[1 << 18];
        long size = 0;
        try
        {
            for (int count = file.Read(buffer); count > 0; count = file.Read(buffer))
            {
                hash.AppendData(buffer, 0, count);
                size += count;
            }
        }
        catch (Exception e) when (FileOpening.IsOfTheWorld(e))
        {
            throw FileOpening.Explain(path, e);
        }

        return new FileDigest(Convert.ToHexStringLower(hash.GetHashAndReset()), size);
    }
}
