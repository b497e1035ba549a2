using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class FTestCostTests
{
    [Fact]
    public void A_campaign_allocates_its_outcomes_and_nothing_for_each_value()
    {
        (long[] small, ushort[] smallGroups) = Values(50);
        (long[] large, ushort[] largeGroups) = Values(5000);
        long few = Allocated(small, smallGroups);
        long many = Allocated(large, largeGroups);
        Assert.Equal(few, many);
        Assert.True(few <= 400, $"{few} bytes an experiment.");
    }

    private static (long[] Values, ushort[] Groups) Values(int count)
    {
        var random = new Random(1);
        return ([.. Enumerable.Range(0, count).Select(_ => random.NextInt64(10_000, 12_000))], [.. Enumerable.Range(0, count).Select(i => (ushort)(i % 5))]);
    }

    private static long Allocated(long[] values, ushort[] groups)
    {
        var test = new FTest();
        test.Test(new GroupedSample(values, 2, groups, 5));
        long before = GC.GetAllocatedBytesForCurrentThread();
        test.Test(new GroupedSample(values, 2, groups, 5));
        return GC.GetAllocatedBytesForCurrentThread() - before;
    }
}
