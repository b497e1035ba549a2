using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Results;

/// <summary>Finds the experiments that those of a campaign confirm, and judges the pairs.</summary>
/// <param name="catalog">The open catalog.</param>
/// <param name="read">Reads another campaign as it stands, without its confirmations.</param>
internal sealed class ConfirmationReader(Catalog catalog, Func<string, CampaignStanding> read)
{
    private readonly Dictionary<string, CampaignStanding> _others = new(StringComparer.Ordinal);

    /// <summary>The experiments with what came of their confirmations; as they are where none confirms another.</summary>
    /// <param name="stored">The campaign.</param>
    /// <param name="standing">The campaign as it stands.</param>
    /// <remarks>Every other campaign that is confirmed is read once.</remarks>
    public IReadOnlyList<ExperimentResult> Apply(StoredCampaign stored, CampaignStanding standing)
    {
        IReadOnlyList<ExperimentResult> experiments = standing.Experiments;
        if (experiments.All(e => e.Plan.Confirms is null))
        {
            return experiments;
        }

        _others[stored.Campaign.Code] = standing;
        using var known = new ConfirmedExperiments(catalog);
        var amendments = new PlanAmendments(catalog, stored.Id);
        return Replicability.Apply(stored.Campaign, experiments, [.. experiments.Select(e => e is { Plan.Confirms: { } reference, LeftFamily: false } ? Earlier(stored, known, amendments, e.Plan.Code, reference) : null)]);
    }

    private EarlierExperiment? Earlier(StoredCampaign stored, ConfirmedExperiments known, PlanAmendments amendments, string code, string reference)
    {
        if (known.Find(stored.Id, reference) is not { } found)
        {
            return null;
        }

        CampaignStanding standing = _others.TryGetValue(found.Campaign, out CampaignStanding? other) ? other : _others[found.Campaign] = read(found.Campaign);
        ExperimentResult first = standing.Experiments.First(e => e.Plan.Code == found.Code);
        FamilyStanding family = first.Family ?? standing.Families[0];

        // A plan that was sealed as one holds both before either was tested; one that an amendment added was planned on that day.
        DateTimeOffset? addedAt = amendments.Counts.Added == 0 ? null : amendments.AddedAt(known.Find(stored.Id, code)!.Id);
        bool before = (found.CampaignId != stored.Id || addedAt is not null) && FirstTestOf(found.Id) is { } tested && !((addedAt ?? stored.Campaign.SealedAt) < tested);
        return new EarlierExperiment(found.Campaign, found.Code, first.P, family.Name, family.Size, before) { IsInFamily = !first.LeftFamily };
    }

    private DateTimeOffset? FirstTestOf(long experimentId)
    {
        using SqliteStatement select = catalog.Prepare("SELECT min(t.ran_at) FROM test_results r JOIN test_runs t ON t.id = r.test_run_id WHERE r.experiment_id = ?1");
        select.Bind(1, experimentId).Read();
        return select.NullableInteger(0) is { } at ? Instants.FromMicroseconds(at) : null;
    }
}
