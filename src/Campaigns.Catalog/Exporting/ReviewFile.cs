using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes every line of every review as it was stored on its day; correction, level and size are those of the experiment's family.</summary>
/// <param name="catalog">The open catalog.</param>
/// <param name="campaignId">The campaign.</param>
internal sealed class ReviewFile(Catalog catalog, long campaignId)
{
    /// <summary>Writes the file.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="writer">Where to.</param>
    /// <param name="textOfP">A p-value as it stands in files.</param>
    public void Write(CampaignStanding standing, TextWriter writer, Func<PValue, string> textOfP)
    {
        Dictionary<int, ReviewRecord> records = new ReviewReader(catalog).Records(standing.Campaign.Code).ToDictionary(r => r.Head.Number);
        using SqliteStatement select = catalog.Prepare("SELECT number, lines, id FROM reviews WHERE campaign_id = ?1 ORDER BY number");
        Dictionary<long, string> codes = new PlanStore(catalog).Codes(campaignId);
        Dictionary<string, string> familyOf = standing.Experiments.ToDictionary(e => e.Plan.Code, e => e.Plan.Family ?? "", StringComparer.Ordinal);
        var families = new ReviewFamilies(catalog);
        select.Bind(1, campaignId);
        var csv = new CsvLine(writer);
        csv.Write(
            "review", "taken_at", "correction", "level", "family_size", "interim", "experiment", "p", "adjusted_p", "survives", "family", "plan_version", "files", "rows", "program_version", "ledger_sequence");
        while (select.Read())
        {
            ReviewRecord record = records[(int)select.Integer(0)];
            ReviewHead head = record.Head;
            var whole = new FamilyStanding("", head.Correction, head.Level, head.FamilySize, 0, 0, 0);
            var byName = families.Read(select.Integer(2)).ToDictionary(f => f.Name, StringComparer.Ordinal);
            (FamilyColumns columns, PValue[] adjusted) = PackedReviewLines.Unpack(select.Blob(1));
            for (int i = 0; i < columns.Count; i++)
            {
                string code = codes[columns.ExperimentIds[i]];
                FamilyStanding family = byName.GetValueOrDefault(familyOf[code], whole);
                csv.Write(
                    CsvLine.Number(head.Number), CsvLine.Instant(head.At), family.Correction, CsvLine.Number(family.Level.Value), CsvLine.Number(family.Size), head.IsInterim ? "true" : "false",
                    code, textOfP(columns.P[i]), textOfP(adjusted[i]), family.Level.Rejects(adjusted[i]) ? "true" : "false", family.Name,
                    CsvLine.Number(record.PlanVersion), CsvLine.Number(record.Files), CsvLine.Number(record.Rows), head.ProgramVersion, CsvLine.Number(record.LedgerSequence));
            }
        }
    }
}
