using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Results;

/// <summary>Reads in which order the experiments of a campaign were tested.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class TestOrderReader(Catalog catalog)
{
    /// <summary>For each experiment that was tested, the number of its latest test run; runs count up over the whole catalog.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public IReadOnlyDictionary<string, long> LatestRuns(string code)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.code, max(r.test_run_id) FROM experiments e JOIN test_results r ON r.experiment_id = e.id
            WHERE e.campaign_id = ?1 GROUP BY e.id
            """);
        select.Bind(1, new CampaignStore(catalog).Get(code).Id);
        var runs = new Dictionary<string, long>(StringComparer.Ordinal);
        while (select.Read())
        {
            runs.Add(select.Text(0), select.Integer(1));
        }

        return runs;
    }
}
