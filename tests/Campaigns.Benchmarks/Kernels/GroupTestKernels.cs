using BenchmarkDotNet.Attributes;
using Campaigns.Benchmarks.Generating;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>Omnibus tests of one experiment, from typed decimals to the p-value.</summary>
[InProcess]
[MemoryDiagnoser]
public class GroupTestKernels
{
    private const int GroupCount = 5;
    private long[] _mantissas = [];
    private ushort[] _groups = [];
    private GroupTest? _test;

    [Params("f", "welch", "brown-forsythe", "kruskal-wallis")]
    public string Key { get; set; } = "";

    [Params(10, 200, 2_000)]
    public int Replicates { get; set; }

    [GlobalSetup]
    public void MakeInputs()
    {
        var campaign = new SyntheticCampaign(new CampaignSize(1, GroupCount, Replicates));
        _mantissas = [.. Enumerable.Range(0, GroupCount * Replicates).Select(cell => campaign.Reading(0, cell))];
        _groups = [.. Enumerable.Range(0, GroupCount * Replicates).Select(cell => (ushort)(cell / Replicates))];
        _test = GroupTestRegistry.Find(Key);
    }

    [Benchmark]
    public TestOutcome Test() => _test!.Test(new GroupedSample(_mantissas, 4, _groups, GroupCount));
}
