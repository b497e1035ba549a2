namespace Campaigns.Statistics.Planning;

/// <summary>The groups of a one-way experiment and how many observations each holds.</summary>
public sealed record OneWayDesign
{
    private OneWayDesign(int groupCount, long observations, double leastPairWeight)
    {
        if (groupCount < 2)
        {
            throw new ArgumentException("A comparison needs at least two groups.");
        }

        if (observations == groupCount)
        {
            throw new ArgumentException("Without a group of two observations or more nothing is known about the variation within groups.");
        }

        GroupCount = groupCount;
        Observations = observations;
        LeastPairWeight = leastPairWeight;
    }

    /// <summary>Groups, k; at least 2.</summary>
    public int GroupCount { get; }

    /// <summary>Observations, N; more than groups.</summary>
    public long Observations { get; }

    /// <summary>Degrees of freedom between groups, k - 1.</summary>
    public double BetweenDegreesOfFreedom => GroupCount - 1;

    /// <summary>Degrees of freedom within groups, N - k.</summary>
    public double WithinDegreesOfFreedom => Observations - GroupCount;

    /// <summary>The least n_i n_j/(n_i + n_j) of two groups: half the harmonic mean of the two smallest sizes. Two means D apart, all others at their weighted mean, have the noncentrality D^2 times it over sigma^2.</summary>
    public double LeastPairWeight { get; }

    /// <summary>Groups of one size.</summary>
    /// <param name="groups">At least 2.</param>
    /// <param name="replicates">Observations in each; at least 2.</param>
    /// <exception cref="ArgumentException">Fewer than two groups or two replicates.</exception>
    public static OneWayDesign Balanced(int groups, int replicates) =>
        replicates >= 1
            ? new(groups, (long)groups * replicates, replicates / 2.0)
            : throw new ArgumentException("A group has at least one observation.", nameof(replicates));

    /// <summary>Groups of any sizes.</summary>
    /// <param name="groupSizes">Observations in every group, in any order; groups without any are left out.</param>
    /// <exception cref="ArgumentException">Fewer than two groups with observations, a negative size, or no group with two observations.</exception>
    public static OneWayDesign Of(ReadOnlySpan<int> groupSizes)
    {
        int groups = 0;
        long observations = 0;
        double smallest = double.PositiveInfinity;
        double second = double.PositiveInfinity;
        foreach (int size in groupSizes)
        {
            ArgumentOutOfRangeException.ThrowIfNegative(size, nameof(groupSizes));
            if (size == 0)
            {
                continue;
            }

            groups++;
            observations += size;
            second = Math.Min(second, Math.Max(smallest, size));
            smallest = Math.Min(smallest, size);
        }

        return new(groups, observations, groups < 2 ? 0 : smallest * second / (smallest + second));
    }
}
