using System.Text;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes a file whole: it is made under another name beside its place and moved there when it is finished, so that nobody ever finds half of it.</summary>
public static class NewFile
{
    private const string Purpose = "new";
    private static readonly string[] Beside = ["-journal", "-wal", "-shm"];

    /// <summary>Writes text about a catalog, which itself is never written over.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="file">The file's name.</param>
    /// <param name="force">Whether it may take the place of a file that is there.</param>
    /// <param name="write">Writes the text.</param>
    /// <exception cref="RefusedException">As below, or the file is the catalog.</exception>
    public static void Write(Catalog catalog, string file, bool force, Action<TextWriter> write)
    {
        Demand(catalog, file, force);
        Write(file, force, write);
    }

    /// <summary>Looks, before anything is written, whether text about a catalog may go into a file.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="file">The file's name.</param>
    /// <param name="force">Whether it may take the place of a file that is there.</param>
    /// <exception cref="RefusedException">It is the catalog or a folder, or something is there already.</exception>
    public static void Demand(Catalog catalog, string file, bool force)
    {
        ArgumentNullException.ThrowIfNull(catalog);
        ArgumentNullException.ThrowIfNull(file);
        if (RealPath(file) == RealPath(catalog.Path))
        {
            throw new RefusedException($"'{file}' is the catalog itself; name another file.");
        }

        // A journal left by a program that was killed holds what the catalog is put right with.
        if (Beside.Any(ending => RealPath(file) == RealPath(catalog.Path) + ending))
        {
            throw new RefusedException($"'{file}' is the name of a file that belongs to the catalog; name another file.");
        }

        Demand(file, force);
    }

    /// <summary>Writes text as UTF-8 without a byte-order mark.</summary>
    /// <param name="file">The file's name.</param>
    /// <param name="force">Whether it may take the place of a file that is there.</param>
    /// <param name="write">Writes the text.</param>
    /// <exception cref="RefusedException">Something is there already, or the file cannot be written; what was there is untouched, and nothing is left behind.</exception>
    public static void Write(string file, bool force, Action<TextWriter> write)
    {
        ArgumentNullException.ThrowIfNull(file);
        ArgumentNullException.ThrowIfNull(write);
        Demand(file, force);
        DraftFiles.RemoveAbandoned(file);
        string draft = DraftFiles.Name(file, Purpose);
        try
        {
            using (var writer = new StreamWriter(draft, append: false, new UTF8Encoding(encoderShouldEmitUTF8Identifier: false)) { NewLine = "\n" })
            {
                write(writer);
            }

            DraftFiles.Place(draft, file, force);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new RefusedException($"The file '{file}' could not be written: {FileTrouble.Reason(error, draft, file)} Nothing of it was left behind.");
        }
        finally
        {
            DraftFiles.Remove(draft);
        }
    }

    private static void Demand(string file, bool force)
    {
        if (Directory.Exists(file))
        {
            throw new RefusedException($"'{file}' is a folder; name a file.");
        }

        if (Path.GetDirectoryName(Path.GetFullPath(file)) is { } folder && !Directory.Exists(folder))
        {
            throw new RefusedException(File.Exists(folder)
                ? $"'{file}' could not be written: '{folder}' is a file and no folder; name another place."
                : $"'{file}' could not be written: there is no folder '{folder}'; make it, or name another place.");
        }

        if (!force && (File.Exists(file) || new FileInfo(file).LinkTarget is not null))
        {
            throw new RefusedException($"'{file}' exists; nothing was written. Name another file, or say --force to take its place.");
        }
    }

    private static string RealPath(string path)
    {
        string full = Path.GetFullPath(path);
        return File.Exists(full) ? File.ResolveLinkTarget(full, returnFinalTarget: true)?.FullName ?? full : full;
    }
}
