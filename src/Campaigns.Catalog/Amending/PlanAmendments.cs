using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Amending;

/// <summary>The amendments of a campaign's sealed plan.</summary>
/// <remarks>Campaigns without any, which is nearly all, cost one look at an index; else O(changes), one statement.</remarks>
internal sealed class PlanAmendments
{
    private readonly List<PlanAmendment> _all = [];
    private readonly Dictionary<long, List<string>> _sentences = [];
    private readonly Dictionary<long, DateTimeOffset> _addedAt = [];
    private readonly HashSet<long> _changed = [];

    public PlanAmendments(Catalog catalog, long campaignId)
    {
        using SqliteStatement any = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM plan_amendments WHERE campaign_id = ?1)");
        any.Bind(1, campaignId).Read();
        bool none = any.Integer(0) == 0;
        any.Reset();
        if (none)
        {
            return;
        }

        using SqliteStatement select = catalog.Prepare(
            """
            SELECT a.number, a.reason, a.named_by, a.made_at, c.experiment_id, e.code, c.field, c.before, c.after
            FROM plan_amendments a JOIN plan_amendment_changes c ON c.amendment_id = a.id JOIN experiments e ON e.id = c.experiment_id
            WHERE a.campaign_id = ?1 ORDER BY a.number, c.experiment_id, c.field
            """);
        select.Bind(1, campaignId);
        List<PlanAmendmentChange> changes = [];
        while (select.Read())
        {
            if (_all.Count == 0 || _all[^1].Number != select.Integer(0))
            {
                changes = [];
                _all.Add(new PlanAmendment((int)select.Integer(0), select.Text(1), select.Text(2), Instants.FromMicroseconds(select.Integer(3)), changes));
            }

            var change = new PlanAmendmentChange(select.Text(5), select.Text(6), select.NullableText(7), select.NullableText(8));
            changes.Add(change);
            Remember(select.Integer(4), change);
        }
    }

    /// <summary>Every amendment, oldest first.</summary>
    public IReadOnlyList<PlanAmendment> All => _all;

    /// <summary>How far the plan was amended.</summary>
    public AmendedPlan Counts => new(_all.Count, _addedAt.Count, _changed.Count);

    /// <summary>Experiments that were added or changed.</summary>
    public IReadOnlyCollection<long> Ids => _sentences.Keys;

    /// <summary>What amendments did to an experiment, in plain words, oldest first.</summary>
    public IReadOnlyList<string> Sentences(long experimentId) => _sentences.TryGetValue(experimentId, out List<string>? found) ? found : [];

    /// <summary>When an amendment added an experiment; null where it was in the sealed plan.</summary>
    public DateTimeOffset? AddedAt(long experimentId) => _addedAt.TryGetValue(experimentId, out DateTimeOffset at) ? at : null;

    private void Remember(long experimentId, PlanAmendmentChange change)
    {
        PlanAmendment amendment = _all[^1];
        if (!_sentences.TryGetValue(experimentId, out List<string>? sentences))
        {
            _sentences[experimentId] = sentences = [];
        }

        sentences.Add(change.Sentence(amendment));
        if (change.IsAdded)
        {
            _addedAt[experimentId] = amendment.At;
        }
        else
        {
            _changed.Add(experimentId);
        }
    }
}

/// <summary>Reads the amendments of sealed plans.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class PlanAmendmentReader(Catalog catalog)
{
    /// <summary>Every amendment of a campaign's plan, oldest first.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public IReadOnlyList<PlanAmendment> All(string code) => new PlanAmendments(catalog, new CampaignStore(catalog).Get(code).Id).All;
}
