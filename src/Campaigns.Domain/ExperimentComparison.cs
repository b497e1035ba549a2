using Campaigns.Statistics.Effects;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>One comparison of two groups inside an experiment, with what the campaign makes of it.</summary>
/// <param name="Experiment">The experiment.</param>
/// <param name="GroupA">Label of the group that is taken away.</param>
/// <param name="GroupB">Label of the group that it is taken from.</param>
/// <param name="Comparison">The comparison inside the experiment.</param>
public sealed record ExperimentComparison(ExperimentResult Experiment, string GroupA, string GroupB, GroupComparison Comparison)
{
    /// <summary>The p-value that also accounts for the selection of the experiment; null where the comparison has none, or the experiment was not selected and its error rate gives none without.</summary>
    public PValue? AdjustedP { get; init; }

    /// <summary>Whether the comparison is claimed: its experiment survives, and its own adjusted p-value is at most the level. Null where it has no p-value.</summary>
    public bool? Survives { get; init; }

    /// <summary>The interval that also accounts for the selection of the experiment: it holds together with the others of the experiment at <see cref="SelectedConfidence"/>; null where the experiment does not survive, or the follow-up gives none.</summary>
    public Interval? SelectedInterval { get; init; }

    /// <summary>The confidence of that interval, in (0, 1): 1 - level R/m under false discovery control, 1 - level/m under familywise control; null without one.</summary>
    public double? SelectedConfidence { get; init; }

    /// <summary>Why it is not claimed, in a clause without a full stop; null where it is.</summary>
    public string? NotClaimedBecause { get; init; }
}
