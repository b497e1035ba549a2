using Campaigns.Statistics.Checks.Computation;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Checks;

/// <summary>The largest standard deviation of a group over the smallest.</summary>
/// <remarks>
/// Warns where the ratio is large enough to matter, above 3, or above 2 where the largest group has at least 1.5 times as many values as the smallest, and where chance does not explain it.
/// The second condition is there because among ten groups of three equally spread values the ratio is above 3 nineteen times in twenty (simulated, 20,000 times): chance is bounded by Bonferroni over the k (k - 1) F ratios of two variances, and must be below 0.05.
/// A group of at least three values that are all the same, beside others that differ, always warns: its reading is too coarse, or was copied.
/// </remarks>
public sealed class SpreadRatio : ExperimentCheck
{
    private const double Limit = 3;
    private const double LimitOfUnequalSizes = 2;
    private const double UnequalSizesFrom = 1.5;
    private const double Level = 0.05;

    /// <summary>Beyond this ratio F leaves the range of doubles.</summary>
    private const double Squarable = 1e150;

    /// <inheritdoc/>
    public override string Key => "spread-ratio";

    /// <inheritdoc/>
    public override string Name => "Ratio of standard deviations";

    /// <inheritdoc/>
    public override string CannotSee => "It looks at two groups alone, and its p-value, a bound, holds for values that are nearly normal.";

    /// <inheritdoc/>
    public override string Advice => "Look whether the spread grows with the mean, and whether one group was made or measured differently; Welch's F is shown beside. Ranks do not cure unequal spread.";

    /// <inheritdoc/>
    public override string Source => "Ratio of two variances: G. W. Snedecor, Calculation and Interpretation of Analysis of Variance and Covariance, 1934; the limits are working rules of this program.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject)
    {
        GroupSpreads spreads = GroupSpreads.Of(subject);
        if (spreads.Obstacle is { } obstacle)
        {
            return new CheckFinding(CheckVerdict.NotPossible, obstacle);
        }

        string largest = $"{CheckText.Figure(spreads.StandardDeviationOf(spreads.Largest))} in {subject.Labels[spreads.Largest]}";
        return spreads.VarianceOf(spreads.Smallest).Sign == 0
            ? BesideConstant(subject, spreads, largest)
            : Compare(subject, spreads, largest);
    }

    private static CheckFinding BesideConstant(CheckSubject subject, GroupSpreads spreads, string largest)
    {
        int constant = spreads.Smallest;
        for (int i = 0; i < spreads.GroupCount; i++)
        {
            bool isLarger = spreads.CountOf(i) > spreads.CountOf(constant);
            constant = isLarger && spreads.VarianceOf(i).Sign == 0 ? i : constant;
        }

        return spreads.CountOf(constant) > 2
            ? new CheckFinding(CheckVerdict.Warns, $"All {spreads.CountOf(constant)} values of {subject.Labels[constant]} are the same, beside a standard deviation of {largest}.")
            : new CheckFinding(CheckVerdict.Quiet, $"The two values of {subject.Labels[constant]} are the same, as a pair may be by chance, beside a standard deviation of {largest}.");
    }

    private static CheckFinding Compare(CheckSubject subject, GroupSpreads spreads, string largest)
    {
        WideReal variances = spreads.VarianceOf(spreads.Largest) / spreads.VarianceOf(spreads.Smallest);
        double ratio = Math.Min(WideReal.Sqrt(variances).ToDouble(), double.MaxValue);
        long[] sizes = [.. Enumerable.Range(0, spreads.GroupCount).Select(spreads.CountOf).Where(n => n > 1)];
        double limit = sizes.Max() >= UnequalSizesFrom * sizes.Min() ? LimitOfUnequalSizes : Limit;
        PValue p = Chance(spreads, ratio, sizes.Length);
        bool warns = ratio > limit && p.Value < Level;
        string smallest = $"{CheckText.Figure(spreads.StandardDeviationOf(spreads.Smallest))} in {subject.Labels[spreads.Smallest]}";
        string explained = ratio > limit && !warns ? "so few values differ as much by chance, " : "";
        return new CheckFinding(
            warns ? CheckVerdict.Warns : CheckVerdict.Quiet,
            $"The largest standard deviation, {largest}, is {CheckText.Figure(ratio)} times the smallest, {smallest} ({explained}{CheckText.P(p)}).",
            ratio,
            p);
    }

    private static PValue Chance(GroupSpreads spreads, double ratio, int groups)
    {
        double df2 = spreads.CountOf(spreads.Smallest) - 1;
        FDistribution law = FDistribution.For(spreads.CountOf(spreads.Largest) - 1, df2);
        double log = ratio < Squarable
            ? law.LogUpperTail(ratio * ratio)
            : law.LogUpperTail(Squarable * Squarable) - (df2 * (Math.Log(ratio) - Math.Log(Squarable)));
        return PValue.FromLog(Math.Min(0, log + Math.Log((double)groups * (groups - 1))));
    }
}
