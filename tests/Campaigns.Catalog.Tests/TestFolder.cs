namespace Campaigns.Catalog.Tests;

/// <summary>A temporary folder that goes away with its test.</summary>
internal sealed class TestFolder : IDisposable
{
    public string Path { get; } = Directory.CreateTempSubdirectory("campaigns-catalog-").FullName;

    /// <summary>Names of the files in the folder, sorted.</summary>
    public string[] Files => [.. Directory.EnumerateFileSystemEntries(Path).Select(f => System.IO.Path.GetFileName(f)).Order(StringComparer.Ordinal)];

    public string this[string name] => System.IO.Path.Combine(Path, name);

    public void Dispose() => Directory.Delete(Path, recursive: true);
}
