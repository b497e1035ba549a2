using System.Diagnostics;
using System.Globalization;
using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Torture.Incoming;

/// <summary>T14: fifty good files of measurements, damaged at random, are loaded whole or not at all, soon, and within bounded memory.</summary>
internal sealed class DamagedFiles : TortureTest
{
    private const int GoodFiles = 50;
    private const int PerCatalog = 250;
    /// <summary>What the process may grow by, whatever earlier tests left in it.</summary>
    private const long MostGrowth = 192L << 20;

    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(2);
    private static readonly string[] Ends = ["\n", "\r\n", "\r"];
    private static readonly byte[] Tricky =
        [0, (byte)'"', (byte)'\n', (byte)'\r', (byte)',', (byte)';', (byte)'\t', (byte)' ', (byte)'-', (byte)'.', (byte)'e', (byte)'9', (byte)'=', (byte)'\'', 0x1B, 0x80, 0xC3, 0xE2, 0xF0, 0xFE, 0xFF, 0xEF];

    public override string Key => "T14";

    public override string What => "damaged measurement files";

    public override int Full => 10_000;

    public override int Short => 500;

    public override void Run(Tally tally, int tries, Random random)
    {
        byte[][] good = [.. Enumerable.Range(0, GoodFiles).Select(i => Good(random, i))];
        MemoryPeak.Reset();
        long before = MemoryPeak.Bytes ?? 0;
        for (int done = 0; done < tries; done += PerCatalog)
        {
            using var bench = new Workbench();
            using Catalog.Catalog catalog = Catalog.Catalog.OpenOrCreate(bench.Catalog, bench.Clock);
            for (int i = done; i < Math.Min(tries, done + PerCatalog); i++)
            {
                byte[] damaged = Damage(good[i % GoodFiles], random);
                string code = FormattableString.Invariant($"C{i}");
                tally.Try(FormattableString.Invariant($"mutation {i}"), () => Load(catalog, code, bench.Write("m.csv", damaged)));
            }
        }

        if (MemoryPeak.Bytes is { } peak)
        {
            tally.Count("memory", peak - before < MostGrowth ? null : FormattableString.Invariant($"the process grew from {before >> 20} to {peak >> 20} MiB"));
        }
    }

    /// <summary>What went wrong; null where the file was taken whole or refused whole with a place and a reason.</summary>
    private static string? Load(Catalog.Catalog catalog, string code, string path)
    {
        StoredCampaign campaign = new CampaignStore(catalog).Open(new Campaign { Code = code, ErrorRate = ErrorRate.FalseDiscovery, Level = new SignificanceLevel(0.05), Correction = "bh", OpenedAt = catalog.Clock.GetUtcNow() });
        long start = Stopwatch.GetTimestamp();
        LoadSummary? loaded = null;
        string? refusal = null;
        try
        {
            loaded = new MeasurementLoader(catalog).Load(code, path, new LoadOptions(DelimitedFileOptions.Default), _ => { }, default);
        }
        catch (RefusedException refused)
        {
            refusal = refused.Details.Count > 0 && refused.Details.All(d => d.Length > 10 && !d.Any(char.IsControl)) ? null : $"a refusal without a reason: {refused.Message}";
        }

        TimeSpan time = Stopwatch.GetElapsedTime(start);
        if (time > Longest)
        {
            return FormattableString.Invariant($"took {time.TotalSeconds:F1} s");
        }

        long stored = catalog.Context.Measurements.Where(m => catalog.Context.Experiments.Any(e => e.Id == m.ExperimentId && e.CampaignId == campaign.Id)).AsEnumerable().Sum(m => (long)m.ValueCount + m.MissingCount);
        return refusal ?? (stored == (loaded?.RowCount ?? 0) ? null : FormattableString.Invariant($"{stored} rows are stored, {loaded?.RowCount ?? 0} were said to be loaded"));
    }

    /// <summary>A file as laboratories write them: one of the separators, line ends and encodings, some columns more, names with letters of several scripts.</summary>
    private static byte[] Good(Random random, int number)
    {
        char separator = ",;\t"[number % 3];
        string end = Ends[number / 3 % Ends.Length];
        var text = new StringBuilder(string.Join(separator, "experiment", "group", "value", "specimen", "block", "order", "note")).Append(end);
        int rows = random.Next(5, 60);
        for (int i = 0; i < rows; i++)
        {
            string value = random.Next(12) == 0 ? "NA" : ((random.NextDouble() - 0.3) * Math.Pow(10, random.Next(-3, 5))).ToString("G6", CultureInfo.InvariantCulture);
            text.Append(string.Join(
                separator, FormattableString.Invariant($"E{i / 8}"), i % 4 == 0 ? "Größe" : i % 4 == 1 ? "\"A \"\"1\"\"\"" : FormattableString.Invariant($"g{i % 4}"), value,
                FormattableString.Invariant($"P{i}"), FormattableString.Invariant($"day {i % 3}"), FormattableString.Invariant($"{i}"), "\"two" + end + "lines\"")).Append(end);
        }

        return (number % 5) switch
        {
            0 => [0xEF, 0xBB, 0xBF, .. Encoding.UTF8.GetBytes(text.ToString())],
            1 => [0xFF, 0xFE, .. Encoding.Unicode.GetBytes(text.ToString())],
            _ => Encoding.UTF8.GetBytes(text.ToString()),
        };
    }

    private static byte[] Damage(byte[] good, Random random)
    {
        List<byte> bytes = [.. good];
        for (int changes = random.Next(1, 5); changes > 0 && bytes.Count > 1; changes--)
        {
            int at = random.Next(bytes.Count);
            int length = Math.Min(random.Next(1, 60), bytes.Count - at);
            switch (random.Next(7))
            {
                case 0:
                    bytes[at] ^= (byte)(1 << random.Next(8));
                    break;
                case 1:
                    bytes[at] = Tricky[random.Next(Tricky.Length)];
                    break;
                case 2:
                    bytes.Insert(at, Tricky[random.Next(Tricky.Length)]);
                    break;
                case 3:
                    bytes.RemoveRange(at, length);
                    break;
                case 4:
                    bytes.InsertRange(random.Next(bytes.Count), bytes.GetRange(at, length));
                    break;
                case 5:
                    bytes.InsertRange(at, Enumerable.Repeat(bytes[at], random.Next(1, 5000)));
                    break;
                default:
                    bytes.RemoveRange(at, bytes.Count - at);
                    break;
            }
        }

        return [.. bytes];
    }
}
