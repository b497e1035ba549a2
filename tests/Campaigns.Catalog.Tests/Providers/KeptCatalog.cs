using System.IO.Compression;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Catalog.Tests.Providers;

/// <summary>Catalogs as versions of the program wrote them, kept with the reference data.</summary>
internal static class KeptCatalog
{
    /// <summary>The catalog's name in its folder.</summary>
    public const string Name = "campaigns.db";

    /// <summary>Puts one into a folder of its own.</summary>
    /// <param name="fixture">Its name, for example schema-3.</param>
    public static TestFolder Unpack(string fixture)
    {
        var folder = new TestFolder();
        using var packed = new GZipStream(File.OpenRead(Path.Combine(ReferenceTable.Folder(), "catalog", $"{fixture}.db.gz")), CompressionMode.Decompress);
        using FileStream file = File.Create(folder[Name]);
        packed.CopyTo(file);
        return folder;
    }
}
