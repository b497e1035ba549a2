using System.Globalization;

namespace Campaigns.Torture;

/// <summary>The largest memory that this process held since it was last asked to forget; known on Linux.</summary>
internal static class MemoryPeak
{
    private const string Status = "/proc/self/status";

    /// <summary>Forgets the peak so far.</summary>
    public static void Reset()
    {
        // What other tests left is given back to the system, or it would count.
        GC.Collect(GC.MaxGeneration, GCCollectionMode.Aggressive, blocking: true, compacting: true);
        if (File.Exists("/proc/self/clear_refs"))
        {
            // 5 resets the peak resident set (Linux, Documentation/filesystems/proc).
            File.WriteAllText("/proc/self/clear_refs", "5");
        }
    }

    /// <summary>The peak; null where the system does not tell.</summary>
    public static long? Bytes => File.Exists(Status) && File.ReadLines(Status).FirstOrDefault(l => l.StartsWith("VmHWM:", StringComparison.Ordinal)) is { } line
        ? long.Parse(line.Split(' ', StringSplitOptions.RemoveEmptyEntries)[1], CultureInfo.InvariantCulture) << 10
        : null;
}
