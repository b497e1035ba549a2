using System.Numerics;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>How the share of variation between groups is formed from group sums, in integers: (sum of c q_g q_h - constant)/(unit times the sum of squares - constant).</summary>
/// <remarks>
/// One-way: c = M/n_g on the diagonal, M the least common multiple of the group sizes and N, unit M, constant M/N times the squared total.
/// Within blocks, values less their block's mean: the sum of squares of groups adjusted for blocks is q'A^-q with A = diag(n_g) less the sum over blocks of n_gb n_hb/n_b (F. Yates 1936), which arrangements within blocks leave as it is; the last group, whose q follows from the others, is left out, and the inverse is that of a matrix of integers, its adjugate over its determinant. Where all blocks hold the groups in the same proportions, it is the one-way form.
/// </remarks>
internal sealed class ShareForm
{
    private ShareForm((int First, int Second, BigInteger Factor)[] terms, BigInteger unit, BigInteger constantFactor)
    {
        Terms = terms;
        Unit = unit;
        ConstantFactor = constantFactor;
    }

    /// <summary>Factors of products of two group sums.</summary>
    public (int First, int Second, BigInteger Factor)[] Terms { get; }

    /// <summary>Factor of the total sum of squares.</summary>
    public BigInteger Unit { get; }

    /// <summary>Factor of the squared total in the constant.</summary>
    public BigInteger ConstantFactor { get; }

    /// <summary>The form for groups of given sizes, blocks not minded.</summary>
    public static ShareForm OneWay(int[] sizes)
    {
        int count = sizes.Sum();
        BigInteger multiple = sizes.Append(count).Aggregate(BigInteger.One, LeastCommonMultiple);
        return new([.. sizes.Select((n, g) => (g, g, multiple / n))], multiple, multiple / count);
    }

    /// <summary>The form for groups within blocks.</summary>
    /// <param name="cells">For each block the values of each group; all groups are connected by blocks.</param>
    public static ShareForm WithinBlocks(int[][] cells)
    {
        int groups = cells[0].Length;
        int[] sizes = [.. Enumerable.Range(0, groups).Select(g => cells.Sum(block => block[g]))];
        long count = sizes.Sum();
        if (cells.All(block => block.Select((n, g) => n * count == (long)sizes[g] * block.Sum()).All(same => same)))
        {
            return OneWay(sizes);
        }

        BigInteger scale = cells.Select(block => block.Sum()).Aggregate(BigInteger.One, LeastCommonMultiple);
        var matrix = new BigInteger[groups - 1, groups - 1];
        for (int g = 0; g < groups - 1; g++)
        {
            matrix[g, g] = scale * sizes[g];
            for (int h = 0; h < groups - 1; h++)
            {
                foreach (int[] block in cells)
                {
                    matrix[g, h] -= scale / block.Sum() * block[g] * block[h];
                }
            }
        }

        return Inverse(matrix, scale);
    }

    private static ShareForm Inverse(BigInteger[,] matrix, BigInteger scale)
    {
        (BigInteger[,] adjugate, BigInteger determinant) = IntegerMatrix.Invert(matrix);
        var terms = new List<(int, int, BigInteger)>();
        BigInteger divisor = determinant;
        for (int g = 0; g < matrix.GetLength(0); g++)
        {
            for (int h = 0; h <= g; h++)
            {
                BigInteger factor = scale * adjugate[g, h] * (g == h ? 1 : 2);
                divisor = BigInteger.GreatestCommonDivisor(divisor, factor);
                if (!factor.IsZero)
                {
                    terms.Add((g, h, factor));
                }
            }
        }

        return new([.. terms.Select(t => (t.Item1, t.Item2, t.Item3 / divisor))], determinant / divisor, 0);
    }

    internal static BigInteger LeastCommonMultiple(BigInteger a, int b) => a / BigInteger.GreatestCommonDivisor(a, b) * b;
}
