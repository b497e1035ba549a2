using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class GroupTestConformanceTests
{
    [Fact]
    public void Every_group_test_of_the_assembly_is_in_the_registry_once()
    {
        IEnumerable<Type> written = typeof(GroupTest).Assembly.GetTypes().Where(t => t.IsSubclassOf(typeof(GroupTest)) && !t.IsAbstract);
        Assert.Equal(written.OrderBy(t => t.FullName, StringComparer.Ordinal), GroupTestRegistry.All.Select(t => t.GetType()).OrderBy(t => t.FullName, StringComparer.Ordinal));
        Assert.NotEmpty(GroupTestRegistry.All);
    }

    [Fact]
    public void Keys_are_unique_lower_case_and_frozen()
    {
        string[] frozen = [.. File.ReadLines(Path.Combine(ReferenceTable.Folder(), "frozen-keys.txt"))
            .Select(l => l.Split(' '))
            .Where(l => l[0] == "test")
            .Select(l => l[1])];
        string[] keys = [.. GroupTestRegistry.All.Select(t => t.Key)];
        Assert.Equal(keys.Length, keys.Distinct().Count());
        Assert.All(keys, k => Assert.Matches("^[a-z][a-z-]*$", k));
        Assert.Equal(frozen.Order(StringComparer.Ordinal), keys.Order(StringComparer.Ordinal));
    }

    [Fact]
    public void Every_group_test_says_what_it_does()
    {
        Assert.All(GroupTestRegistry.All, t =>
        {
            Assert.All([t.Name, t.Hypothesis, t.Assumes, t.Source], text => Assert.False(string.IsNullOrWhiteSpace(text)));
            Assert.Same(t, GroupTestRegistry.Find(t.Key));
        });
        Assert.Null(GroupTestRegistry.Find("no such test"));
    }

    [Fact]
    public void Every_group_test_answers_an_empty_sample_with_a_reason() =>
        Assert.All(GroupTestRegistry.All, t => Assert.IsType<NotTestable>(t.Test(new GroupedSample(ReadOnlySpan<long>.Empty, 0, [], 3))));
}
