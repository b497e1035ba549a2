using System.Numerics;
using Campaigns.Statistics.ClosedTesting;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.Corrections;

namespace Campaigns.Statistics.Tests.ClosedTesting;

/// <summary>Closed testing from its definition: Simes' test of every one of the 2^m sets in exact fractions, a set rejected if all sets that contain it are, and the bound of a set the size of its largest part that is not rejected.</summary>
public sealed class ClosedTestingBruteForceTests
{
    private const int Seed = 20261206;
    private const int Vectors = 2000;

    private static readonly double[] Levels = [0.01, 0.05, 0.1, 0.2, 0.5, 0.25, 0.0625];

    // Multiples of the numerators of 1 + 1/2 + ... + 1/m: p-values of the grids then lie exactly on boundaries where the level is divided by it.
    private static readonly double[] HarmonicLevels = [0.5, 3.0 / 16, 11.0 / 64, 25.0 / 128, 137.0 / 256, 49.0 / 128, 363.0 / 1024, 761.0 / 2048];

    private static readonly int[] Grids = [20, 64, 128, 256, 100, 1000];

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Every_bound_of_every_set_is_that_of_the_definition(bool anyDependence)
    {
        var random = new Random(Seed);
        int ties = 0;
        for (int trial = 0; trial < Vectors; trial++)
        {
            int m = random.Next(1, trial % 20 == 0 ? 11 : 9);
            int untested = random.Next(4) == 0 ? random.Next(m) : 0;
            int grid = Grids[random.Next(Grids.Length)];
            int power = random.Next(1, 4);
            double[] p = [.. Enumerable.Range(0, m - untested).Select(_ => Math.Min(1, (Math.Floor(grid * Math.Pow(random.NextDouble(), power)) + random.Next(2)) / grid))];
            double level = anyDependence && trial % 2 == 0 && m <= HarmonicLevels.Length ? HarmonicLevels[m - 1] : Levels[random.Next(Levels.Length)];
            var family = RankedFamily.Of(p, m);
            var testing = SimesClosedTesting.Of(family, new SignificanceLevel(level), anyDependence);
            double[] all = [.. p, .. Enumerable.Repeat(1.0, untested)];
            int[] falseAtMost = ByDefinition(all, level, anyDependence, ref ties);
            for (int set = 0; set < 1 << m; set++)
            {
                int[] members = [.. Enumerable.Range(0, m).Where(i => (set >> i & 1) != 0)];
                Assert.True(falseAtMost[set] == testing.FalseAtMost(members), $"set {set} of {string.Join(" ", all)} at {level}");
            }
        }

        Assert.True(ties > (anyDependence ? 200 : 500), $"only {ties} comparisons were exact ties");
    }

    private static int[] ByDefinition(double[] p, double level, bool anyDependence, ref int ties)
    {
        int m = p.Length;
        bool[,,] passes = Comparisons(p, level, anyDependence, ref ties);
        int[] ascending = [.. Enumerable.Range(0, m).OrderBy(i => p[i])];
        int full = (1 << m) - 1;
        bool[] rejected = new bool[full + 1];
        for (int set = full; set > 0; set--)
        {
            int size = BitOperations.PopCount((uint)set);
            int j = 0;
            bool isRejected = false;
            foreach (int i in ascending.Where(i => (set >> i & 1) != 0))
            {
                isRejected |= passes[size, ++j, i];
            }

            for (int i = 0; i < m; i++)
            {
                isRejected &= (set >> i & 1) != 0 || rejected[set | 1 << i];
            }

            rejected[set] = isRejected;
        }

        int[] most = new int[full + 1];
        for (int set = 1; set <= full; set++)
        {
            most[set] = rejected[set]
                ? Enumerable.Range(0, m).Where(i => (set >> i & 1) != 0).Max(i => most[set & ~(1 << i)])
                : BitOperations.PopCount((uint)set);
        }

        return most;
    }

    /// <summary>Whether size p(i) is at most rank level (over 1 + 1/2 + ... + 1/m), for all sizes, ranks and p-values.</summary>
    private static bool[,,] Comparisons(double[] p, double level, bool anyDependence, ref int ties)
    {
        int m = p.Length;
        Rational harmonic = anyDependence ? Enumerable.Range(1, m).Select(k => Rational.One / k).Aggregate((a, b) => a + b) : Rational.One;
        var passes = new bool[m + 1, m + 1, m];
        for (int i = 0; i < m; i++)
        {
            Rational scaled = Rational.Of(p[i]) * harmonic;
            for (int size = 1; size <= m; size++)
            {
                for (int rank = 1; rank <= size; rank++)
                {
                    int comparison = (size * scaled).CompareTo(rank * Rational.Of(level));
                    passes[size, rank, i] = comparison <= 0;
                    ties += comparison == 0 ? 1 : 0;
                }
            }
        }

        return passes;
    }
}
