using System.Text;
using System.Text.Json;
using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes a campaign as a folder of tidy files that any program reads, in the layout that this program runs.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class CampaignExport(Catalog catalog)
{
    /// <summary>Name of the file of measurements.</summary>
    public const string MeasurementsName = "measurements.csv";

    /// <summary>Name of the file of reviews.</summary>
    public const string ReviewsName = "reviews.csv";

    /// <summary>Name of the file of results.</summary>
    public const string ResultsName = "results.csv";

    /// <summary>Name of the file of families.</summary>
    public const string FamiliesName = "families.csv";

    /// <summary>Name of the file of observations left out of the analysis.</summary>
    public const string ExclusionsName = "exclusions.csv";

    /// <summary>Name of the file of streams, where experiments are judged as they arrive.</summary>
    public const string StreamsName = "streams.csv";

    /// <summary>Name of the file of standing decisions.</summary>
    public const string DecisionsName = "decisions.csv";

    /// <summary>Name of the file of follow-up comparisons.</summary>
    public const string ComparisonsName = "comparisons.csv";

    /// <summary>Name of the file of amendments of the sealed plan.</summary>
    public const string AmendmentsName = "amendments.csv";

    /// <summary>Name of the file of the plan as it was sealed, written where amendments changed it since.</summary>
    public const string SealedPlanName = "sealed-plan.csv";

    /// <summary>Name of the file of withdrawn experiments.</summary>
    public const string WithdrawalsName = "withdrawals.csv";

    /// <summary>Name of the file of the campaign's entries in the ledger.</summary>
    public const string LedgerName = "ledger.csv";

    /// <summary>Name of the file of the values that these entries changed.</summary>
    public const string LedgerChangesName = "ledger_changes.csv";

    /// <summary>Name of the file of the digests that these entries carry.</summary>
    public const string LedgerEvidenceName = "ledger_evidence.csv";

    /// <summary>Name of the file that says what the export is.</summary>
    public const string RecordName = "record.json";

    /// <summary>The file of measurements, from the folder.</summary>
    public const string MeasurementsPath = $"measurements/{MeasurementsName}";

    /// <summary>Writes the folder whole: it is made beside its place and moved there when it is finished.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="folder">A folder that does not exist, or is empty.</param>
    /// <param name="tables">Further tables that were computed from the campaign: the name of each file, and what writes it.</param>
    /// <param name="textOfP">A p-value as it stands in files.</param>
    /// <exception cref="RefusedException">The folder holds something, or cannot be written.</exception>
    /// <returns>The files written, from the folder, and the head of the ledger that they stand at.</returns>
    public ExportedCampaign Write(CampaignStanding standing, string folder, IReadOnlyList<(string Name, Action<TextWriter> Write)> tables, Func<PValue, string> textOfP)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ArgumentNullException.ThrowIfNull(tables);
        ArgumentNullException.ThrowIfNull(textOfP);
        LedgerHead head = new LedgerReader(catalog).Head;
        long campaignId = new CampaignStore(catalog).Get(standing.Campaign.Code).Id;
        var records = new RecordFiles(catalog, standing.Campaign.Code, campaignId);
        string[] written = [];
        NewFolder.Write(folder, draft =>
        {
            WriteFile(draft, "campaign.json", writer => WriteCampaign(standing.Campaign, writer));
            if (!standing.Campaign.IsExploratory && standing.Experiments.Count > 0)
            {
                // A plan file would make a plan of what had none, and one without experiments is none.
                WriteFile(draft, "plan.csv", writer => WritePlan(standing.Campaign, standing.Experiments.Select(e => e.Plan), writer));
                if (records.HasAmendments)
                {
                    WriteFile(draft, SealedPlanName, writer => WritePlan(standing.Campaign, SealedPlan.Read(catalog, campaignId), writer));
                }
            }

            if (standing.Campaign.Families.Count > 0)
            {
                WriteFile(draft, FamiliesName, writer => WriteFamilies(standing.Campaign.Families, writer));
            }

            WriteMeasurements(standing, System.IO.Path.Combine(draft, "measurements"));
            if (new ExclusionStore(catalog).All(standing.Campaign.Code) is { Count: > 0 } decisions)
            {
                WriteFile(draft, ExclusionsName, writer => WriteExclusions(decisions, writer));
            }

            if (standing.Campaign.Streams.Count > 0)
            {
                WriteFile(draft, StreamsName, writer => StreamFiles.WriteStreams(standing.Campaign, writer));
                WriteFile(draft, DecisionsName, writer => StreamFiles.WriteDecisions(new StreamStore(catalog).Decisions(standing.Campaign.Code), writer, textOfP));
            }

            WriteFile(draft, ReviewsName, writer => new ReviewFile(catalog, campaignId).Write(standing, writer, textOfP));
            foreach ((string name, Action<TextWriter> write) in tables)
            {
                WriteFile(draft, name, write);
            }

            WriteRecords(records, new LedgerFiles(catalog, standing.Campaign.Code), draft);
            var files = Directory.EnumerateFiles(draft, "*", SearchOption.AllDirectories).Select(f => System.IO.Path.GetRelativePath(draft, f).Replace('\\', '/')).ToHashSet(StringComparer.Ordinal);
            files.Add(ColumnMeanings.FileName);
            WriteFile(draft, ColumnMeanings.FileName, writer => ColumnMeanings.Write(files, writer));
            records.WriteRecord(draft, head);
            written = [.. files.Append(RecordName).Order(StringComparer.Ordinal)];
        });
        return new ExportedCampaign(written, head);
    }

    private static void WriteRecords(RecordFiles records, LedgerFiles ledger, string draft)
    {
        WriteFile(draft, LedgerName, ledger.WriteEntries);
        WriteFile(draft, LedgerChangesName, ledger.WriteChanges);
        WriteFile(draft, LedgerEvidenceName, ledger.WriteEvidence);
        if (records.HasAmendments)
        {
            WriteFile(draft, AmendmentsName, records.WriteAmendments);
        }

        if (records.HasWithdrawals)
        {
            WriteFile(draft, WithdrawalsName, records.WriteWithdrawals);
        }
    }

    private static void WriteFile(string folder, string name, Action<TextWriter> write)
    {
        using var writer = new StreamWriter(System.IO.Path.Combine(folder, name), append: false, new UTF8Encoding(false), 1 << 16) { NewLine = "\n" };
        write(writer);
    }

    private static void WriteCampaign(Campaign campaign, TextWriter writer)
    {
        var buffer = new System.Buffers.ArrayBufferWriter<byte>();
        using (var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Indented = true, NewLine = "\n" }))
        {
            json.WriteStartObject();
            json.WriteString("code", campaign.Code);
            json.WriteString("title", campaign.Title);
            json.WriteString("purpose", campaign.Purpose);
            json.WriteString("errorRate", campaign.ErrorRate.Word());
            json.WriteNumber("level", campaign.Level.Value);
            json.WriteString("correction", campaign.Correction);
            json.WriteString("test", campaign.DefaultTest);
            json.WriteString("followUp", campaign.DefaultFollowUp);
            WriteOnline(campaign.Online, json);
            json.WriteEndObject();
        }

        writer.WriteLine(Encoding.UTF8.GetString(buffer.WrittenSpan));
    }

    private static void WriteOnline(OnlineOptions? online, Utf8JsonWriter json)
    {
        if (online?.Horizon is { } horizon)
        {
            if (horizon == 0)
            {
                json.WriteString("horizon", "none");
            }
            else
            {
                json.WriteNumber("horizon", horizon);
            }
        }

        if (online?.Shape is { } shape)
        {
            json.WriteString("shape", shape);
        }

        foreach ((string name, double? value) in new[] { ("initialWealth", online?.InitialWealth), ("lambda", online?.Lambda), ("tau", online?.Tau) })
        {
            if (value is { } given)
            {
                json.WriteNumber(name, given);
            }
        }
    }

    private static void WritePlan(Campaign campaign, IEnumerable<PlannedExperiment> plan, TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("experiment", "title", "response", "unit", "groups", "control", "test", "follow_up", "replicates", "smallest_effect", "assumed_sd", "weight", "family", "confirms", "shared_control");

        // A plan that an earlier version sealed may name families that never counted as such: named again, they would.
        bool namesFamilies = !campaign.IsSealed || campaign.Families.Count > 0;
        foreach (PlannedExperiment e in plan)
        {
            csv.Write(
                e.Code, e.Title, e.Response, e.Unit, string.Join('|', e.Groups), e.Control ?? "", e.Test, e.FollowUp,
                CsvLine.Number(e.Replicates), CsvLine.Number(e.SmallestEffect), CsvLine.Number(e.AssumedStandardDeviation), CsvLine.Number(e.Weight), (namesFamilies ? e.Family : null) ?? "", e.Confirms ?? "", e.SharedControl ?? "");
        }
    }

    private static void WriteFamilies(IReadOnlyList<Family> families, TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("family", "correction", "level", "opens_after", "opens_when");
        foreach (Family f in families)
        {
            csv.Write(f.Name, f.Correction ?? "", CsvLine.Number(f.Level?.Value), f.OpensAfter ?? "", f.OpensAfter is null ? "" : f.Gate == FamilyGate.AllSurvive ? "all" : "any");
        }
    }

    /// <summary>Every value as it was typed (up to trailing zeros), with where it came from; the rows of one experiment together, in the order in which they were loaded.</summary>
    /// <remarks>Without values there is no file: one of a header alone would be refused when the folder is run.</remarks>
    private void WriteMeasurements(CampaignStanding standing, string folder)
    {
        long rows = 0;
        Directory.CreateDirectory(folder);
        WriteFile(folder, MeasurementsName, writer => rows = WriteMeasurements(standing, writer));
        if (rows == 0)
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private long WriteMeasurements(CampaignStanding standing, TextWriter writer)
    {
        long campaignId = new CampaignStore(catalog).Get(standing.Campaign.Code).Id;
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.code, e.group_set_id, m.packed, l.file_name FROM experiments e
            JOIN measurements m ON m.experiment_id = e.id JOIN loads l ON l.id = m.load_id
            WHERE e.campaign_id = ?1 ORDER BY e.id, m.load_id
            """);
        select.Bind(1, campaignId);
        var csv = new CsvLine(writer);
        csv.Write("experiment", "group", "value", "specimen", "block", "order", "file", "line");
        var values = new ObservationColumns();
        long rows = 0;
        while (select.Read())
        {
            string code = select.Text(0);
            string[] labels = sets.Labels(select.NullableInteger(1));
            string file = select.Text(3);
            values.Clear();
            PackedMeasurements.Read(select.Blob(2), values);
            rows += values.Count;
            for (int i = 0; i < values.Count; i++)
            {
                csv.Write(
                    code, labels[values.Groups[i]], CsvField.AsItStands(values.Text(i)),
                    values.Specimens[i] < 0 ? "" : values.SpecimenNames.Text(values.Specimens[i]),
                    values.Blocks[i] < 0 ? "" : values.BlockNames.Text(values.Blocks[i]),
                    values.Orders[i] == ObservationColumns.NoOrder ? default : CsvLine.Number(values.Orders[i]),
                    file, CsvLine.Number(values.Lines[i]));
            }
        }

        return rows;
    }

    /// <summary>Every decision about an observation, the latest about it last; the values themselves stand among the measurements.</summary>
    private static void WriteExclusions(IReadOnlyList<ExcludedObservation> decisions, TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("experiment", "file", "line", "group", "value", "excluded", "reason", "by", "at");
        foreach (ExcludedObservation d in decisions)
        {
            csv.Write(
                d.Experiment, d.File, CsvLine.Number(d.Line), d.Group, CsvField.AsItStands(d.Value), d.IsExcluded ? "true" : "false", d.Reason, d.NamedBy,
                d.At.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", System.Globalization.CultureInfo.InvariantCulture));
        }
    }
}
