using System.Globalization;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Random experiments in blocks.</summary>
internal static class RandomDesigns
{
    /// <summary>Complete, incomplete or unbalanced blocks; may be disconnected or without a residual degree of freedom.</summary>
    public static DesignedSample Draw(Random random)
    {
        int groups = random.Next(2, 8);
        int blocks = random.Next(1, 10);
        int kind = random.Next(4);
        return Draw(random, groups, blocks, (i, j) => kind switch
        {
            0 => 1,
            1 => 2,
            2 => (i + j) % groups < Math.Max(2, groups / 2) ? 1 : 0,
            _ => random.Next(3) * random.Next(3),
        });
    }

    public static DesignedSample Draw(Random random, int groups, int blocks, Func<int, int, int> count)
    {
        double spread = Math.Pow(10, (random.NextDouble() * 3) - 1);
        double effect = Math.Pow(10, (random.NextDouble() * 2) - 1.5);
        int decimals = random.Next(1, 6);
        double[] blockEffects = [.. Enumerable.Range(0, blocks).Select(_ => spread * random.NextDouble())];
        double[] groupEffects = [.. Enumerable.Range(0, groups).Select(_ => effect * random.NextDouble())];
        var rows = new List<DesignedRow>();
        for (int j = 0; j < blocks; j++)
        {
            for (int i = 0; i < groups; i++)
            {
                int n = count(i, j);
                for (int r = 0; r < n; r++)
                {
                    double value = 10 + groupEffects[i] + blockEffects[j] + Normal(random);
                    rows.Add(new DesignedRow($"g{i}", $"b{j}", "", value.ToString("F" + decimals, CultureInfo.InvariantCulture)));
                }
            }
        }

        return rows.Count == 0 ? Draw(random) : new DesignedSample(rows);
    }

    public static double Normal(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
