using System.Diagnostics;
using System.Globalization;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Torture.Catalogs;

/// <summary>This program as a process of its own that acts on a catalog, one transaction after another without a pause, and acknowledges each on standard output once it is kept. It is what the tests kill.</summary>
internal static class Worker
{
    /// <summary>The first word of the command line.</summary>
    public const string Word = "worker";

    private const string Acknowledged = "kept ";

    private static string Program { get; } = Path.Combine(AppContext.BaseDirectory, OperatingSystem.IsWindows() ? "Campaigns.Torture.exe" : "Campaigns.Torture");

    /// <summary>Starts a process that opens campaigns PREFIX-1, PREFIX-2 ...; whoever starts it ends it.</summary>
    public static Process StartCampaigns(string catalog, string prefix, int count) =>
        Start([Word, "campaigns", catalog, prefix, count.ToString(CultureInfo.InvariantCulture)]);

    /// <summary>Starts a process that loads files into a campaign.</summary>
    public static Process StartLoads(string catalog, string campaign, IEnumerable<string> files) => Start([Word, "loads", catalog, campaign, .. files]);

    /// <summary>What a line of a worker, or of the program in a shell's loop, says to be kept; null where it says something else.</summary>
    public static string? Kept(string? line) => line?.StartsWith(Acknowledged, StringComparison.Ordinal) == true ? line[Acknowledged.Length..] : null;

    /// <summary>Does the work of such a process.</summary>
    public static int Run(string[] words)
    {
        using Campaigns.Catalog.Catalog catalog = Campaigns.Catalog.Catalog.Open(words[2], TimeProvider.System);
        if (words[1] == "campaigns")
        {
            var store = new CampaignStore(catalog);
            int count = int.Parse(words[4], NumberStyles.None, CultureInfo.InvariantCulture);
            for (int i = 1; i <= count; i++)
            {
                string code = FormattableString.Invariant($"{words[3]}-{i}");
                store.Open(new Campaign { Code = code, ErrorRate = ErrorRate.Familywise, Level = new SignificanceLevel(0.05), Correction = "holm", OpenedAt = TimeProvider.System.GetUtcNow() });
                Acknowledge(code);
            }

            return 0;
        }

        foreach (string file in words[4..])
        {
            new MeasurementLoader(catalog).Load(words[3], file, new LoadOptions(DelimitedFileOptions.Default), _ => { }, CancellationToken.None);
            Acknowledge(Path.GetFileName(file));
        }

        return 0;
    }

    private static Process Start(string[] words) => Process.Start(new ProcessStartInfo(Program, words) { RedirectStandardOutput = true, RedirectStandardError = true })!;

    private static void Acknowledge(string what)
    {
        Console.Out.WriteLine(Acknowledged + what);
        Console.Out.Flush();
    }
}
