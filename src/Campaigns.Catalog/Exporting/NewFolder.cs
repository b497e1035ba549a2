using System.Globalization;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes a folder whole: it is made under another name beside its place and moved there when it is finished, so nothing half-written is ever found, and nothing is overwritten.</summary>
public static class NewFolder
{
    /// <summary>Makes the folder.</summary>
    /// <param name="folder">A folder that does not exist, or is empty; no link.</param>
    /// <param name="fill">Writes its files into the folder that it is given.</param>
    /// <exception cref="RefusedException">Something is there already, or the folder cannot be written; nothing is left behind.</exception>
    public static void Write(string folder, Action<string> fill)
    {
        ArgumentNullException.ThrowIfNull(folder);
        ArgumentNullException.ThrowIfNull(fill);
        folder = Path.TrimEndingDirectorySeparator(Path.GetFullPath(folder));
        if (IsThere(folder) && !IsEmptyFolder(folder))
        {
            throw new RefusedException($"'{folder}' exists and is not an empty folder; nothing was written. Name another.");
        }

        string? draft = null;
        try
        {
            draft = FreeName(folder);
            Directory.CreateDirectory(draft);
            fill(draft);
            if (Directory.Exists(folder))
            {
                Directory.Delete(folder);
            }

            Directory.Move(draft, folder);
            draft = null;
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new RefusedException($"The folder '{folder}' cannot be written: {FileTrouble.Reason(error, draft, folder)} Nothing was written.");
        }
        finally
        {
            if (draft is not null && Directory.Exists(draft))
            {
                Directory.Delete(draft, recursive: true);
            }
        }
    }

    /// <summary>A name beside the folder under which nothing is, not even a link that leads nowhere.</summary>
    private static string FreeName(string folder)
    {
        for (int i = 0; ; i++)
        {
            string name = string.Create(CultureInfo.InvariantCulture, $"{folder}.new-{Environment.ProcessId}{(i == 0 ? "" : $"-{i}")}");
            if (!IsThere(name))
            {
                return name;
            }
        }
    }

    private static bool IsThere(string path) => Directory.Exists(path) || File.Exists(path) || new FileInfo(path).LinkTarget is not null;

    private static bool IsEmptyFolder(string path) =>
        Directory.Exists(path) && new DirectoryInfo(path).LinkTarget is null && !Directory.EnumerateFileSystemEntries(path).Any();
}
