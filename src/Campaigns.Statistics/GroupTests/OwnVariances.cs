using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.GroupTests;

/// <summary>What the tests need that estimate the variance of every group by itself.</summary>
internal static class OwnVariances
{
    /// <summary>Why the variance of every group cannot be estimated, or tells nothing: the reasons of the F test, and a group of one value before groups that are all constant.</summary>
    public static NotTestableReason? Obstacle(OneWayLayout layout, ExactMoments moments)
    {
        if (layout.Obstacle is not null and not NotTestableReason.ZeroWithinVariation)
        {
            return layout.Obstacle;
        }

        for (int i = 0; i < moments.GroupCount; i++)
        {
            if (moments.CountOf(i) == 1)
            {
                return NotTestableReason.GroupOfOne;
            }
        }

        return layout.Obstacle;
    }

    /// <summary>The variance of a group with divisor n - 1, in squared units of the last typed decimal; exactly zero where its values are all the same.</summary>
    /// <param name="moments">The sums of the sample.</param>
    /// <param name="group">A group of at least two values.</param>
    public static WideReal Of(ExactMoments moments, int group)
    {
        double n = moments.CountOf(group);
        return moments.CountTimesSquaredDeviations(group) / n / (n - 1);
    }
}
