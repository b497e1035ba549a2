using System.Numerics;

namespace Campaigns.Statistics.Tests.Permutation;

/// <summary>Permutation counts by going through every labelling of every value, with fractions of integers of any size.</summary>
internal static class BruteForce
{
    /// <summary>All arrangements, and those whose F is at least that of the labels given. F is compared as the ratio of the sums of squares about the means.</summary>
    public static (long AsExtreme, long All) Count(BigInteger[] values, int[] labels)
    {
        int groups = labels.Max() + 1;
        int[] sizes = [.. Enumerable.Range(0, groups).Select(g => labels.Count(l => l == g))];
        (BigInteger between, BigInteger within) = SumsOfSquares(values, labels, sizes);
        long asExtreme = 0;
        long all = 0;
        Go(0, new int[values.Length], [.. sizes]);
        return (asExtreme, all);

        void Go(int at, int[] assigned, int[] left)
        {
            if (at == values.Length)
            {
                all++;
                (BigInteger b, BigInteger w) = SumsOfSquares(values, assigned, sizes);

                // b/w >= between/within, a within of zero being infinite unless both are.
                asExtreme += b * within >= between * w ? 1 : 0;
                return;
            }

            for (int g = 0; g < groups; g++)
            {
                if (left[g] > 0)
                {
                    left[g]--;
                    assigned[at] = g;
                    Go(at + 1, assigned, left);
                    left[g]++;
                }
            }
        }
    }

    /// <summary>Between and within sums of squares times N^2 and all group sizes squared: whole numbers.</summary>
    private static (BigInteger Between, BigInteger Within) SumsOfSquares(BigInteger[] values, int[] labels, int[] sizes)
    {
        BigInteger scale = values.Length * sizes.Aggregate(BigInteger.One, (p, n) => p * n);
        BigInteger grandMean = values.Aggregate(BigInteger.Zero, (s, v) => s + v) * (scale / values.Length);
        BigInteger[] means = [.. sizes.Select((n, g) => values.Where((_, i) => labels[i] == g).Aggregate(BigInteger.Zero, (s, v) => s + v) * (scale / n))];
        BigInteger between = 0;
        BigInteger within = 0;
        for (int i = 0; i < values.Length; i++)
        {
            between += BigInteger.Pow(means[labels[i]] - grandMean, 2);
            within += BigInteger.Pow((values[i] * scale) - means[labels[i]], 2);
        }

        return (between, within);
    }
}
