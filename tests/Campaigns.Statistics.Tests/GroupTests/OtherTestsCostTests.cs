using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class OtherTestsCostTests
{
    public static TheoryData<string> Keys => ["welch", "brown-forsythe", "kruskal-wallis"];

    [Theory]
    [MemberData(nameof(Keys))]
    public void A_test_allocates_its_outcome_and_nothing_for_each_value(string key)
    {
        GroupTest test = GroupTestRegistry.Find(key)!;
        long few = Allocated(test, 50);
        long many = Allocated(test, 5000);
        Assert.True(many <= few + 16, $"{few} bytes for 50 values, {many} for 5,000.");
        Assert.True(few <= 1000, $"{few} bytes an experiment.");
    }

    private static long Allocated(GroupTest test, int count)
    {
        var random = new Random(1);
        long[] values = [.. Enumerable.Range(0, count).Select(_ => random.NextInt64(10_000, 12_000))];
        ushort[] groups = [.. Enumerable.Range(0, count).Select(i => (ushort)(i % 5))];
        test.Test(new GroupedSample(values, 2, groups, 5));
        long before = GC.GetAllocatedBytesForCurrentThread();
        test.Test(new GroupedSample(values, 2, groups, 5));
        return GC.GetAllocatedBytesForCurrentThread() - before;
    }
}
