using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Selection;

namespace Campaigns.Domain;

/// <summary>What a campaign makes of the comparisons inside its experiments: the one way from their p-values to what is claimed.</summary>
/// <param name="campaign">Error rate and level.</param>
/// <param name="familySize">Experiments in the family, m.</param>
/// <param name="survivors">Experiments that survive, R.</param>
public sealed class ComparisonVerdict(Campaign campaign, int familySize, int survivors)
{
    /// <summary>What is held, in a sentence.</summary>
    public string Guarantee => campaign.ErrorRate == ErrorRate.Familywise
        ? FormattableString.Invariant($"Comparisons are claimed only inside surviving experiments, each experiment's at level {campaign.Level}/{familySize}: the probability of any false comparison in the campaign is at most {campaign.Level} (union bound).")
        : survivors == 0 ? FormattableString.Invariant($"Comparisons are claimed only inside surviving experiments; none of the {familySize} survives.")
        : FormattableString.Invariant($"Comparisons are claimed only inside the {survivors} surviving of {familySize} experiments, at level {campaign.Level} x {survivors}/{familySize}: the expected error inside them, averaged over the survivors, is at most {campaign.Level} (Benjamini and Bogomolov 2014; for independent experiments).");

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

    private ExperimentComparison Judge(ExperimentComparison comparison)
    {
        if (comparison.Comparison.P is not { } p)
        {
            return comparison with { NotClaimedBecause = comparison.Comparison.Obstacle };
        }

        bool selected = comparison.Experiment.Survives == true;
        PValue? adjusted =
            campaign.ErrorRate == ErrorRate.Familywise ? SelectedFamilies.Familywise(p, familySize)
            : selected ? SelectedFamilies.FalseDiscovery(p, familySize, survivors)
            : null;
        bool survives = selected && campaign.Level.Rejects(adjusted!.Value);
        return comparison with
        {
            AdjustedP = adjusted,
            Survives = survives,
            NotClaimedBecause = survives ? null : selected ? "its adjusted p is above the level" : "its experiment does not survive",
        };
    }
}
