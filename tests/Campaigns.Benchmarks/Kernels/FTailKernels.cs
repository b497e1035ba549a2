using BenchmarkDotNet.Attributes;
using Campaigns.Statistics.Distributions;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>Upper tails of F with their logarithms, a thousand at a time.</summary>
[InProcess]
public class FTailKernels
{
    private const int Count = 1_000;
    private readonly double[] _f = Inputs.FStatistics(Count);
    private FDistribution? _law;

    [Params(3, 4)]
    public int Df1 { get; set; }

    [Params(20, 45, 18_000)]
    public int Df2 { get; set; }

    [GlobalSetup]
    public void MakeLaw() => _law = FDistribution.For(Df1, Df2);

    [Benchmark(OperationsPerInvoke = Count)]
    public double UpperTailPValues()
    {
        double sum = 0;
        foreach (double f in _f)
        {
            sum += _law!.UpperTailPValue(f).Log;
        }

        return sum;
    }
}
