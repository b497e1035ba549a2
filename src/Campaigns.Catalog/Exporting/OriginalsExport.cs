using System.Text;
using Campaigns.Catalog.Originals;
using Campaigns.Domain;

namespace Campaigns.Catalog.Exporting;

/// <summary>A loaded file that was written out.</summary>
/// <param name="File">What is kept of it.</param>
/// <param name="Name">Name under which it was written; null where the catalog does not have its bytes.</param>
public sealed record WrittenOriginal(OriginalFile File, string? Name);

/// <summary>Gives the loaded files of a campaign back, byte for byte, each held against the digest that was taken when it was loaded.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class OriginalsExport(Catalog catalog)
{
    /// <summary>Name of the file that lists them.</summary>
    public const string ListName = "originals.csv";

    /// <summary>Writes a folder whole.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="folder">A folder that does not exist, or is empty.</param>
    /// <exception cref="RefusedException">The folder holds something, or cannot be written.</exception>
    /// <exception cref="Ledger.RecordException">The bytes of a file are not those that were loaded; nothing was written.</exception>
    public IReadOnlyList<WrittenOriginal> Write(string code, string folder) => catalog.Snapshot(() =>
    {
        var store = new OriginalStore(catalog);
        var names = new SafeFileNames(ListName);
        WrittenOriginal[] files = [.. store.All(code).Select(f => new WrittenOriginal(f, f.IsKept ? names.For(f.FileName) : null))];
        NewFolder.Write(folder, draft =>
        {
            foreach (WrittenOriginal written in files.Where(f => f.Name is not null))
            {
                using var target = new FileStream(Path.Combine(draft, written.Name!), FileMode.CreateNew);
                store.CopyTo(written.File, target);
            }

            WriteList(files, Path.Combine(draft, ListName));
        });
        return files;
    });

    private static void WriteList(WrittenOriginal[] files, string path)
    {
        using var writer = new StreamWriter(path, append: false, new UTF8Encoding(false)) { NewLine = "\n" };
        var csv = new CsvLine(writer);
        csv.Write("load", "file", "written_as", "sha256", "bytes", "encoding", "separator", "decimal", "columns", "loaded_at");
        foreach ((OriginalFile f, string? name) in files)
        {
            csv.Write(
                CsvLine.Number(f.Number), f.FileName, name ?? "", f.Sha256, CsvLine.Number(f.ByteCount), f.Form?.Encoding ?? "", f.Form?.Separator ?? "",
                f.Form?.DecimalMark ?? "", f.Form?.Columns.Replace('\n', ',') ?? "", CsvLine.Instant(f.LoadedAt));
        }
    }
}
