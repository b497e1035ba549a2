using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Effects;

/// <summary>The smallest difference between two group means that a design would have found, in units of the response.</summary>
/// <remarks>
/// Derivation: let the means of groups i and j differ by D. The noncentrality lambda = sum of n_g (mu_g - mu)^2/sigma^2, mu the mean weighted with the n_g, is least, over all positions of the other means, where those lie at the weighted mean of the two; their squares are then 0, and the two contribute D^2 n_i n_j/(n_i + n_j)/sigma^2.
/// Power rises with lambda. So whatever the other means are, a pair D apart is met with at least the power that belongs to this lambda; and of all pairs the one with the least n_i n_j/(n_i + n_j), half its harmonic mean, needs the largest D: it is that of the two smallest groups.
/// "Found" means that the F test rejects; which groups differ is then a matter of the comparisons between them.
/// </remarks>
public static class DetectableDifference
{
    /// <summary>The smallest D such that, if any two group means differ by D or more, the F test rejects with the wanted power.</summary>
    /// <param name="groupSizes">Observations in every group; those without any are left out. For repeated readings of one specimen, the specimens.</param>
    /// <param name="standardDeviation">The standard deviation within groups, positive and finite, in units of the response: assumed, or the residual one of the experiment itself.</param>
    /// <param name="level">The level of the F test.</param>
    /// <param name="power">The wanted power; above the level and below 1.</param>
    /// <returns>In units of the response; positive infinity where it lies beyond the range of doubles.</returns>
    /// <exception cref="ArgumentException">Fewer than two groups, a negative size, or no group with two observations.</exception>
    /// <exception cref="ArgumentOutOfRangeException">The standard deviation or the power is outside its range.</exception>
    /// <remarks>Cost: one quantile of F and one noncentral F tail inverted, about 20 us.</remarks>
    public static double Smallest(ReadOnlySpan<int> groupSizes, double standardDeviation, SignificanceLevel level, double power = 0.8)
    {
        var design = OneWayDesign.Of(groupSizes);
        return OneWayPower.LargestDifference(design, OneWayPower.SmallestNoncentrality(design, level, power), standardDeviation);
    }
}
