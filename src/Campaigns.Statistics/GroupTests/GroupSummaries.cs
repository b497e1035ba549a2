using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.GroupTests;

/// <summary>The groups of an experiment in figures, from the exact sums of their typed decimals.</summary>
public static class GroupSummaries
{
    private const int GroupsOnStack = 32;

    /// <summary>Count, mean, spread and interval of every group.</summary>
    /// <param name="sample">Any sample, in any order.</param>
    /// <param name="confidence">Confidence of each group's interval, in (0, 1), for example 0.95; each interval stands alone, without allowance for their number.</param>
    /// <returns>One summary a group, in the order of group numbers, those without a value included.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The confidence is outside (0, 1).</exception>
    /// <remarks>Means, standard deviations and standard errors are the exact values rounded once.</remarks>
    public static GroupSummary[] Of(GroupedSample sample, double confidence)
    {
        if (!(confidence > 0 && confidence < 1))
        {
            throw new ArgumentOutOfRangeException(nameof(confidence), confidence, "A confidence lies between 0 and 1, both excluded.");
        }

        Span<GroupSums> scratch = sample.GroupCount <= GroupsOnStack ? stackalloc GroupSums[GroupsOnStack] : new GroupSums[sample.GroupCount];
        ExactMoments moments = ExactMoments.Of(sample, scratch);
        WideReal unit = sample.Unit;
        var summaries = new GroupSummary[sample.GroupCount];
        for (int i = 0; i < summaries.Length; i++)
        {
            summaries[i] = Summary(moments, i, unit, confidence);
        }

        return summaries;
    }

    private static GroupSummary Summary(ExactMoments moments, int group, WideReal unit, double confidence)
    {
        int n = (int)moments.CountOf(group);
        if (n == 0)
        {
            return new GroupSummary(0, null, null, null, null, null);
        }

        WideReal mean = moments.Sum(group) / n * unit;
        if (n == 1)
        {
            return new GroupSummary(1, mean.ToDouble(), null, null, null, null);
        }

        WideReal variance = moments.CountTimesSquaredDeviations(group) / n / (n - 1);
        WideReal error = WideReal.Sqrt(variance / n) * unit;
        double standardError = error.ToDouble();
        if (standardError == 0)
        {
            // Student's t has nothing to scale: an interval without any width would claim that the mean is known exactly.
            return new GroupSummary(n, mean.ToDouble(), 0, 0, null, null);
        }

        WideReal half = error * WideReal.From(StudentT.TwoSidedQuantile(1 - confidence, n - 1));
        return new GroupSummary(
            n,
            mean.ToDouble(),
            (WideReal.Sqrt(variance) * unit).ToDouble(),
            standardError,
            (mean - half).ToDouble(),
            (mean + half).ToDouble());
    }
}
