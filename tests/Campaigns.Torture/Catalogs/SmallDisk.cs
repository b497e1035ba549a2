using System.Diagnostics;

namespace Campaigns.Torture.Catalogs;

/// <summary>A file system in memory of a chosen size, where this machine lets one be made.</summary>
internal sealed class SmallDisk : IDisposable
{
    private SmallDisk(string folder) => Folder = folder;

    public string Folder { get; }

    /// <summary>Makes one at a folder that exists and is empty; null where the machine refuses.</summary>
    public static SmallDisk? Make(string folder, long bytes) =>
        OperatingSystem.IsLinux() && Run("mount", "-t", "tmpfs", "-o", FormattableString.Invariant($"size={bytes},mode=0777"), "tmpfs", folder) ? new SmallDisk(folder) : null;

    /// <summary>Lets nobody write on it any more, not even the administrator.</summary>
    public bool MakeReadOnly() => Run("mount", "-o", "remount,ro", Folder);

    public void Dispose() => Run("umount", Folder);

    /// <summary>Runs a tool of the system.</summary>
    /// <returns>Whether it is there and did what it was asked.</returns>
    public static bool Run(string tool, params string[] words)
    {
        try
        {
            using Process process = Process.Start(new ProcessStartInfo(tool, words) { RedirectStandardOutput = true, RedirectStandardError = true })!;
            process.WaitForExit();
            return process.ExitCode == 0;
        }
        catch (System.ComponentModel.Win32Exception)
        {
            return false;
        }
    }
}
