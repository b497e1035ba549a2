using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Effects;
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

    /// <summary>What the intervals of comparisons inside survivors hold, in a sentence; empty where nothing survives.</summary>
    public string SelectedGuarantee => string.Join(" ", families.Where(f => f.Survivors > 0).Select(SelectedGuaranteeOf));

    /// <summary>The probability with which any interval inside a surviving experiment may miss, so that the campaign's level pays for the selection too.</summary>
    /// <param name="experiment">The experiment as it stands in the campaign.</param>
    /// <returns>level R/m under false discovery control, level/m under familywise control; null for an experiment that does not survive.</returns>
    public double? SelectedRisk(ExperimentResult experiment)
    {
        ArgumentNullException.ThrowIfNull(experiment);
        FamilyStanding family = FamilyOf(experiment);
        return experiment.Survives != true ? null
            : campaign.ErrorRate == ErrorRate.Familywise ? SelectedIntervals.FamilywiseRisk(family.Level, family.Size)
            : SelectedIntervals.FalseCoverageRisk(family.Level, family.Size, family.Survivors);
    }

    /// <summary>The comparisons of one experiment, judged, with the intervals that account for its selection.</summary>
    /// <param name="experiment">The experiment as it stands in the campaign.</param>
    /// <param name="labels">Label of each group.</param>
    /// <param name="followUp">Its follow-up; null where there is none.</param>
    public IReadOnlyList<ExperimentComparison> Judge(ExperimentResult experiment, IReadOnlyList<string> labels, PlannedFollowUp? followUp)
    {
        IReadOnlyList<ExperimentComparison> judged = Judge(experiment, labels, followUp?.Comparisons ?? []);
        if (followUp is null || SelectedRisk(experiment) is not { } risk)
        {
            return judged;
        }

        double confidence = 1 - risk;
        if (confidence == 1)
        {
            // A level below the grain of doubles: there is no such interval.
            return judged;
        }

        IReadOnlyList<GroupComparison> selected = followUp.At(confidence);
        return [.. judged.Select((c, i) => selected[i] is { Lower: { } lower, Upper: { } upper } ? c with { SelectedInterval = new Interval(lower, upper), SelectedConfidence = confidence } : c)];
    }

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

    private string SelectedGuaranteeOf(FamilyStanding family) => campaign.ErrorRate == ErrorRate.Familywise
        ? FormattableString.Invariant($"Selected intervals hold together inside each survivor at 1 - {family.Level}/{family.Size}: the probability that any of them misses is at most {family.Level} (union bound).")
        : FormattableString.Invariant($"Selected intervals hold together inside each survivor at 1 - {family.Level} x {family.Survivors}/{family.Size}: the expected share of survivors in which any of them misses is at most {family.Level} (after Benjamini and Yekutieli 2005; for independent experiments).");

    private FamilyStanding FamilyOf(ExperimentResult experiment) =>
        families.FirstOrDefault(f => f.Name == (experiment.Plan.Family ?? "")) ?? families[0];

    private ExperimentComparison Judge(ExperimentComparison comparison)
    {
        if (comparison.Comparison.P is not { } p)
        {
            return comparison with { NotClaimedBecause = comparison.Comparison.Obstacle };
        }

        FamilyStanding family = FamilyOf(comparison.Experiment);
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
