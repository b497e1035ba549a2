using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Selection;

namespace Campaigns.Domain;

/// <summary>What a campaign makes of the comparisons inside its experiments: the one way from their p-values to what is claimed.</summary>
/// <param name="campaign">Error rate and level.</param>
/// <param name="families">Its families in figures: each with its size m and its survivors R.</param>
public sealed class ComparisonVerdict(Campaign campaign, IReadOnlyList<FamilyStanding> families)
{
    /// <summary>What is held, in a sentence.</summary>
    public string Guarantee => string.Join(" ", families.Select(GuaranteeOf));

    /// <summary>The comparisons of one experiment, judged.</summary>
    /// <param name="experiment">The experiment as it stands in the campaign.</param>
    /// <param name="labels">Label of each group.</param>
    /// <param name="comparisons">Its comparisons.</param>
    public IReadOnlyList<ExperimentComparison> Judge(ExperimentResult experiment, IReadOnlyList<string> labels, IReadOnlyList<GroupComparison> comparisons)
    {
        ArgumentNullException.ThrowIfNull(experiment);
        ArgumentNullException.ThrowIfNull(labels);
        ArgumentNullException.ThrowIfNull(comparisons);
        return [.. comparisons.Select(c => Judge(new ExperimentComparison(experiment, labels[c.GroupA], labels[c.GroupB], c)))];
    }

    private string GuaranteeOf(FamilyStanding family) => campaign.ErrorRate == ErrorRate.Familywise
        ? FormattableString.Invariant($"Comparisons are claimed only inside surviving experiments, each experiment's at level {family.Level}/{family.Size}: the probability of any false comparison in the campaign is at most {family.Level} (union bound).")
        : family.Survivors == 0 ? FormattableString.Invariant($"Comparisons are claimed only inside surviving experiments; none of the {family.Size} survives.")
        : FormattableString.Invariant($"Comparisons are claimed only inside the {family.Survivors} surviving of {family.Size} experiments, at level {family.Level} x {family.Survivors}/{family.Size}: the expected error inside them, averaged over the survivors, is at most {family.Level} (Benjamini and Bogomolov 2014; for independent experiments).");

    private ExperimentComparison Judge(ExperimentComparison comparison)
    {
        if (comparison.Comparison.P is not { } p)
        {
            return comparison with { NotClaimedBecause = comparison.Comparison.Obstacle };
        }

        FamilyStanding family = families.FirstOrDefault(f => f.Name == (comparison.Experiment.Plan.Family ?? "")) ?? families[0];
        bool selected = comparison.Experiment.Survives == true;
        PValue? adjusted =
            campaign.ErrorRate == ErrorRate.Familywise ? SelectedFamilies.Familywise(p, family.Size)
            : selected ? SelectedFamilies.FalseDiscovery(p, family.Size, family.Survivors)
            : null;
        bool survives = selected && family.Level.Rejects(adjusted!.Value);
        return comparison with
        {
            AdjustedP = adjusted,
            Survives = survives,
            NotClaimedBecause = survives ? null : selected ? "its adjusted p is above the level" : "its experiment does not survive",
        };
    }
}
