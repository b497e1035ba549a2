using System.Diagnostics;
using System.Globalization;
using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Results;

namespace Campaigns.Benchmarks;

/// <summary>Times the arrival of one more experiment in a catalog: load, test and review inside one process, each arrival in transactions of its own.</summary>
internal static class Arrival
{
    /// <summary>Prints the milliseconds of each arrival; the first ones still hold the start of the process.</summary>
    public static void Print(string catalogPath, string code, int arrivals, TextWriter output)
    {
        using var catalog = Catalog.Catalog.Open(catalogPath, TimeProvider.System);
        string file = Path.GetTempFileName();
        try
        {
            long run = Stopwatch.GetTimestamp();
            for (int number = 1; number <= arrivals; number++)
            {
                File.WriteAllText(file, Experiment($"NEW-{run}-{number}", number));
                long began = Stopwatch.GetTimestamp();
                new MeasurementLoader(catalog).Load(code, file, new LoadOptions(DelimitedFileOptions.Default), _ => { }, CancellationToken.None);
                long loaded = Stopwatch.GetTimestamp();
                new TestRunner(catalog).Run(code, includeIncomplete: false, _ => { }, CancellationToken.None);
                long tested = Stopwatch.GetTimestamp();
                new ReviewStore(catalog).Take(code, testedOnly: false);
                output.WriteLine(string.Create(CultureInfo.InvariantCulture,
                    $"arrival {Stopwatch.GetElapsedTime(began).TotalMilliseconds:F1} load {Stopwatch.GetElapsedTime(began, loaded).TotalMilliseconds:F1} test {Stopwatch.GetElapsedTime(loaded, tested).TotalMilliseconds:F1} review {Stopwatch.GetElapsedTime(tested).TotalMilliseconds:F1}"));
            }
        }
        finally
        {
            File.Delete(file);
        }
    }

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
