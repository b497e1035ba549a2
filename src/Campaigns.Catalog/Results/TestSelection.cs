using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Catalog.Results;

/// <summary>Which experiments a test run takes up. A row an experiment and load, by experiment: its key, code, group set, whether its groups are planned, replicates, test, packed values, load, and whether it was tested before.</summary>
internal static class TestSelection
{
    private const string Columns =
        "e.id, e.code, e.group_set_id, e.groups_are_planned, e.replicates, e.test, m.packed, m.load_id";

    /// <summary>Whether the experiment was tested before, and values of it were left out or it was withdrawn since: it was complete, or taken incomplete on purpose, and neither makes it less so.</summary>
    public const string TestedBefore =
        """
        (EXISTS (SELECT 1 FROM exclusions x WHERE x.experiment_id = e.id) OR EXISTS (SELECT 1 FROM withdrawals w WHERE w.experiment_id = e.id))
            AND EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = e.id)
        """;

    private const string All =
        $"SELECT {Columns}, 0 FROM experiments e JOIN measurements m ON m.experiment_id = e.id WHERE e.campaign_id = ?1 ORDER BY e.id, m.load_id";

    // A cross join is SQLite's way of being told where to begin: at the few experiments that received data, not at all there are; and without the index it would walk through all values for the order's sake.
    private const string WithNewsAfterRun =
        $"""
        SELECT {Columns}, {TestedBefore} FROM (SELECT experiment_id FROM measurements INDEXED BY ix_measurements_load WHERE load_id > ?2 UNION SELECT experiment_id FROM exclusions WHERE id > ?3
            UNION SELECT experiment_id FROM withdrawals WHERE id > ?4
            UNION SELECT experiment_id FROM plan_amendment_changes c WHERE c.amendment_id > ?5 AND NOT EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = c.experiment_id)) n
        CROSS JOIN experiments e ON e.id = n.experiment_id CROSS JOIN measurements m ON m.experiment_id = e.id
        WHERE e.campaign_id = ?1 ORDER BY e.id, m.load_id
        """;

    private const string Untested =
        $"""
        SELECT {Columns}, {TestedBefore} FROM experiments e JOIN measurements m ON m.experiment_id = e.id
        WHERE e.campaign_id = ?1 AND NOT EXISTS (
            SELECT 1 FROM test_results r JOIN test_runs t ON t.id = r.test_run_id
            WHERE r.experiment_id = e.id AND coalesce(t.last_load_id, 0) >= (SELECT max(load_id) FROM measurements WHERE experiment_id = e.id)
                AND coalesce(t.last_exclusion_id, 0) >= (SELECT coalesce(max(id), 0) FROM exclusions WHERE experiment_id = e.id)
                AND coalesce(t.last_withdrawal_id, 0) >= (SELECT coalesce(max(id), 0) FROM withdrawals WHERE experiment_id = e.id))
        ORDER BY e.id, m.load_id
        """;

    /// <summary>Only a sealed campaign is tested.</summary>
    /// <exception cref="RefusedException">It is not sealed.</exception>
    public static void DemandSealed(Campaign campaign)
    {
        if (!campaign.IsSealed)
        {
            throw new RefusedException($"The campaign '{campaign.Code}' is not sealed: level, correction and family must be fixed before the first result is seen; run 'campaigns seal {campaign.Code}'.");
        }
    }

    /// <summary>What the latest run had seen; null before the first.</summary>
    public static RecordPosition? LastRun(Catalog catalog, long campaignId)
    {
        using SqliteStatement select = catalog.Prepare("SELECT last_load_id, last_exclusion_id, last_amendment_id, last_withdrawal_id FROM test_runs WHERE campaign_id = ?1 ORDER BY id DESC LIMIT 1");
        return select.Bind(1, campaignId).Read()
            ? new RecordPosition(select.NullableInteger(0), select.NullableInteger(1), select.NullableInteger(2), select.NullableInteger(3))
            : null;
    }

    /// <summary>The rows; withdrawn experiments are among them.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    /// <param name="last">What the latest run had seen; null before the first.</param>
    /// <param name="includeIncomplete">Whether experiments that were left alone before are taken up, too.</param>
    public static SqliteStatement Of(Catalog catalog, long campaignId, RecordPosition? last, bool includeIncomplete)
    {
        string sql = last is null ? All : includeIncomplete ? Untested : WithNewsAfterRun;
        SqliteStatement select = catalog.Prepare(sql);
        select.Bind(1, campaignId);
        if (sql == WithNewsAfterRun)
        {
            select.Bind(2, last!.LastLoadId ?? 0).Bind(3, last.LastExclusionId ?? 0).Bind(4, last.LastWithdrawalId ?? 0).Bind(5, last.LastAmendmentId ?? 0);
        }

        return select;
    }

    /// <summary>Experiments that have values and no result, and are not withdrawn, in the plan's order: those that were left alone before and received nothing since.</summary>
    public static IReadOnlyList<(long Id, string Code)> Waiting(Catalog catalog, long campaignId)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.id, e.code FROM experiments e WHERE e.campaign_id = ?1
                AND EXISTS (SELECT 1 FROM measurements m WHERE m.experiment_id = e.id)
                AND NOT EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = e.id)
                AND coalesce((SELECT w.is_withdrawn FROM withdrawals w WHERE w.experiment_id = e.id ORDER BY w.id DESC LIMIT 1), 0) = 0
            ORDER BY e.id
            """);
        select.Bind(1, campaignId);
        var waiting = new List<(long, string)>();
        while (select.Read())
        {
            waiting.Add((select.Integer(0), select.Text(1)));
        }

        return waiting;
    }

    /// <summary>The planned test of a row.</summary>
    /// <exception cref="RefusedException">This program does not have it.</exception>
    public static GroupTest TestOf(SqliteStatement row)
    {
        string key = row.Text(5);
        return GroupTestRegistry.Find(key)
            ?? throw new RefusedException($"The plan of experiment '{row.Text(1)}' names the test '{key}', which this version of the program does not have.");
    }
}
