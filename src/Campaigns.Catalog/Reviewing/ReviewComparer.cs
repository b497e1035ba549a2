using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Reviewing;

/// <summary>Compares two reviews of a campaign from what the catalog kept of them.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class ReviewComparer(Catalog catalog)
{
    /// <summary>Which experiments were gained and lost between two reviews, and why; with the codes of the experiments by their keys.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="earlier">Number of the earlier review.</param>
    /// <param name="later">Number of the later one.</param>
    /// <exception cref="RefusedException">There is no such campaign or review.</exception>
    public (ReviewComparison Comparison, IReadOnlyDictionary<long, string> Codes) Compare(string code, int earlier, int later) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        var reader = new ReviewReader(catalog);
        StoredReview before = reader.Get(stored, earlier);
        StoredReview after = reader.Get(stored, later);
        var events = new ReviewEvents(catalog, stored, before.Position, after.Position);
        var missing = new Missing(catalog, stored, before, after);
        ReviewComparison comparison = ReviewComparison.Of(stored.Campaign, reader.Whole(stored, before), reader.Whole(stored, after), events.ByExperiment, missing.Why);
        comparison = comparison with { PlanBefore = reader.PlanVersion(stored, before), PlanAfter = reader.PlanVersion(stored, after) };
        return (comparison, (IReadOnlyDictionary<long, string>)new PlanStore(catalog).Codes(stored.Id));
    });

    /// <summary>Why experiments have no line in one of the reviews; what the answers need is read when the first is asked for.</summary>
    private sealed class Missing(Catalog catalog, StoredCampaign stored, StoredReview before, StoredReview after)
    {
        private readonly Lazy<(Dictionary<long, bool> Results, StandingWithdrawals Withdrawals)> _before = new(() => Read(catalog, stored, before));
        private readonly Lazy<(Dictionary<long, bool> Results, StandingWithdrawals Withdrawals)> _after = new(() => Read(catalog, stored, after));

        public ReviewReason Why(bool inLater, long experiment)
        {
            (Dictionary<long, bool> results, StandingWithdrawals withdrawals) = (inLater ? _after : _before).Value;
            return withdrawals.IsWithdrawn(experiment) ? ReviewReason.Withdrawn
                : !results.TryGetValue(experiment, out bool hasP) ? ReviewReason.FirstTested
                : hasP ? ReviewReason.AwaitsTest : ReviewReason.NoResult;
        }

        /// <summary>Whether the latest result of each experiment before a review has a p-value, and who was withdrawn then.</summary>
        private static (Dictionary<long, bool> Results, StandingWithdrawals Withdrawals) Read(Catalog catalog, StoredCampaign stored, StoredReview review)
        {
            var results = new Dictionary<long, bool>();
            using SqliteStatement select = catalog.Prepare(
                """
                SELECT r.experiment_id, r.p IS NOT NULL FROM test_results r JOIN test_runs t ON t.id = r.test_run_id
                WHERE t.campaign_id = ?1 AND t.id <= ?2 ORDER BY r.test_run_id
                """);
            select.Bind(1, stored.Id).Bind(2, review.LastTestRunId);
            while (select.Read())
            {
                results[select.Integer(0)] = select.Integer(1) != 0;
            }

            return (results, new StandingWithdrawals(catalog, stored.Id, review.Position));
        }
    }
}
