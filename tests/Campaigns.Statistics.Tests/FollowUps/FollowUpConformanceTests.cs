using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.FollowUps;

public sealed class FollowUpConformanceTests
{
    private static readonly (string Group, string Value)[] ThreeGroups =
        [("a", "1.5"), ("a", "2.25"), ("a", "1.75"), ("b", "3.5"), ("b", "3.25"), ("b", "4"), ("c", "2.5"), ("c", "1.25"), ("c", "2")];

    [Fact]
    public void Every_follow_up_of_the_assembly_is_in_the_registry_once()
    {
        IEnumerable<Type> written = typeof(FollowUp).Assembly.GetTypes().Where(t => t.IsSubclassOf(typeof(FollowUp)) && !t.IsAbstract);
        Assert.Equal(written.OrderBy(t => t.FullName, StringComparer.Ordinal), FollowUpRegistry.All.Select(t => t.GetType()).OrderBy(t => t.FullName, StringComparer.Ordinal));
        Assert.NotEmpty(FollowUpRegistry.All);
    }

    [Fact]
    public void Keys_are_unique_lower_case_and_frozen()
    {
        string[] frozen = [.. File.ReadLines(Path.Combine(ReferenceTable.Folder(), "frozen-keys.txt"))
            .Select(l => l.Split(' '))
            .Where(l => l[0] == "follow-up")
            .Select(l => l[1])];
        string[] keys = [.. FollowUpRegistry.All.Select(t => t.Key)];
        Assert.Equal(keys.Length, keys.Distinct().Count());
        Assert.DoesNotContain(FollowUpRegistry.None, keys);
        Assert.All(keys, k => Assert.Matches("^[a-z][a-z-]*$", k));
        Assert.Equal(frozen.Order(StringComparer.Ordinal), keys.Order(StringComparer.Ordinal));
    }

    [Fact]
    public void Every_follow_up_says_what_it_does()
    {
        Assert.All(FollowUpRegistry.All, f =>
        {
            Assert.All([f.Name, f.Holds, f.Assumes, f.Source], text => Assert.False(string.IsNullOrWhiteSpace(text)));
            Assert.Same(f, FollowUpRegistry.Find(f.Key));
        });
        Assert.Null(FollowUpRegistry.Find("no such follow-up"));
    }

    [Fact]
    public void Pairs_come_in_the_order_of_group_numbers_with_everything_a_line_has()
    {
        GroupEstimates estimates = TypedSample.OfText(ThreeGroups).Estimates()!;
        foreach (FollowUp followUp in FollowUpRegistry.All)
        {
            IReadOnlyList<GroupComparison> lines = followUp.Compare(estimates, followUp.NeedsControl ? 1 : null, 0.95);
            (int, int)[] expected = followUp.NeedsControl ? [(1, 0), (1, 2)] : [(0, 1), (0, 2), (1, 2)];
            Assert.Equal(expected, lines.Select(l => (l.GroupA, l.GroupB)));
            Assert.All(lines, l =>
            {
                Assert.Null(l.Obstacle);
                Assert.Equal(estimates.Difference(l.GroupA, l.GroupB), l.Difference);
                Assert.True(l.Lower < l.Difference && l.Difference < l.Upper);
                Assert.True(l.DegreesOfFreedom > 0);
                Assert.Equal(followUp.Key == "scheffe" ? 1 : Math.Sign(l.Difference), Math.Sign(l.Statistic!.Value));
                Assert.InRange(l.P!.Value.Value, 1e-10, 1);
            });
        }
    }

    [Fact]
    public void A_missing_control_gives_no_lines_and_a_wrong_confidence_is_refused()
    {
        GroupEstimates estimates = TypedSample.OfText(ThreeGroups).Estimates()!;
        Assert.All(FollowUpRegistry.All, f =>
        {
            foreach (double confidence in new[] { 0, 1, -0.5, double.NaN })
            {
                Assert.Throws<ArgumentOutOfRangeException>(() => f.Compare(estimates, 0, confidence));
            }

            if (f.NeedsControl)
            {
                Assert.Empty(f.Compare(estimates, null, 0.95));
                Assert.Empty(f.Compare(estimates, -1, 0.95));
                Assert.Empty(f.Compare(estimates, 3, 0.95));
            }
        });
    }
}
