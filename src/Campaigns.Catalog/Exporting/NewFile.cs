using System.Text;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes a text file whole: it is made under another name beside its place and moved there when it is finished, so that at every moment there is the old file or the new one.</summary>
public static class NewFile
{
    private const string Purpose = "new";

    /// <summary>Makes the file, as UTF-8 with line feeds.</summary>
    /// <param name="catalog">The open catalog, which is never written over.</param>
    /// <param name="path">The file.</param>
    /// <param name="replace">Whether it may take the place of a file that is there.</param>
    /// <param name="fill">Writes what is in it.</param>
    /// <returns>Its size in bytes.</returns>
    /// <exception cref="RefusedException">Something is there already, or the file cannot be written; nothing is left behind.</exception>
    public static long Write(Catalog catalog, string path, bool replace, Action<TextWriter> fill)
    {
        ArgumentNullException.ThrowIfNull(catalog);
        ArgumentNullException.ThrowIfNull(path);
        ArgumentNullException.ThrowIfNull(fill);
        Refuse(catalog, path, replace);
        DraftFiles.RemoveAbandoned(path);
        string draft = DraftFiles.Name(path, Purpose);
        try
        {
            using (var writer = new StreamWriter(draft, append: false, new UTF8Encoding(encoderShouldEmitUTF8Identifier: false), 1 << 16) { NewLine = "\n" })
            {
                fill(writer);
            }

            long bytes = new FileInfo(draft).Length;
            DraftFiles.Place(draft, path, replace);
            return bytes;
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new RefusedException($"The file '{path}' cannot be written: {FileTrouble.Reason(error, draft, path)} Nothing was written.");
        }
        finally
        {
            DraftFiles.Remove(draft);
        }
    }

    private static void Refuse(Catalog catalog, string path, bool replace)
    {
        if (Directory.Exists(path))
        {
            throw new RefusedException($"'{path}' is a folder; name a file.");
        }

        if (!Directory.Exists(Path.GetDirectoryName(Path.GetFullPath(path))))
        {
            throw new RefusedException($"The file '{path}' cannot be written: its folder is not there. Make the folder, or name another.");
        }

        if (RealPath(path) == RealPath(catalog.Path))
        {
            throw new RefusedException($"'{path}' is the catalog itself; name another file.");
        }

        if (!replace && (File.Exists(path) || new FileInfo(path).LinkTarget is not null))
        {
            throw new RefusedException($"'{path}' exists; nothing was written. Name another file, or write over it with --replace.");
        }
    }

    private static string RealPath(string path)
    {
        string full = Path.GetFullPath(path);
        return File.Exists(full) ? File.ResolveLinkTarget(full, returnFinalTarget: true)?.FullName ?? full : full;
    }
}
