using System.IO.Compression;
using System.Runtime.CompilerServices;

namespace Campaigns.Torture.Catalogs;

/// <summary>The catalogs that earlier versions of the program wrote, one a schema.</summary>
internal static class Fixture
{
    /// <summary>Packed catalogs, the oldest first.</summary>
    public static string[] All([CallerFilePath] string here = "") =>
        [.. Directory.EnumerateFiles(Path.Combine(Path.GetDirectoryName(here)!, "..", "..", "reference", "catalog"), "schema-*.db.gz").Order(StringComparer.Ordinal)];

    /// <summary>Unpacks one.</summary>
    public static void Unpack(string packed, string path)
    {
        using var from = new GZipStream(File.OpenRead(packed), CompressionMode.Decompress);
        using FileStream to = File.Create(path);
        from.CopyTo(to);
    }
}
