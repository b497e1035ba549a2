using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Effects;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Selection;

namespace Campaigns.Domain;

/// <summary>What a campaign makes of the comparisons inside its experiments: the one way from their p-values to what is claimed.</summary>
/// <param name="campaign">Error rate and level.</param>
/// <param name="families">Its families in figures: each with its size m and its survivors R.</param>
public sealed class ComparisonVerdict(Campaign campaign, IReadOnlyList<FamilyStanding> families)
{
    /// <summary>
    /// By how much the levels of the families exceed the campaign's, at least 1. A gate that opens when all of a family survives costs nothing for experiments, but a family without a true null may still
    /// hold groups that are alike, so that comparisons pay for every family: their levels are lowered to add up to the campaign's.
    /// </summary>
    private readonly double _crowding = Crowding(campaign, families);

    private readonly Dictionary<string, FamilyStanding> _byName = families.ToDictionary(f => f.Name, StringComparer.Ordinal);

    /// <summary>What is held, in a sentence.</summary>
    public string Guarantee => OnlineVerdict.ProcedureOf(campaign) is not null
        ? FormattableString.Invariant($"Comparisons are claimed only inside surviving experiments, each experiment's at the level that it was given on arrival (adjusted p: p x {campaign.Level} / level given): the error inside each experiment is held at its own level, and no rate over the comparisons of the campaign.")
        : string.Join(" ", [.. families.Select(GuaranteeOf), .. campaign.ErrorRate == ErrorRate.Familywise && families.Count > 1 ? [Together] : (string[])[]]);

    private string Bound => $"the probability of any false comparison in the campaign is at most {campaign.Level} (union bound).";

    private string Together => _crowding == 1
        ? $"Over all families {Bound}"
        : FormattableString.Invariant($"Since a family behind a gate costs nothing for experiments but does for comparisons, these levels are divided by {_crowding:0.####}: over all families {Bound}");

    /// <summary>What the intervals of comparisons inside survivors hold, in a sentence; empty where nothing survives.</summary>
    public string SelectedGuarantee => string.Join(" ", families.Where(f => f.Survivors > 0).Select(SelectedGuaranteeOf));

