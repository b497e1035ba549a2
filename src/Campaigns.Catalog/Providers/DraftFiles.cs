using System.Globalization;
using System.Runtime.InteropServices;
using Microsoft.Win32.SafeHandles;

namespace Campaigns.Catalog.Providers;

/// <summary>Files that are made beside their place and moved there when they are whole, so that at every moment there is the old file or the new one.</summary>
/// <remarks>A draft is named after its place, its purpose and its process: "campaigns.db.draft-upgrade-4711-1". No file that people name themselves is taken for one.</remarks>
internal static class DraftFiles
{
    private const string Mark = ".draft-";
    private const string Journal = "-journal";
    private static int _drafts;

    /// <summary>A name for a draft that no living process uses.</summary>
    /// <param name="path">The place.</param>
    /// <param name="purpose">A word: new, upgrade or backup.</param>
    public static string Name(string path, string purpose)
    {
        string draft = FormattableString.Invariant($"{path}{Mark}{purpose}-{Environment.ProcessId}-{Interlocked.Increment(ref _drafts)}");
        Remove(draft);
        return draft;
    }

    /// <summary>Puts a finished draft in its place. The file is on the disk before the exchange, and the exchange before this returns.</summary>
    /// <param name="draft">The draft; nobody has it open.</param>
    /// <param name="path">Its place.</param>
    /// <param name="overwrite">Whether it takes the place of a file that is there.</param>
    /// <exception cref="IOException">There is a file already, or the disk refused.</exception>
    public static void Place(string draft, string path, bool overwrite)
    {
        using (SafeFileHandle file = File.OpenHandle(draft, FileMode.Open, FileAccess.ReadWrite, FileShare.ReadWrite))
        {
            RandomAccess.FlushToDisk(file);
        }

        File.Move(draft, path, overwrite);
        SyncFolder(Path.GetDirectoryName(Path.GetFullPath(path))!);
    }

    /// <summary>Removes a draft with its journal, where there is one.</summary>
    public static void Remove(string draft)
    {
        foreach (string file in new[] { draft, draft + Journal })
        {
            try
            {
                File.Delete(file);
            }
            catch (Exception error) when (error is IOException or UnauthorizedAccessException)
            {
                // What cannot be removed is in nobody's way: it is no catalog, and no other process takes its name.
            }
        }
    }

    /// <summary>Removes the drafts that killed processes left beside a file; those of living ones stay.</summary>
    /// <param name="path">The file.</param>
    /// <param name="held">A purpose of which nobody else can have a draft now, because the caller holds the lock that it needs; null for none.</param>
    public static void RemoveAbandoned(string path, string? held = null)
    {
        string full = Path.GetFullPath(path);
        string start = Path.GetFileName(full) + Mark;
        try
        {
            foreach (string file in Directory.EnumerateFiles(Path.GetDirectoryName(full)!).Where(f => Path.GetFileName(f).StartsWith(start, StringComparison.Ordinal)).ToArray())
            {
                string name = Path.GetFileName(file)[start.Length..];
                string[] parts = (name.EndsWith(Journal, StringComparison.Ordinal) ? name[..^Journal.Length] : name).Split('-');
                if (parts is ["new" or "upgrade" or "backup", var number, _]
                    && int.TryParse(number, NumberStyles.None, CultureInfo.InvariantCulture, out int process)
                    && (parts[0] == held || (process != Environment.ProcessId && !IsAlive(process))))
                {
                    Remove(file);
                }
            }
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            // A folder that cannot be listed hides its leftovers; they are in nobody's way.
        }
    }

    /// <summary>Makes a rename last through a power cut, where folders can be synced.</summary>
    public static void SyncFolder(string folder)
    {
        if (OperatingSystem.IsWindows())
        {
            return;
        }

        int handle = OpenFolder(folder, 0);
        if (handle >= 0)
        {
            // Some file systems cannot sync a folder; there the rename is as lasting as they make it.
            _ = Sync(handle);
            _ = Close(handle);
        }
    }

    private static bool IsAlive(int process)
    {
        try
        {
            using var found = System.Diagnostics.Process.GetProcessById(process);
            return true;
        }
        catch (ArgumentException)
        {
            return false;
        }
    }

    [DllImport("libc", EntryPoint = "open", CharSet = CharSet.Ansi, BestFitMapping = false, ThrowOnUnmappableChar = true)]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    private static extern int OpenFolder([MarshalAs(UnmanagedType.LPUTF8Str)] string folder, int flags);

    [DllImport("libc", EntryPoint = "fsync")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    private static extern int Sync(int handle);

    [DllImport("libc", EntryPoint = "close")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    private static extern int Close(int handle);
}
