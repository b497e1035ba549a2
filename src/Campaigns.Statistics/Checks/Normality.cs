using Campaigns.Statistics.Checks.Computation;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Checks;

/// <summary>Shapiro and Wilk's test on the residuals.</summary>
/// <remarks>
/// Values alone in their group leave no residual and are left out. As residuals add up to zero inside groups, the test speaks a little too rarely: 2 to 5 times in a hundred at 0.05 where values are normal.
/// Warns below p = 0.01, a stricter level than the other checks have: the F test bears moderate departures well.
/// </remarks>
public sealed class Normality : ExperimentCheck
{
    private const double Level = 0.01;

    /// <summary>Below this p-value "no sign" would be too much said.</summary>
    private const double Slight = 0.05;

    /// <inheritdoc/>
    public override string Key => "normality";

    /// <inheritdoc/>
    public override string Name => "Normal residuals, Shapiro and Wilk's test";

    /// <inheritdoc/>
    public override string CannotSee => "From few residuals it sees only gross departures, and from thousands it flags trifles; a large p-value proves nothing.";

    /// <inheritdoc/>
    public override string Advice => "Look at the residuals for skew and for single far values rather than at p; skewed positive values often call for logarithms, decided before the next experiment.";

    /// <inheritdoc/>
    public override string Source => "S. S. Shapiro and M. B. Wilk, An analysis of variance test for normality, Biometrika 52 (1965) 591; J. P. Royston, algorithm AS R94, Applied Statistics 44 (1995) 547.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject)
    {
        if (Residuals.Obstacle(subject) is { } obstacle)
        {
            return new CheckFinding(CheckVerdict.NotPossible, obstacle);
        }

        FittedLayout fit = subject.Fit!;
        double[] residuals = [.. Enumerable.Range(0, fit.Residuals.Count).Where(i => Residuals.IsFree(fit, i)).Select(i => fit.Residuals[i])];
        if (residuals.Length is < ShapiroWilk.FewestValues or > ShapiroWilk.MostValues)
        {
            return new CheckFinding(CheckVerdict.NotPossible, FormattableString.Invariant(
                $"{CheckText.Count(residuals.Length, "residual", "residuals")}, while the test is made for {ShapiroWilk.FewestValues} to {ShapiroWilk.MostValues}."));
        }

        if (residuals.Length == ShapiroWilk.FewestValues && residuals.Distinct().Count() < ShapiroWilk.FewestValues)
        {
            return new CheckFinding(CheckVerdict.NotPossible, "There are three residuals, and two of them are equal, which leaves the test nothing to judge.");
        }

        ShapiroWilk test = ShapiroWilk.Of(residuals);
        bool warns = test.P.Value < Level;
        string figures = $"W = {CheckText.Figure(test.W)} from {residuals.Length} residuals ({CheckText.P(test.P)})";
        return new CheckFinding(
            warns ? CheckVerdict.Warns : CheckVerdict.Quiet,
            warns ? $"The residuals do not look like a sample from a normal law: {figures}."
                : test.P.Value < Slight ? $"A slight sign that the residuals depart from a normal law, as chance gives in one of twenty: {figures}."
                : $"No sign that the residuals depart from a normal law: {figures}.",
            test.W,
            test.P);
    }
}
