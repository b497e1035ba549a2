using Campaigns.Benchmarks.Generating;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>Repeatable inputs of the kernels.</summary>
internal static class Inputs
{
    /// <summary>P-values of which more are small than under the null alone: squares of uniform numbers.</summary>
    public static double[] PValues(int count)
    {
        var p = new double[count];
        for (int i = 0; i < count; i++)
        {
            double uniform = Uniform(50, i);
            p[i] = uniform * uniform;
        }

        return p;
    }

    /// <summary>F statistics between 0 and about 25: exponential with mean 2.</summary>
    public static double[] FStatistics(int count)
    {
        var f = new double[count];
        for (int i = 0; i < count; i++)
        {
            f[i] = -2 * Math.Log(Uniform(51, i));
        }

        return f;
    }

    /// <summary>Above 0 and below 1.</summary>
    private static double Uniform(int purpose, int index) => ((Draws.Bits(purpose, index) >> 11) + 0.5) / (1L << 53);
}
