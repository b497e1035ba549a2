using Campaigns.Benchmarks.Generating;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Benchmarks.Simulating;

/// <summary>A design in which all groups have the same mean: the group sizes, each group's standard deviation, the law of the errors, and blocks.</summary>
/// <param name="Name">The design in a few words.</param>
/// <param name="Sizes">Values of each group.</param>
/// <param name="Deviations">Standard deviation of each group.</param>
internal sealed record NullDesign(string Name, int[] Sizes, double[] Deviations)
{
    private const int Decimals = 9;
    private const double Unit = 1e9;
    private const int FirstPurpose = 60;
    private const int DrawsOfOne = 1 << 10;

    /// <summary>The designs in which the tests are held against each other.</summary>
    public static IReadOnlyList<NullDesign> All { get; } =
    [
        new("10 x 4, equal sd", [10, 10, 10, 10], [1, 1, 1, 1]),
        new("5, 10, 20, 40, equal sd", [5, 10, 20, 40], [1, 1, 1, 1]),
        new("5, 10, 20, 40, sd 4, 2, 1, 0.5", [5, 10, 20, 40], [4, 2, 1, 0.5]),
        new("5, 10, 20, 40, sd 0.5, 1, 2, 4", [5, 10, 20, 40], [0.5, 1, 2, 4]),
        new("10 x 4, sd 0.5, 1, 2, 4", [10, 10, 10, 10], [0.5, 1, 2, 4]),
        new("4 x 10 groups, equal sd", [4, 4, 4, 4, 4, 4, 4, 4, 4, 4], [1, 1, 1, 1, 1, 1, 1, 1, 1, 1]),
        new("2 x 10 groups, equal sd", [2, 2, 2, 2, 2, 2, 2, 2, 2, 2], [1, 1, 1, 1, 1, 1, 1, 1, 1, 1]),
        new("5, 10, 20, 40, exponential", [5, 10, 20, 40], [1, 1, 1, 1]) { IsExponential = true },
        new("10 blocks x 4, equal sd", [10, 10, 10, 10], [1, 1, 1, 1]) { BlockDeviation = 2 },
        new("10 blocks x 4, sd 0.5, 1, 2, 4", [10, 10, 10, 10], [0.5, 1, 2, 4]) { BlockDeviation = 2 },
    ];

    /// <summary>Whether errors are exponential (skewed) instead of normal.</summary>
    public bool IsExponential { get; private init; }

    /// <summary>Standard deviation of what the values of a block have in common; null where there are no blocks. With blocks, value i of every group is in block i.</summary>
    public double? BlockDeviation { get; private init; }

    /// <summary>For each value its group.</summary>
    public ushort[] Groups => [.. Sizes.SelectMany((n, group) => Enumerable.Repeat((ushort)group, n))];

    /// <summary>For each value its block; empty where there are none.</summary>
    public int[] Blocks => BlockDeviation is null ? [] : [.. Sizes.SelectMany(n => Enumerable.Range(0, n))];

    /// <summary>Draws one experiment; a pure function of design, number and cell.</summary>
    /// <param name="purpose">The design's place in <see cref="All"/>.</param>
    /// <param name="replicate">The experiment's number.</param>
    /// <param name="groups">As <see cref="Groups"/>.</param>
    /// <param name="blocks">As <see cref="Blocks"/>.</param>
    /// <param name="mantissas">Receives the values.</param>
    public GroupedSample Draw(int purpose, long replicate, ushort[] groups, int[] blocks, long[] mantissas)
    {
        for (int i = 0; i < mantissas.Length; i++)
        {
            long at = (replicate * DrawsOfOne) + i;
            double error = IsExponential ? -1 - Math.Log(Uniform(purpose, 2 * at)) : Normal(purpose, at);
            double block = BlockDeviation is { } deviation ? deviation * Normal(purpose, (replicate * DrawsOfOne) + (DrawsOfOne / 2) + blocks[i]) : 0;
            mantissas[i] = (long)Math.Round(((Deviations[groups[i]] * error) + block) * Unit);
        }

        return new GroupedSample(mantissas, Decimals, groups, Sizes.Length) { Blocks = blocks };
    }

    /// <summary>Box and Muller's transformation of two uniform numbers.</summary>
    private static double Normal(int purpose, long at) =>
        Math.Sqrt(-2 * Math.Log(Uniform(purpose, 2 * at))) * Math.Cos(2 * Math.PI * Uniform(purpose, (2 * at) + 1));

    /// <summary>Above 0 and below 1.</summary>
    private static double Uniform(int purpose, long index) => ((Draws.Bits(FirstPurpose + purpose, index) >> 11) + 0.5) / (1L << 53);
}
