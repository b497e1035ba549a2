using System.Numerics;

namespace Campaigns.Statistics.Tests.CampaignPermutation;

/// <summary>Westfall and Young's definitions (Ge, Dudoit and Speed 2003, boxes 2 and 4) written out over a list of arrangements, the observed one first, in integers of any size.</summary>
internal static class StepDownOracle
{
    /// <summary>Adjusted p-values, as counts over the number of arrangements.</summary>
    /// <param name="values">By response and unit.</param>
    /// <param name="arrangements">For each arrangement the group of every unit.</param>
    /// <param name="byP">minP instead of maxT.</param>
    public static int[] Adjust(BigInteger[][] values, IReadOnlyList<int[]> arrangements, bool byP)
    {
        (BigInteger Between, BigInteger Total)[][] t = [.. arrangements.Select(labels => values.Select(y => Share(y, labels)).ToArray())];
        int m = values.Length;
        if (byP)
        {
            // P-values as negative counts: larger is more extreme, as with shares.
            t = [.. t.Select(row => row.Select((own, j) => (-(BigInteger)t.Count(other => Compare(other[j], own) >= 0), BigInteger.One)).ToArray())];
        }

        int[] order = [.. Enumerable.Range(0, m).OrderByDescending(j => t[0][j], Comparer<(BigInteger, BigInteger)>.Create(Compare))];
        var adjusted = new int[m];
        int largest = 0;
        for (int k = 0; k < m; k++)
        {
            int reached = t.Count(row => order.Skip(k).Any(j => Compare(row[j], t[0][order[k]]) >= 0));
            largest = Math.Max(largest, reached);
            adjusted[order[k]] = largest;
        }

        return adjusted;
    }

    private static int Compare((BigInteger Above, BigInteger Below) a, (BigInteger Above, BigInteger Below) b) => (a.Above * b.Below).CompareTo(b.Above * a.Below);

    /// <summary>Sums of squares between groups and in all, about the means, times N and all group sizes squared.</summary>
    private static (BigInteger Between, BigInteger Total) Share(BigInteger[] values, int[] labels)
    {
        int[] sizes = [.. Enumerable.Range(0, labels.Max() + 1).Select(g => labels.Count(l => l == g))];
        BigInteger scale = values.Length * sizes.Aggregate(BigInteger.One, (p, n) => p * n);
        BigInteger grand = values.Aggregate(BigInteger.Zero, (s, v) => s + v) * (scale / values.Length);
        BigInteger[] means = [.. sizes.Select((n, g) => values.Where((_, i) => labels[i] == g).Aggregate(BigInteger.Zero, (s, v) => s + v) * (scale / n))];
        BigInteger between = 0;
        BigInteger total = 0;
        for (int i = 0; i < values.Length; i++)
        {
            between += BigInteger.Pow(means[labels[i]] - grand, 2);
            total += BigInteger.Pow((values[i] * scale) - grand, 2);
        }

        return (between, total);
    }
}
