using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger;

/// <summary>Finds the entries that touched one experiment, by the rows that they speak for.</summary>
/// <param name="catalog">The open catalog.</param>
internal sealed class ExperimentEntries(Catalog catalog)
{
    /// <summary>Sequences of the entries that planned, sealed, amended, brought values for, tested, decided or changed an experiment.</summary>
    /// <param name="campaign">Code of the campaign.</param>
    /// <param name="experiment">Code of the experiment.</param>
    public HashSet<long> Of(string campaign, string experiment)
    {
        using SqliteStatement rows = catalog.Prepare(
            """
            WITH x AS (SELECT e.id FROM experiments e JOIN campaigns c ON c.id = e.campaign_id WHERE c.code = ?1 AND e.code = ?2)
            SELECT sequence FROM ledger WHERE campaign = ?1 AND action IN ('plan', 'seal')
            UNION SELECT v.sequence FROM ledger_evidence v JOIN x ON
                (v.kind = 'load' AND v.owner IN (SELECT load_id FROM measurements WHERE experiment_id = x.id))
                OR (v.kind = 'test-run' AND v.owner IN (SELECT test_run_id FROM test_results WHERE experiment_id = x.id))
                OR (v.kind = 'exclusion' AND v.owner IN (SELECT id FROM exclusions WHERE experiment_id = x.id))
                OR (v.kind = 'withdrawal' AND v.owner IN (SELECT id FROM withdrawals WHERE experiment_id = x.id))
                OR (v.kind = 'amendment' AND v.owner IN (SELECT amendment_id FROM plan_amendment_changes WHERE experiment_id = x.id))
                OR (v.kind = 'levels' AND EXISTS (SELECT 1 FROM stream_entries s WHERE s.experiment_id = x.id AND s.stream_id = v.owner AND s.position BETWEEN v.first AND v.last))
                OR (v.kind = 'decisions' AND EXISTS (SELECT 1 FROM stream_entries s JOIN standing_decisions d ON d.stream_id = s.stream_id AND d.position = s.position
                    WHERE s.experiment_id = x.id AND d.stream_id = v.owner AND d.known_order BETWEEN v.first AND v.last))
            UNION SELECT c.sequence FROM ledger_changes c JOIN ledger l ON l.sequence = c.sequence WHERE l.campaign = ?1 AND substr(c.what, 1, length(?2) + 2) = ?2 || ': '
            """);
        rows.Bind(1, campaign).Bind(2, experiment);
        var sequences = new HashSet<long>();
        while (rows.Read())
        {
            sequences.Add(rows.Integer(0));
        }

        return sequences;
    }
}
