using MathNet.Numerics.LinearAlgebra;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>The projector X C^- X' on groups adjusted for blocks.</summary>
internal sealed class AdjustedGroups
{
    private AdjustedGroups(Matrix<double> inverse, Matrix<double> once, Matrix<double> twice, Matrix<double> averaged)
    {
        Matrix<double> product = inverse * once;
        Rank = inverse.RowCount;
        Trace = product.Trace();
        TraceOfSquare = (inverse * twice).Trace();
        MixedTrace = (inverse * averaged).Trace();
        SquareTrace = (product * product).Trace();
    }

    public int Rank { get; }

    /// <summary>tr(QA), Q being the projector.</summary>
    public double Trace { get; }

    /// <summary>tr(QA^2).</summary>
    public double TraceOfSquare { get; }

    /// <summary>tr(PAQA), P averaging blocks.</summary>
    public double MixedTrace { get; }

    /// <summary>tr(QAQA).</summary>
    public double SquareTrace { get; }

    /// <summary>Forms X'X, X'AX, (AX)'(AX) and (AX)'P(AX) row by row; the first group that holds values is left out, which makes C invertible.</summary>
    public static AdjustedGroups? Of(ReadOnlySpan<int> blocks, ReadOnlySpan<int> groups)
    {
        long[] sizes = RunNeighbours.Counts(blocks);
        int[] column = Columns(RunNeighbours.Counts(groups));
        int k = column.Max() + 1;
        if (k < 1)
        {
            return null;
        }

        double[,] shares = Shares(blocks, groups, sizes, column, k);
        var normal = new double[k, k];
        var once = new double[k, k];
        var twice = new double[k, k];
        var sums = new double[sizes.Length, k];
        var row = new double[k];
        var times = new double[k];
        for (int i = 0; i < groups.Length; i++)
        {
            Array.Clear(row);
            Array.Clear(times);
            AddRow(row, 1, i, blocks, groups, shares, column);
            AddRow(times, RunNeighbours.Degree(i, groups.Length), i, blocks, groups, shares, column);
            if (i > 0)
            {
                AddRow(times, -1, i - 1, blocks, groups, shares, column);
            }

            if (i < groups.Length - 1)
            {
                AddRow(times, -1, i + 1, blocks, groups, shares, column);
            }

            AddProduct(normal, row, row);
            AddProduct(once, row, times);
            AddProduct(twice, times, times);
            for (int j = 0; j < k; j++)
            {
                sums[blocks[i], j] += times[j];
            }
        }

        Matrix<double> c = Matrix<double>.Build.DenseOfArray(normal);
        return Inverse(c) is { } inverse
            ? new AdjustedGroups(inverse, Matrix<double>.Build.DenseOfArray(once), Matrix<double>.Build.DenseOfArray(twice), Averaged(sums, sizes, k))
            : null;
    }

    private static int[] Columns(long[] counts)
    {
        var column = new int[counts.Length];
        int next = -1;
        for (int i = 0; i < column.Length; i++)
        {
            column[i] = counts[i] > 0 ? next++ : -1;
        }

        return column;
    }

    private static double[,] Shares(ReadOnlySpan<int> blocks, ReadOnlySpan<int> groups, long[] sizes, int[] column, int k)
    {
        var shares = new double[sizes.Length, k];
        for (int i = 0; i < groups.Length; i++)
        {
            if (column[groups[i]] >= 0)
            {
                shares[blocks[i], column[groups[i]]] += 1.0 / sizes[blocks[i]];
            }
        }

        return shares;
    }

    private static void AddRow(double[] into, double factor, int i, ReadOnlySpan<int> blocks, ReadOnlySpan<int> groups, double[,] shares, int[] column)
    {
        for (int j = 0; j < into.Length; j++)
        {
            into[j] -= factor * shares[blocks[i], j];
        }

        if (column[groups[i]] >= 0)
        {
            into[column[groups[i]]] += factor;
        }
    }

    private static void AddProduct(double[,] into, double[] left, double[] right)
    {
        for (int a = 0; a < left.Length; a++)
        {
            for (int b = 0; b < right.Length; b++)
            {
                into[a, b] += left[a] * right[b];
            }
        }
    }

    private static Matrix<double> Averaged(double[,] sums, long[] sizes, int k)
    {
        var averaged = new double[k, k];
        var row = new double[k];
        for (int block = 0; block < sizes.Length; block++)
        {
            if (sizes[block] > 0)
            {
                for (int j = 0; j < k; j++)
                {
                    row[j] = sums[block, j] / Math.Sqrt(sizes[block]);
                }

                AddProduct(averaged, row, row);
            }
        }

        return Matrix<double>.Build.DenseOfArray(averaged);
    }

    /// <summary>The inverse of a positive definite matrix; null where it is singular to working accuracy.</summary>
    private static Matrix<double>? Inverse(Matrix<double> c)
    {
        double[] values = [.. c.Evd(Symmetricity.Symmetric).EigenValues.Select(v => v.Real)];
        return values.Min() > 1e-10 * values.Max() ? c.Inverse() : null;
    }
}
