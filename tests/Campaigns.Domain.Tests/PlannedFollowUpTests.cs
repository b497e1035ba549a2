using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

public sealed class PlannedFollowUpTests
{
    private static readonly string[] Labels = ["a", "b", "c"];
    private static readonly SignificanceLevel Level = new(0.05);

    // Group means 1, 3, 5 in three blocks that lie 10 apart; within a group and block the values differ by the same sign pattern.
    private static readonly long[] Values = [10, 30, 50, 111, 129, 150, 209, 231, 250];
    private static readonly ushort[] Groups = [0, 1, 2, 0, 1, 2, 0, 1, 2];
    private static readonly int[] Blocks = [0, 0, 0, 1, 1, 1, 2, 2, 2];

    [Fact]
    public void A_plan_without_follow_up_compares_nothing() => Assert.Null(Of(Plan("f", "none")));

    [Fact]
    public void A_follow_up_that_this_version_lacks_is_refused_with_the_experiment()
    {
        RefusedException refused = Assert.Throws<RefusedException>(() => Of(Plan("f", "later")));
        Assert.Contains("experiment 'E' names the follow-up 'later'", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void All_pairs_are_compared_the_later_group_less_the_earlier()
    {
        PlannedFollowUp followUp = Of(Plan("f", "holm-pairs"))!;
        Assert.Equal([(0, 1), (0, 2), (1, 2)], followUp.Comparisons.Select(c => (c.GroupA, c.GroupB)));

        // Sums 330, 390, 450 of three values, with one decimal.
        Assert.Equal([2.0, 4.0, 2.0], followUp.Comparisons.Select(c => Math.Round(c.Difference, 12)));
        Assert.All(followUp.Comparisons, c => Assert.Equal(6, c.DegreesOfFreedom));
    }

    [Fact]
    public void A_test_within_blocks_is_followed_within_blocks()
    {
        PlannedFollowUp followUp = Of(Plan("block-f", "holm-pairs"))!;
        Assert.True(followUp.Estimates.WithinBlocks);
        Assert.Equal([2.0, 4.0, 2.0], followUp.Comparisons.Select(c => Math.Round(c.Difference, 12)));
        Assert.All(followUp.Comparisons, c => Assert.Equal((3 - 1) * (3 - 1), c.DegreesOfFreedom));
        Assert.True(followUp.Comparisons[1].P!.Value.Value < Of(Plan("f", "holm-pairs"))!.Comparisons[1].P!.Value.Value);
    }

    [Theory]
    [InlineData("a", new[] { 0, 1, 0, 2 })]
    [InlineData("b", new[] { 1, 0, 1, 2 })]
    [InlineData("c", new[] { 2, 0, 2, 1 })]
    public void Dunnett_holds_every_group_against_the_control_wherever_it_stands(string control, int[] pairs)
    {
        PlannedFollowUp followUp = Of(Plan("f", "dunnett") with { Control = control })!;
        Assert.Equal(pairs, followUp.Comparisons.SelectMany(c => (int[])[c.GroupA, c.GroupB]));
    }

    [Theory]
    [InlineData(null)]
    [InlineData("A")]
    [InlineData("not there")]
    public void Without_its_control_dunnett_compares_nothing(string? control) =>
        Assert.Empty(Of(Plan("f", "dunnett") with { Control = control })!.Comparisons);

    [Fact]
    public void A_control_without_values_leaves_nothing_to_compare_with()
    {
        PlannedFollowUp? followUp = PlannedFollowUp.Of(Plan("f", "dunnett") with { Control = "a" }, Labels, new GroupedSample([10, 12, 20, 21], 1, [1, 1, 2, 2], 3), Level);
        Assert.Empty(followUp!.Comparisons);
    }

    [Theory]
    [InlineData("f", new long[] { 1, 2, 3 }, new ushort[] { 0, 1, 2 })]
    [InlineData("f", new long[] { 1, 2, 3 }, new ushort[] { 1, 1, 1 })]
    [InlineData("block-f", new long[] { 1, 2, 3, 5 }, new ushort[] { 0, 0, 1, 1 })]
    public void Data_that_tell_nothing_of_chance_are_not_compared(string test, long[] values, ushort[] groups) =>
        Assert.Null(PlannedFollowUp.Of(Plan(test, "holm-pairs"), Labels, new GroupedSample(values, 0, groups, 3), Level));

    [Fact]
    public void Readings_of_a_specimen_are_compared_by_their_mean()
    {
        PlannedFollowUp readings = PlannedFollowUp.Of(
            Plan("f", "tukey-kramer"), Labels[..2], new GroupedSample([10, 14, 16, 20, 24, 30, 32], 0, [0, 0, 0, 1, 1, 1, 1], 2) { Specimens = new[] { 0, 0, 1, 2, 2, 3, 3 } }, Level)!;
        PlannedFollowUp means = PlannedFollowUp.Of(Plan("f", "tukey-kramer"), Labels[..2], new GroupedSample([12, 16, 22, 31], 0, [0, 0, 1, 1], 2), Level)!;
        Assert.Equal(means.Comparisons, readings.Comparisons);
        Assert.Equal(2, Assert.Single(readings.Comparisons).DegreesOfFreedom);
    }

    [Fact]
    public void Intervals_hold_at_one_less_the_level()
    {
        PlannedFollowUp wide = PlannedFollowUp.Of(Plan("f", "scheffe"), Labels, Sample(), new SignificanceLevel(0.01))!;
        PlannedFollowUp narrow = Of(Plan("f", "scheffe"))!;
        Assert.All(wide.Comparisons.Zip(narrow.Comparisons), p => Assert.True(p.First.Lower < p.Second.Lower && p.First.Upper > p.Second.Upper));
        Assert.Equal(narrow.Comparisons.Select(c => c.P), wide.Comparisons.Select(c => c.P));
    }

    private static PlannedFollowUp? Of(PlannedExperiment plan) => PlannedFollowUp.Of(plan, Labels, Sample(), Level);

    private static GroupedSample Sample() => new(Values, 1, Groups, 3) { Blocks = Blocks };

    private static PlannedExperiment Plan(string test, string followUp) => new() { Code = "E", Test = test, FollowUp = followUp };
}
