using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Domain;

/// <summary>The follow-up comparisons that the plan of an experiment names, made from its values.</summary>
/// <param name="Estimates">What is known of the groups.</param>
/// <param name="Comparisons">The comparisons; empty where the data allow none.</param>
/// <param name="Procedure">The follow-up.</param>
/// <param name="Control">Number of the control's group; null where there is none.</param>
public sealed record PlannedFollowUp(GroupEstimates Estimates, IReadOnlyList<GroupComparison> Comparisons, FollowUp Procedure, int? Control)
{
    /// <summary>The same comparisons with intervals that hold together at another confidence.</summary>
    /// <param name="confidence">In (0, 1).</param>
    public IReadOnlyList<GroupComparison> At(double confidence) => Procedure.Compare(Estimates, Control, confidence);

    /// <summary>Makes the comparisons.</summary>
    /// <param name="plan">Names follow-up, test and control.</param>
    /// <param name="labels">Label of each group.</param>
    /// <param name="readings">The experiment's values.</param>
    /// <param name="level">The intervals hold simultaneously at confidence 1 - level inside the experiment.</param>
    /// <returns>Null where the plan names none, or the data tell nothing of the variation.</returns>
    /// <exception cref="RefusedException">This version of the program does not have the follow-up.</exception>
    public static PlannedFollowUp? Of(PlannedExperiment plan, IReadOnlyList<string> labels, GroupedSample readings, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(plan);
        ArgumentNullException.ThrowIfNull(labels);
        if (plan.FollowUp == FollowUpRegistry.None)
        {
            return null;
        }

        FollowUp followUp = FollowUpRegistry.Find(plan.FollowUp)
            ?? throw new RefusedException($"The plan of experiment '{plan.Code}' names the follow-up '{plan.FollowUp}', which this version of the program does not have.");
        GroupedSample units = SpecimenMeans.Of(readings) is { } means ? means.Sample : readings;
        bool withinBlocks = GroupTestRegistry.Find(plan.Test)?.UsesBlocks == true;
        GroupEstimates? estimates = withinBlocks ? GroupEstimates.InBlocks(units) : GroupEstimates.OneWay(units);
        int? control = ControlOf(plan, labels);
        return estimates is null ? null : new PlannedFollowUp(estimates, followUp.Compare(estimates, control, 1 - level.Value), followUp, control);
    }

    private static int? ControlOf(PlannedExperiment plan, IReadOnlyList<string> labels)
    {
        for (int i = 0; i < labels.Count && plan.Control is not null; i++)
        {
            if (labels[i] == plan.Control)
            {
                return i;
            }
        }

        return null;
    }
}
