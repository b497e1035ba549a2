using System.Globalization;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>T11: the catalog of every earlier schema is upgraded, and every result and decision is what its file held before.</summary>
internal sealed class EarlierSchemas : TortureTest
{
    public override string Key => "T11";

    public override string What => "catalogs of earlier schemas";

    public override int Full => Fixture.All().Length;

    public override int Short => Full;

    public override void Run(Tally tally, int tries, Random random)
    {
        foreach (string fixture in Fixture.All())
        {
            tally.Try(Path.GetFileName(fixture), () => Fault(fixture));
        }
    }

    private static string? Fault(string fixture)
    {
        using var bench = new Workbench();
        Fixture.Unpack(fixture, bench.Catalog);
        string[] campaigns;
        string[] reviews;
        var results = new Dictionary<string, string>(StringComparer.Ordinal);
        using (SqliteConnection old = Inspection.Open(bench.Catalog))
        {
            campaigns = Inspection.Texts(old, "SELECT code FROM campaigns ORDER BY id");
            reviews = Reviews(old);
            foreach (string row in Inspection.Texts(
                old,
                """
                SELECT c.code || '/' || e.code || '|' || printf('%!.17g', r.statistic) || '|' || printf('%!.17g', r.p) FROM test_results r
                JOIN experiments e ON e.id = r.experiment_id JOIN campaigns c ON c.id = e.campaign_id
                WHERE r.p IS NOT NULL AND r.test_run_id = (SELECT max(n.test_run_id) FROM test_results n WHERE n.experiment_id = r.experiment_id)
                """))
            {
                results.Add(row[..row.IndexOf('|', StringComparison.Ordinal)], row[(row.IndexOf('|', StringComparison.Ordinal) + 1)..]);
            }
        }

        if (results.Count == 0)
        {
            return "the fixture holds no results";
        }

        Ran upgrade = bench.RunProcess(TimeSpan.FromMinutes(1), "upgrade");
        if (upgrade.Code != 0)
        {
            return upgrade.Error;
        }

        foreach (string campaign in campaigns)
        {
            Ran shown = bench.Run("results", campaign, "--format", "csv");
            string[] lines = shown.Out.Split('\n', StringSplitOptions.RemoveEmptyEntries);
            List<string> columns = [.. lines[0].Split(',')];
            int statistic = columns.IndexOf("statistic"), p = columns.IndexOf("p"), status = columns.IndexOf("status");
            foreach (string[] cells in lines[1..].Select(l => l.Split(',')))
            {
                if (!results.Remove($"{campaign}/{cells[0]}", out string? stored))
                {
                    continue;
                }

                // One that was withdrawn keeps its result in the record and shows none.
                if (cells[status] == "withdrawn" && cells[p].Length == 0)
                {
                    continue;
                }

                if (!(Same(stored.Split('|')[0], cells[statistic]) && Same(stored.Split('|')[1], cells[p])))
                {
                    return $"{campaign}/{cells[0]}: {stored} became {cells[statistic]}|{cells[p]}";
                }
            }
        }

        using SqliteConnection now = Inspection.Open(bench.Catalog);
        return results.Count > 0 ? $"no longer shown: {results.Keys.First()}"
            : !reviews.SequenceEqual(Reviews(now)) ? "a review became another"
            : Inspection.Fault(bench.Catalog);
    }

    private static string[] Reviews(SqliteConnection connection) =>
        Inspection.Texts(connection, "SELECT number || ' ' || taken_at || ' ' || correction || ' ' || level || ' ' || family_size || ' ' || survivor_count || ' ' || hex(lines) FROM reviews ORDER BY id");

    private static bool Same(string stored, string shown) =>
        BitConverter.DoubleToInt64Bits(double.Parse(stored, NumberStyles.Float, CultureInfo.InvariantCulture)) == BitConverter.DoubleToInt64Bits(double.Parse(shown, NumberStyles.Float, CultureInfo.InvariantCulture));
}
