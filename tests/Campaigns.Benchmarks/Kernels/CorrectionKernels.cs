using BenchmarkDotNet.Attributes;
using Campaigns.Statistics.Corrections;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>Ranking a family and adjusting it.</summary>
[InProcess]
[MemoryDiagnoser]
public class CorrectionKernels
{
    private double[] _p = [];
    private double[] _adjusted = [];
    private RankedFamily? _ranked;

    [Params(1_000, 100_000, 1_000_000)]
    public int Count { get; set; }

    [GlobalSetup]
    public void MakeInputs()
    {
        _p = Inputs.PValues(Count);
        _adjusted = new double[Count];
        _ranked = RankedFamily.Of(_p, Count);
    }

    [Benchmark]
    public RankedFamily Rank() => RankedFamily.Of(_p, Count);

    [Benchmark]
    [Arguments("bonferroni")]
    [Arguments("holm")]
    [Arguments("bh")]
    [Arguments("hommel")]
    public double Adjust(string correction)
    {
        CorrectionRegistry.Find(correction)!.Adjust(_ranked!, _adjusted);
        return _adjusted[0];
    }
}
