using Campaigns.Catalog.Streams;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes the streams and standing decisions of a campaign as tidy files.</summary>
internal static class StreamFiles
{
    /// <summary>A row a stream, with the settings that were fixed when it started.</summary>
    public static void WriteStreams(Campaign campaign, TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("stream", "procedure", "level", "horizon", "shape", "initial_wealth", "lambda", "tau", "started_at", "reason");
        foreach (StreamHead stream in campaign.Streams)
        {
            csv.Write(
                CsvLine.Number(stream.Number), stream.Procedure.Key, CsvLine.Number(stream.Settings.Level.Value), CsvLine.Number(stream.Settings.Horizon), stream.Settings.Shape,
                CsvLine.Number(stream.Settings.InitialWealth), CsvLine.Number(stream.Settings.Lambda), CsvLine.Number(stream.Settings.Tau), Instant(stream.StartedAt), stream.Reason ?? "");
        }
    }

    /// <summary>A row an experiment that was given a level, in the order of starting.</summary>
    public static void WriteDecisions(IReadOnlyList<StreamStore.Line> lines, TextWriter writer, Func<PValue, string> textOfP)
    {
        var csv = new CsvLine(writer);
        csv.Write("stream", "position", "experiment", "level", "p", "survives", "registered_at", "decided_at", "overlaps");
        foreach ((string experiment, StreamEntry entry) in lines)
        {
            csv.Write(
                CsvLine.Number(entry.Stream), CsvLine.Number(entry.Position), experiment, CsvLine.Number(entry.Level), entry.P is { } p ? textOfP(p) : "",
                entry.Survives is { } survives ? Truth(survives) : "", Instant(entry.RegisteredAt), entry.DecidedAt is { } at ? Instant(at) : default, Truth(entry.Overlaps));
        }
    }

    private static string Truth(bool value) => value ? "true" : "false";

    private static CsvField Instant(DateTimeOffset at) => CsvLine.Instant(at);
}
