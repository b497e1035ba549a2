using System.Globalization;

namespace Campaigns.Catalog.Providers;

/// <summary>Who holds the lock on a file, where the system tells: a hint for people, never a ground for a decision.</summary>
internal static class LockHolder
{
    private const string Locks = "/proc/locks";

    /// <summary>For example " (process 4711, 'campaigns')"; empty where it cannot be known.</summary>
    /// <param name="path">The file.</param>
    public static string Describe(string path)
    {
        try
        {
            if (!File.Exists(Locks))
            {
                return "";
            }

            string file = Path.GetFullPath(path);
            file = File.ResolveLinkTarget(file, returnFinalTarget: true)?.FullName ?? file;
            foreach (int process in Holders().Where(p => p != Environment.ProcessId && Holds(p, file)))
            {
                string name = File.ReadAllText(FormattableString.Invariant($"/proc/{process}/comm")).Trim();
                return FormattableString.Invariant($" (process {process}, '{name}')");
            }
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException or NotSupportedException)
        {
            // The process ended meanwhile, or is somebody else's.
        }

        return "";
    }

    /// <summary>The processes that hold any lock: the fifth word of a line such as "1: POSIX ADVISORY WRITE 4711 08:01:1234 0 EOF".</summary>
    private static int[] Holders() =>
    [
        .. File.ReadLines(Locks).Select(line => line.Split(' ', StringSplitOptions.RemoveEmptyEntries))
            .Select(words => words.Length > 4 && int.TryParse(words[4], NumberStyles.None, CultureInfo.InvariantCulture, out int process) ? process : 0)
            .Where(process => process > 0).Distinct(),
    ];

    private static bool Holds(int process, string file)
    {
        try
        {
            return Directory.EnumerateFileSystemEntries(FormattableString.Invariant($"/proc/{process}/fd"))
                .Where(link => File.ResolveLinkTarget(link, returnFinalTarget: false)?.FullName == file)
                .Any(link => File.ReadLines(FormattableString.Invariant($"/proc/{process}/fdinfo/{Path.GetFileName(link)}")).Any(line => line.StartsWith("lock:", StringComparison.Ordinal)));
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            return false;
        }
    }
}
