using System.Diagnostics;
using System.Globalization;
using Campaigns.Catalog.Results;

namespace Campaigns.Benchmarks;

/// <summary>Times the opening of a catalog and the reading of a campaign with all its results, inside one process.</summary>
internal static class Reading
{
    /// <summary>Prints medians in milliseconds, and of the reading the least, which others on the machine disturb least: opening, opening without a look at the structure (what is left is the cost of that look), and reading.</summary>
    public static void Print(string catalogPath, string code, int times, TextWriter output)
    {
        double opening = Spent(times * 20, () => Catalog.Catalog.Open(catalogPath, TimeProvider.System).Dispose())[times * 10];
        double asItIs = Spent(times * 20, () => Catalog.Catalog.OpenForProof(catalogPath, TimeProvider.System, isReadOnly: false).Dispose())[times * 10];
        using var catalog = Catalog.Catalog.Open(catalogPath, TimeProvider.System);
        int experiments = 0;
        double[] reading = Spent(times, () => experiments = new StandingReader(catalog).Read(code).Experiments.Count);
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"open {opening:F2} of which structure {opening - asItIs:F2} read {experiments} experiments {reading[times / 2]:F1} (least {reading[0]:F1})"));
    }

    /// <summary>Milliseconds of each time, ascending; the first, which starts everything, is not among them.</summary>
    private static double[] Spent(int times, Action work)
    {
        work();
        var spent = new double[times];
        for (int i = 0; i < times; i++)
        {
            long began = Stopwatch.GetTimestamp();
            work();
            spent[i] = Stopwatch.GetElapsedTime(began).TotalMilliseconds;
        }

        Array.Sort(spent);
        return spent;
    }
}
