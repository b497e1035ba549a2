using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>The F test on absolute deviations from the centres of the groups, as a finding.</summary>
internal static class DeviationTest
{
    /// <summary>Looks at one experiment.</summary>
    /// <param name="subject">The experiment.</param>
    /// <param name="deviationsOf">Makes the deviations from the centres in use.</param>
    /// <param name="warnsBelow">The p-value below which the finding is a warning; 0 for never.</param>
    /// <param name="differsBelow">The p-value below which the sentence says that spreads differ.</param>
    public static CheckFinding Look(CheckSubject subject, Deviations deviationsOf, double warnsBelow, double differsBelow)
    {
        GroupSpreads spreads = GroupSpreads.Of(subject);
        if (spreads.Obstacle is { } obstacle)
        {
            return new CheckFinding(CheckVerdict.NotPossible, obstacle);
        }

        if (deviationsOf(subject.Units).Test() is not Tested tested)
        {
            bool onlyPairs = Enumerable.Range(0, spreads.GroupCount).All(i => spreads.CountOf(i) <= 2);
            return new CheckFinding(CheckVerdict.NotPossible, onlyPairs
                ? "No group holds more than two values, and the two of a pair always lie equally far from their middle."
                : "Inside every group all values lie equally far from its centre, so that nothing tells how much these distances vary by chance.");
        }

        return new CheckFinding(
            tested.P.Value < warnsBelow ? CheckVerdict.Warns : CheckVerdict.Quiet,
            spreads.Words(tested.P.Value < differsBelow, tested.P, forReference: warnsBelow == 0),
            tested.Statistic,
            tested.P);
    }

    /// <summary>Makes absolute deviations of a sample.</summary>
    internal delegate AbsoluteDeviations Deviations(GroupedSample sample);
}
