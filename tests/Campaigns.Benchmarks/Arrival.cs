using System.Diagnostics;
using System.Globalization;
using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Results;

namespace Campaigns.Benchmarks;

/// <summary>Times the arrival of one more experiment in a catalog: load, test and review inside one process, each arrival in transactions of its own.</summary>
/// <remarks>The time of the processor stands beside that of the clock: on a machine that others use, and without their disk, it is the one that can be compared.</remarks>
internal static class Arrival
{
    /// <summary>Prints the milliseconds of each arrival, by the clock and (cpu) of the processor, and the medians of the second half; the first ones still hold the start of the process.</summary>
    public static void Print(string catalogPath, string code, int arrivals, TextWriter output)
    {
        using var catalog = Catalog.Catalog.Open(catalogPath, TimeProvider.System);
        string file = Path.GetTempFileName();
        try
        {
            long run = Stopwatch.GetTimestamp();
            var spent = new List<double[]>();
            for (int number = 1; number <= arrivals; number++)
            {
                File.WriteAllText(file, Experiment($"NEW-{run}-{number}", number));
                double[] times =
                [
                    .. Spent(() => new MeasurementLoader(catalog).Load(code, file, new LoadOptions(DelimitedFileOptions.Default), _ => { }, CancellationToken.None)),
                    .. Spent(() => new TestRunner(catalog).Run(code, includeIncomplete: false, _ => { }, CancellationToken.None)),
                    .. Spent(() => new ReviewStore(catalog).Take(code, testedOnly: false)),
                ];
                spent.Add(times);
                output.WriteLine(Line("arrival", times));
            }

            spent.RemoveRange(0, spent.Count / 2);
            output.WriteLine(Line("median", [.. Enumerable.Range(0, 6).Select(i => spent.Select(t => t[i]).Order().ElementAt(spent.Count / 2))]));
        }
        finally
        {
            File.Delete(file);
        }
    }

    /// <summary>Milliseconds of a piece of work by the clock, and of the processor.</summary>
    private static double[] Spent(Action work)
    {
        using var process = Process.GetCurrentProcess();
        TimeSpan cpu = process.TotalProcessorTime;
        long began = Stopwatch.GetTimestamp();
        work();
        double wall = Stopwatch.GetElapsedTime(began).TotalMilliseconds;
        process.Refresh();
        return [wall, (process.TotalProcessorTime - cpu).TotalMilliseconds];
    }

    private static string Line(string word, double[] times) => string.Create(CultureInfo.InvariantCulture,
        $"{word} {times[0] + times[2] + times[4]:F1} (cpu {times[1] + times[3] + times[5]:F1}) load {times[0]:F1} (cpu {times[1]:F1}) test {times[2]:F1} (cpu {times[3]:F1}) review {times[4]:F1} (cpu {times[5]:F1})");

    private static string Experiment(string code, int number)
    {
        var text = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < 50; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"{code},G{(i % 5) + 1},{50 + (i % 5) + number}.{i * 37 % 100:D2}\n");
        }

        return text.ToString();
    }
}
