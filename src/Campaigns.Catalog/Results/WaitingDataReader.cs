using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Results;

/// <summary>How many experiments of a campaign have data that nobody has tested.</summary>
/// <param name="Planned">Experiments of the plan, withdrawn ones included.</param>
/// <param name="NeverTested">Experiments that hold a value, were never tested and are not withdrawn.</param>
/// <param name="AsManyAsPlanned">Those of them that hold, over all their groups, at least the planned number of values; where the plan gives no number, all.</param>
public readonly record struct WaitingData(int Planned, int NeverTested, int AsManyAsPlanned);

/// <summary>Counts data that wait for their test, over all campaigns at once.</summary>
/// <remarks>
/// From counts alone: no measurement is unpacked. Whether every single group of an experiment is complete is for the test run to see, so <see cref="WaitingData.AsManyAsPlanned"/> is not a promise that all of them will be tested.
/// </remarks>
/// <param name="catalog">The open catalog.</param>
public sealed class WaitingDataReader(Catalog catalog)
{
    /// <summary>The counts by the code of the campaign. Two statements, whatever the number of campaigns and experiments.</summary>
    public IReadOnlyDictionary<string, WaitingData> Read() => catalog.Snapshot(() =>
    {
        using SqliteStatement planned = catalog.Prepare("SELECT c.code, (SELECT count(*) FROM experiments e WHERE e.campaign_id = c.id) FROM campaigns c");
        var found = new Dictionary<string, WaitingData>();
        while (planned.Read())
        {
            found.Add(planned.Text(0), new WaitingData((int)planned.Integer(1), 0, 0));
        }

        using SqliteStatement waiting = catalog.Prepare(
            """
            WITH untested AS (
                SELECT e.campaign_id, coalesce((SELECT sum(m.value_count) FROM measurements m WHERE m.experiment_id = e.id), 0) AS at_hand,
                    coalesce(e.replicates * (SELECT count(*) FROM groups g WHERE g.group_set_id = e.group_set_id), 1) AS wanted
                FROM experiments e
                WHERE NOT EXISTS (SELECT 1 FROM test_results r WHERE r.experiment_id = e.id)
                    AND coalesce((SELECT w.is_withdrawn FROM withdrawals w WHERE w.experiment_id = e.id ORDER BY w.id DESC LIMIT 1), 0) = 0)
            SELECT c.code, count(*), sum(u.at_hand >= u.wanted) FROM untested u JOIN campaigns c ON c.id = u.campaign_id WHERE u.at_hand > 0 GROUP BY c.id
            """);
        while (waiting.Read())
        {
            string code = waiting.Text(0);
            found[code] = found[code] with { NeverTested = (int)waiting.Integer(1), AsManyAsPlanned = (int)waiting.Integer(2) };
        }

        return (IReadOnlyDictionary<string, WaitingData>)found;
    });
}
