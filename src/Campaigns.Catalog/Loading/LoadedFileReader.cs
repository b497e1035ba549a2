using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>A file of measurements that a campaign took in.</summary>
/// <param name="Number">Place among the campaign's files, from 1.</param>
/// <param name="FileName">Its name, without its folder.</param>
/// <param name="Sha256">SHA-256 of its bytes, lower-case hexadecimal.</param>
/// <param name="ByteCount">Its size in bytes.</param>
/// <param name="RowCount">Rows with a measurement, missing ones included.</param>
/// <param name="MissingCount">Rows whose value is marked as missing.</param>
/// <param name="ExperimentCount">Experiments that received values.</param>
/// <param name="LoadedAt">When.</param>
/// <param name="By">Who; null where the ledger does not say, as of what versions without one loaded.</param>
/// <param name="AmendmentReason">Why values were added to experiments that had been tested; null for an ordinary load.</param>
public sealed record LoadedFile(
    int Number, string FileName, string Sha256, long ByteCount, long RowCount, long MissingCount, int ExperimentCount, DateTimeOffset LoadedAt, Actor? By, string? AmendmentReason);

/// <summary>Reads where the measurements of a campaign came from.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class LoadedFileReader(Catalog catalog)
{
    /// <summary>Every file, in the order of loading. One statement, one pass over the evidence of the ledger.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public IReadOnlyList<LoadedFile> All(string code)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT l.file_name, l.sha256, l.byte_count, l.row_count, l.missing_count, l.experiment_count, l.loaded_at, l.amendment_reason, g.account, g.acting_as
            FROM loads l LEFT JOIN (SELECT owner, min(sequence) AS first FROM ledger_evidence WHERE kind = 'load' GROUP BY owner) x ON x.owner = l.id
            LEFT JOIN ledger g ON g.sequence = x.first AND g.action = 'load' WHERE l.campaign_id = ?1 ORDER BY l.id
            """);
        select.Bind(1, new CampaignStore(catalog).Get(code).Id);
        var files = new List<LoadedFile>();
        while (select.Read())
        {
            files.Add(new LoadedFile(
                files.Count + 1, select.Text(0), select.Text(1), select.Integer(2), select.Integer(3), select.Integer(4), (int)select.Integer(5), Instants.FromMicroseconds(select.Integer(6)),
                select.IsNull(8) ? null : new Actor(select.Text(8), select.NullableText(9)), select.NullableText(7)));
        }

        return files;
    }
}
