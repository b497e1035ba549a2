using BenchmarkDotNet.Attributes;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.FollowUps;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>Tails of the studentized range and the follow-ups of one experiment of five groups of ten.</summary>
[InProcess]
[MemoryDiagnoser]
public class FollowUpKernels
{
    private const int Count = 1_000;
    private readonly double[] _q = Inputs.RangeStatistics(Count);
    private readonly GroupEstimates _experiment = Inputs.Estimates(1)[0];

    [Benchmark(OperationsPerInvoke = Count)]
    [Arguments(true)]
    [Arguments(false)]
    public double RangeTails(bool tabled)
    {
        StudentizedRange law = tabled ? StudentizedRange.For(5, 45) : StudentizedRange.Direct(5, 45);
        double sum = 0;
        foreach (double q in _q)
        {
            sum += law.LogUpperTail(q);
        }

        return sum;
    }

    [Benchmark]
    [Arguments("tukey-kramer")]
    [Arguments("games-howell")]
    [Arguments("dunnett")]
    [Arguments("scheffe")]
    [Arguments("holm-pairs")]
    public IReadOnlyList<GroupComparison> Compare(string followUp) => FollowUpRegistry.Find(followUp)!.Compare(_experiment, 0, 0.95);
}
