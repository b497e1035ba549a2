using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Reviewing;

/// <summary>What the plan of a campaign said at earlier positions of its record: what it says today with the amendments after them undone.</summary>
/// <remarks>Campaigns without an amendment, which is nearly all, cost one look.</remarks>
internal sealed class PlanThen
{
    private readonly Dictionary<(long ExperimentId, string Field), List<(long AmendmentId, string? Before)>> _changes = [];

    public PlanThen(Catalog catalog, long campaignId)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT c.experiment_id, c.field, c.amendment_id, c.before FROM plan_amendments a JOIN plan_amendment_changes c ON c.amendment_id = a.id
            WHERE a.campaign_id = ?1 ORDER BY c.amendment_id
            """);
        select.Bind(1, campaignId);
        while (select.Read())
        {
            (long, string) key = (select.Integer(0), select.Text(1));
            if (!_changes.TryGetValue(key, out List<(long, string?)>? changes))
            {
                _changes[key] = changes = [];
            }

            changes.Add((select.Integer(2), select.NullableText(3)));
        }
    }

    /// <summary>Whether the plan was amended at all.</summary>
    public bool Any => _changes.Count > 0;

    /// <summary>A field of an experiment as it stood at a position.</summary>
    /// <param name="experimentId">The experiment.</param>
    /// <param name="field">Column of the plan.</param>
    /// <param name="today">What it says today.</param>
    /// <param name="lastAmendmentId">The latest amendment before that position; null where there was none.</param>
    public string? Of(long experimentId, string field, string? today, long? lastAmendmentId) =>
        Later(experimentId, field, lastAmendmentId) is { } change ? change.Before : today;

    /// <summary>Whether the plan had the experiment at a position.</summary>
    public bool Has(long experimentId, long? lastAmendmentId) => Later(experimentId, PlanAmendmentChange.Added, lastAmendmentId) is null;

    private (long AmendmentId, string? Before)? Later(long experimentId, string field, long? lastAmendmentId)
    {
        if (_changes.Count == 0 || !_changes.TryGetValue((experimentId, field), out List<(long AmendmentId, string? Before)>? changes))
        {
            return null;
        }

        int first = changes.FindIndex(c => c.AmendmentId > (lastAmendmentId ?? 0));
        return first < 0 ? null : changes[first];
    }
}
