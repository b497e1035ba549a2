using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.FollowUps;

namespace Campaigns.Catalog.Results;

/// <summary>Computes the follow-up comparisons of a campaign's experiments from the values that were tested.</summary>
/// <remarks>Comparisons are not stored: the values, the exclusions and the plan are, and give the same comparisons every time. One look-up for all experiments, O(values + comparisons).</remarks>
/// <param name="catalog">The open catalog.</param>
public sealed class ComparisonReader(Catalog catalog)
{
    /// <summary>The comparisons of every experiment with a standing result whose plan names a follow-up, experiment by experiment in the plan's order.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    public IEnumerable<ExperimentComparison> All(CampaignStanding standing)
    {
        ArgumentNullException.ThrowIfNull(standing);
        return Read(standing.Campaign, standing.Experiments, only: null, standing.Families);
    }

    /// <summary>The comparisons of a few surviving experiments.</summary>
    /// <param name="overview">The campaign in figures.</param>
    /// <param name="survivors">Experiments that survive.</param>
    public ILookup<string, ExperimentComparison> OfSurvivors(CampaignOverview overview, IReadOnlyList<ExperimentResult> survivors)
    {
        ArgumentNullException.ThrowIfNull(overview);
        ArgumentNullException.ThrowIfNull(survivors);
        string[] followed = [.. survivors.Where(s => s.Plan.FollowUp != FollowUpRegistry.None).Select(s => s.Plan.Code)];
        return Read(overview.Campaign, survivors, followed, overview.Families)
            .ToLookup(c => c.Experiment.Plan.Code, StringComparer.Ordinal);
    }

    private IEnumerable<ExperimentComparison> Read(Campaign campaign, IReadOnlyList<ExperimentResult> experiments, IEnumerable<string>? only, IReadOnlyList<FamilyStanding> families)
    {
        long campaignId = new CampaignStore(catalog).Get(campaign.Code).Id;
        var verdict = new ComparisonVerdict(campaign, families);
        var byCode = experiments.ToDictionary(e => e.Plan.Code, StringComparer.Ordinal);
        var exclusions = new StandingExclusions(catalog, campaignId);
        using var rows = new ValueRows(catalog, campaignId, exclusions, only);
        while (rows.Next())
        {
            if (byCode.TryGetValue(rows.Code, out ExperimentResult? experiment) && experiment.P is not null)
            {
                var followUp = PlannedFollowUp.Of(experiment.Plan, rows.Labels, rows.Values.Sample(rows.Labels.Length), campaign.Level);
                foreach (ExperimentComparison comparison in verdict.Judge(experiment, rows.Labels, followUp))
                {
                    yield return comparison;
                }
            }
        }
    }
}