    /// <summary>The probability with which any interval inside a surviving experiment may miss, so that the campaign's level pays for the selection too.</summary>
    /// <param name="experiment">The experiment as it stands in the campaign.</param>
    /// <returns>level R/m under false discovery control, level/m (or its weight's share) under familywise control, the level given on arrival in a campaign judged as its experiments arrive; null for an experiment that does not survive.</returns>
    public double? SelectedRisk(ExperimentResult experiment)
    {
        ArgumentNullException.ThrowIfNull(experiment);
        if (experiment.Survives != true)
        {
            return null;
        }

        FamilyStanding family = FamilyOf(experiment);
        return OnlineVerdict.ProcedureOf(campaign) is not null ? experiment.GivenLevel
            : campaign.ErrorRate != ErrorRate.Familywise ? SelectedIntervals.FalseCoverageRisk(family.Level, family.Size, family.Survivors)
            : family.WeightTotal is { } total ? family.Level.Value * (experiment.Plan.Weight ?? 1) / (total * _crowding)
            : SelectedIntervals.FamilywiseRisk(family.Level, family.Size) / _crowding;
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

    private static double Crowding(Campaign campaign, IReadOnlyList<FamilyStanding> families)
    {
        const double rounding = 1e-12;
        double ratio = families.Sum(f => f.Level.Value) / campaign.Level.Value;
        return ratio <= 1 + rounding ? 1 : ratio;
    }

    private string GuaranteeOf(FamilyStanding family)
    {
        string inside = family.Name.Length == 0 ? "Comparisons are claimed only inside" : $"In the family '{family.Name}' comparisons are claimed only inside";
        return campaign.ErrorRate == ErrorRate.Familywise ? FormattableString.Invariant($"{inside} surviving experiments, each experiment's at level {family.Level}{(family.WeightTotal is { } total ? FormattableString.Invariant($" times its weight over {total:0.######}") : FormattableString.Invariant($"/{family.Size}"))}{(families.Count == 1 ? $": {Bound}" : ".")}")
            : family.Survivors == 0 ? FormattableString.Invariant($"{inside} surviving experiments; none of the {family.Size} survives.")
            : FormattableString.Invariant($"{inside} the {family.Survivors} surviving of {family.Size} experiments, at level {family.Level} x {family.Survivors}/{family.Size}: the expected error inside them, averaged over the survivors, is at most {family.Level} (Benjamini and Bogomolov 2014; for independent experiments).{Unproved(family)}");
    }

    private string ShareOf(FamilyStanding family)
    {
        string level = _crowding == 1 ? FormattableString.Invariant($"{family.Level}") : FormattableString.Invariant($"{family.Level}/{_crowding:0.####}");
        return family.WeightTotal is { } total ? FormattableString.Invariant($"{level} times its weight over {total:0.######}") : FormattableString.Invariant($"{level}/{family.Size}");
    }

    /// <summary>The share of an experiment's comparisons in its family's level: one hypothesis of the family's size, or its weight of their sum.</summary>
    private PValue Familywise(PValue p, FamilyStanding family, PlannedExperiment plan) => family.WeightTotal is { } total
        ? SelectedFamilies.Weighted(p, total * _crowding, plan.Weight ?? 1)
        : _crowding == 1 ? SelectedFamilies.Familywise(p, family.Size) : SelectedFamilies.Weighted(p, family.Size * _crowding, 1);

    /// <summary>Inside an experiment that does not survive, a comparison cannot be claimed at a smaller level than the experiment itself.</summary>
    private static PValue Sequential(PValue adjusted, ExperimentResult experiment, bool selected) =>
        !selected && experiment.AdjustedP is { } own && own > adjusted ? own : adjusted;

    private string SelectedGuaranteeOf(FamilyStanding family)
    {
        string inside = family.Name.Length == 0 ? "Selected intervals hold together inside each survivor" : $"In the family '{family.Name}' selected intervals hold together inside each survivor";
        return OnlineVerdict.ProcedureOf(campaign) is not null ? $"{inside} at 1 less the level that it was given on arrival: each experiment's error is held at its own level, and no rate over the campaign."
            : campaign.ErrorRate == ErrorRate.Familywise ? FormattableString.Invariant($"{inside} at 1 - {ShareOf(family)}: {(families.Count > 1 ? "over all families " : "")}the probability that any of them misses is at most {campaign.Level} (union bound).")
            : FormattableString.Invariant($"{inside} at 1 - {family.Level} x {family.Survivors}/{family.Size}: the expected share of survivors in which any of them misses is at most {family.Level} (after Benjamini and Yekutieli 2005; for independent experiments).{Unproved(family)}");
    }

    /// <summary>What is said where the number of survivors can change with the data of one of them.</summary>
    private static string Unproved(FamilyStanding family) => CorrectionRegistry.Find(family.Correction) is { IsSimpleSelection: false } correction
        ? $" That is proved for procedures under which an experiment's own data cannot change the number of survivors while it survives; under {correction.Name} they can, so that here it is not proved."
        : "";

    private FamilyStanding FamilyOf(ExperimentResult experiment) => families.Count == 1 ? families[0] : _byName[experiment.Plan.Family ?? ""];

    private ExperimentComparison Judge(ExperimentComparison comparison)
    {
        if (comparison.Comparison.P is not { } p)
        {
            return comparison with { NotClaimedBecause = comparison.Comparison.Obstacle };
        }

        FamilyStanding family = FamilyOf(comparison.Experiment);
        bool selected = comparison.Experiment.Survives == true;
        PValue? adjusted =
            OnlineVerdict.ProcedureOf(campaign) is not null ? selected ? new OnlineLevel(1, comparison.Experiment.GivenLevel ?? 0).Adjusted(p, campaign.Level) : null
            : campaign.ErrorRate == ErrorRate.Familywise ? Sequential(Familywise(p, family, comparison.Experiment.Plan), comparison.Experiment, selected)
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
