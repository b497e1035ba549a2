using Campaigns.Statistics.Checks.Computation;

namespace Campaigns.Statistics.Checks;

/// <summary>Brown and Forsythe's test for equal spreads: the F test on absolute deviations from the medians of the groups. The check of spread that warns.</summary>
/// <remarks>The deviations are exact integers, so that F is the exact value rounded once, whatever the offset. Groups of one value are left out. Warns below p = 0.05.</remarks>
public sealed class EqualSpread : ExperimentCheck
{
    private const double Level = 0.05;

    /// <inheritdoc/>
    public override string Key => "equal-spread";

    /// <inheritdoc/>
    public override string Name => "Equal spread, Brown and Forsythe's test";

    /// <inheritdoc/>
    public override string CannotSee => "In groups of fewer than about six values it overlooks even large differences.";

    /// <inheritdoc/>
    public override string Advice => "Look at Welch's F, shown beside: it does not need equal spreads, if no group is very small. Ranks do not cure unequal spread; where the spread grows with the mean, logarithms may.";

    /// <inheritdoc/>
    public override string Source => "M. B. Brown and A. B. Forsythe, Robust tests for the equality of variances, Journal of the American Statistical Association 69 (1974) 364.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject) =>
        DeviationTest.Look(subject, AbsoluteDeviations.FromMedians, warnsBelow: Level, differsBelow: Level);
}
