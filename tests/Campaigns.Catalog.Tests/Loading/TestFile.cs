using System.Text;

namespace Campaigns.Catalog.Tests.Loading;

/// <summary>A file for one test, in a folder of its own that goes away with it.</summary>
internal sealed class TestFile : IDisposable
{
    public TestFile(byte[] content, string name = "data.csv")
    {
        Folder = Directory.CreateTempSubdirectory("campaigns-loading-").FullName;
        Path = System.IO.Path.Combine(Folder, name);
        File.WriteAllBytes(Path, content);
    }

    public TestFile(string content, string name = "data.csv")
        : this(Encoding.UTF8.GetBytes(content), name)
    {
    }

    public string Folder { get; }

    public string Path { get; }

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
