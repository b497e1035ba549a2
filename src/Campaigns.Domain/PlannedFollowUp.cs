using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Domain;

/// <summary>Runs the follow-up comparisons that the plan of an experiment names.</summary>
public static class PlannedFollowUp
{
    /// <summary>The comparisons.</summary>
    /// <param name="plan">Names follow-up, test and control.</param>
    /// <param name="labels">Label of each group.</param>
    /// <param name="readings">The experiment's values.</param>
    /// <param name="level">The intervals hold simultaneously at confidence 1 - level inside the experiment.</param>
    /// <returns>Empty where the plan names none, or the data allow none.</returns>
    /// <exception cref="RefusedException">This version of the program does not have the follow-up.</exception>
    public static IReadOnlyList<GroupComparison> Compare(PlannedExperiment plan, IReadOnlyList<string> labels, GroupedSample readings, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(plan);
        ArgumentNullException.ThrowIfNull(labels);
        if (plan.FollowUp == FollowUpRegistry.None || FollowUpRegistry.Find(plan.FollowUp) is null)
        {
            return [];
        }

        FollowUp followUp = FollowUpRegistry.Find(plan.FollowUp)
            ?? throw new RefusedException($"The plan of experiment '{plan.Code}' names the follow-up '{plan.FollowUp}', which this version of the program does not have.");
        GroupedSample units = SpecimenMeans.Of(readings) is { } means ? means.Sample : readings;
        bool withinBlocks = GroupTestRegistry.Find(plan.Test)?.UsesBlocks == true;
        GroupEstimates? estimates = withinBlocks ? GroupEstimates.InBlocks(units) : GroupEstimates.OneWay(units);
        int control = plan.Control is { } name ? labels.ToList().IndexOf(name) : -1;
        return estimates is null ? [] : followUp.Compare(estimates, control < 0 ? null : control, 1 - level.Value);
    }
}
