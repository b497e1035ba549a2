using System.Text.Json;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes the record of a campaign: amendments of its sealed plan, withdrawals, and what the export itself is.</summary>
internal sealed class RecordFiles(Catalog catalog, string code, long campaignId)
{
    /// <summary>Whether the sealed plan was amended.</summary>
    public bool HasAmendments => Any("SELECT EXISTS (SELECT 1 FROM plan_amendments WHERE campaign_id = ?1)");

    /// <summary>Whether an experiment was ever withdrawn.</summary>
    public bool HasWithdrawals => Any("SELECT EXISTS (SELECT 1 FROM withdrawals w JOIN experiments e ON e.id = w.experiment_id WHERE e.campaign_id = ?1)");

    /// <summary>A row a value that an amendment changed. Numbers of a plan are not negative, so that guarding every value changes none of them.</summary>
    public void WriteAmendments(TextWriter writer)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT a.number, e.code, c.field, c.before, c.after, a.reason, a.named_by, a.made_at FROM plan_amendments a
            LEFT JOIN plan_amendment_changes c ON c.amendment_id = a.id LEFT JOIN experiments e ON e.id = c.experiment_id
            WHERE a.campaign_id = ?1 ORDER BY a.number, e.id, c.field
            """);
        select.Bind(1, campaignId);
        var csv = new CsvLine(writer);
        csv.Write("amendment", "experiment", "field", "before", "after", "reason", "by", "at");
        while (select.Read())
        {
            bool isAdded = select.TextEquals(2, PlanAmendmentChange.Added);
            csv.Write(
                CsvLine.Number(select.Integer(0)), select.Text(1), isAdded ? "added" : select.Text(2), select.NullableText(3) ?? "", isAdded ? "" : select.NullableText(4) ?? "", select.Text(5), select.Text(6),
                CsvLine.Instant(Instants.FromMicroseconds(select.Integer(7))));
        }
    }

    /// <summary>A row a decision about an experiment, oldest first.</summary>
    public void WriteWithdrawals(TextWriter writer)
    {
        var csv = new CsvLine(writer);
        csv.Write("experiment", "withdrawn", "had_data", "reason", "by", "at", "after_results");
        foreach (Withdrawal w in new StandingWithdrawals(catalog, campaignId).InOrder())
        {
            csv.Write(w.Experiment, Truth(w.IsWithdrawn), Truth(w.HadData), w.Reason, w.NamedBy, CsvLine.Instant(w.At), Truth(w.AfterResults));
        }
    }

    /// <summary>What the export is: of which campaign, when, by which version, at which head of the ledger, and the digest of every file.</summary>
    /// <param name="folder">The folder with all other files in it.</param>
    /// <param name="head">The head of the ledger when the data were read.</param>
    public void WriteRecord(string folder, LedgerHead head)
    {
        using FileStream target = new(Path.Combine(folder, CampaignExport.RecordName), FileMode.CreateNew);
        using var json = new Utf8JsonWriter(target, new JsonWriterOptions { Indented = true, NewLine = "\n" });
        json.WriteStartObject();
        json.WriteString("campaign", code);
        json.WriteString("exported_at", CsvLine.Instant(catalog.Clock.GetUtcNow()).Content);
        json.WriteString("program_version", ProgramVersion.Current);
        json.WriteNumber("ledger_sequence", head.Sequence);
        json.WriteString("ledger_head", head.ToString());
        json.WriteStartObject("files");
        string own = Path.Combine(folder, CampaignExport.RecordName);
        foreach (string file in Directory.EnumerateFiles(folder, "*", SearchOption.AllDirectories).Where(f => f != own).Order(StringComparer.Ordinal))
        {
            json.WriteString(Path.GetRelativePath(folder, file).Replace('\\', '/'), FileDigest.Sha256(file).Hex);
        }

        json.WriteEndObject();
        json.WriteEndObject();
    }

    private static CsvField Truth(bool value) => CsvField.AsItStands(value ? "true" : "false");

    private bool Any(string sql)
    {
        using SqliteStatement any = catalog.Prepare(sql);
        any.Bind(1, campaignId).Read();
        return any.Integer(0) != 0;
    }
}
