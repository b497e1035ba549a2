using Campaigns.Statistics.Checks.Computation;

namespace Campaigns.Statistics.Checks;

/// <summary>Levene's test for equal spreads: the F test on absolute deviations from the means of the groups. Shown for reference.</summary>
/// <remarks>Never warns: <see cref="EqualSpread"/> asks the same question with fewer false alarms, and one difference should not be told twice. Exact integers as there; groups of one value are left out.</remarks>
public sealed class Levene : ExperimentCheck
{
    private const double Level = 0.05;

    /// <inheritdoc/>
    public override string Key => "levene";

    /// <inheritdoc/>
    public override string Name => "Equal spread, Levene's test on means";

    /// <inheritdoc/>
    public override string CannotSee => "It takes skewed values for unequal spreads, so that it is shown for reference and never warns by itself.";

    /// <inheritdoc/>
    public override string Advice => "Go by Brown and Forsythe's test on medians.";

    /// <inheritdoc/>
    public override string Source => "H. Levene, Robust tests for equality of variances, in Contributions to Probability and Statistics, Stanford University Press, 1960, 278.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject) =>
        DeviationTest.Look(subject, AbsoluteDeviations.FromMeans, warnsBelow: 0, differsBelow: Level);
}
