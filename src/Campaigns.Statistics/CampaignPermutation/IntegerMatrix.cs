using System.Numerics;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>Matrices of integers, without rounding.</summary>
internal static class IntegerMatrix
{
    /// <summary>The adjugate and the determinant of a symmetric positive definite matrix, by Bareiss's elimination without fractions (E. H. Bareiss, Mathematics of Computation 22, 1968).</summary>
    /// <remarks>Every division is exact. No pivot is 0, because the leading minors of such a matrix are positive.</remarks>
    public static (BigInteger[,] Adjugate, BigInteger Determinant) Invert(BigInteger[,] matrix)
    {
        int n = matrix.GetLength(0);
        var work = new BigInteger[n, 2 * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++)
            {
                work[i, j] = matrix[i, j];
            }

            work[i, n + i] = 1;
        }

        BigInteger before = 1;
        for (int pivot = 0; pivot < n; pivot++)
        {
            for (int i = 0; i < n; i++)
            {
                if (i != pivot)
                {
                    Eliminate(work, i, pivot, before);
                }
            }

            before = work[pivot, pivot];
        }

        var adjugate = new BigInteger[n, n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++)
            {
                adjugate[i, j] = work[i, n + j];
            }
        }

        return (adjugate, before);
    }

    private static void Eliminate(BigInteger[,] work, int row, int pivot, BigInteger before)
    {
        BigInteger factor = work[row, pivot];
        for (int j = 0; j < work.GetLength(1); j++)
        {
            work[row, j] = ((work[row, j] * work[pivot, pivot]) - (factor * work[pivot, j])) / before;
        }
    }
}
