using Campaigns.Statistics.Checks.Computation;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Checks;

/// <summary>Bartlett's test for equal variances of normal values. Shown for reference.</summary>
/// <remarks>
/// With u_i = (s_i^2 - MSW)/MSW, formed in about 32 digits, the weighted u_i add up to zero, and the statistic is the sum of (n_i - 1)(u_i - ln(1 + u_i)) over the usual correction: terms that are never negative, so that nothing cancels where the variances are alike.
/// Never warns: values with long tails make it speak one time in five, skewed ones two times in five, where the variances are equal.
/// </remarks>
public sealed class Bartlett : ExperimentCheck
{
    private const double Level = 0.05;

    /// <inheritdoc/>
    public override string Key => "bartlett";

    /// <inheritdoc/>
    public override string Name => "Equal spread, Bartlett's test";

    /// <inheritdoc/>
    public override string CannotSee => "It is fragile: it takes long tails and skewed values for unequal spreads, so that it is shown for reference and never warns by itself.";

    /// <inheritdoc/>
    public override string Advice => "Go by Brown and Forsythe's test on medians.";

    /// <inheritdoc/>
    public override string Source => "M. S. Bartlett, Properties of sufficiency and statistical tests, Proceedings of the Royal Society A 160 (1937) 268.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject)
    {
        GroupSpreads spreads = GroupSpreads.Of(subject);
        int[] groups = [.. Enumerable.Range(0, spreads.GroupCount).Where(i => spreads.CountOf(i) > 0)];
        string? obstacle = spreads.Obstacle
            ?? (groups.Any(i => spreads.CountOf(i) == 1) ? "A group holds a single value, which has no variance."
                : groups.Any(i => spreads.VarianceOf(i).Sign == 0) ? $"All values of {subject.Labels[spreads.Smallest]} are the same, and the test needs the logarithm of every variance."
                : null);
        if (obstacle is not null)
        {
            return new CheckFinding(CheckVerdict.NotPossible, obstacle);
        }

        double statistic = Statistic(spreads, groups);
        PValue p = ChiSquared.UpperTailPValue(statistic, groups.Length - 1);
        return new CheckFinding(CheckVerdict.Quiet, spreads.Words(p.Value < Level, p, forReference: true), statistic, p);
    }

    private static double Statistic(GroupSpreads spreads, int[] groups)
    {
        WideReal within = WideReal.Zero;
        long residual = 0;
        double inverses = 0;
        foreach (int i in groups)
        {
            long df = spreads.CountOf(i) - 1;
            within += spreads.VarianceOf(i) * WideReal.From((double)df);
            residual += df;
            inverses += 1.0 / df;
        }

        WideReal pooled = within / residual;
        double sum = 0;
        foreach (int i in groups)
        {
            sum -= (spreads.CountOf(i) - 1) * Log1pMinus(spreads.VarianceOf(i), pooled);
        }

        return sum / (1 + ((inverses - (1.0 / residual)) / (3 * (groups.Length - 1))));
    }

    /// <summary>ln(1 + u) - u with 1 + u the variance over the pooled one; a variance far below that one keeps its logarithm.</summary>
    private static double Log1pMinus(WideReal variance, WideReal pooled)
    {
        double u = ((variance - pooled) / pooled).ToDouble();
        return u > -0.5 ? Accurate.Log1pMinus(u) : (variance / pooled).Log() - u;
    }
}
