using BenchmarkDotNet.Attributes;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>10,000 random arrangements of 200 responses on 4 groups of 6 specimens.</summary>
[InProcess]
[MemoryDiagnoser]
public class CampaignPermutationKernels
{
    private readonly SpecimenSet _responses = Inputs.Responses(200);

    [Params(1, 2)]
    public int Threads { get; set; }

    private PermutationRun Draws => new(new RandomDraws(1, 10_000)) { Threads = Threads };

    [Benchmark]
    public StepDownResult[] MaxT() => StepDownPermutation.MaxT([_responses], Draws);

    [Benchmark]
    public StepDownResult[] MinP() => StepDownPermutation.MinP([_responses], Draws);
}
