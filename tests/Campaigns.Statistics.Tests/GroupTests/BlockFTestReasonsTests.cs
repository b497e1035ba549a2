using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class BlockFTestReasonsTests
{
    [Fact]
    public void A_value_without_a_block_is_the_first_reason()
    {
        Assert.Equal(NotTestableReason.BlockNotRecorded, Reason([1, 2, 3, 5], [0, 1, 0, 1], []));
        Assert.Equal(NotTestableReason.BlockNotRecorded, Reason([1, 2, 3, 5], [0, 1, 0, 1], [0, 0, 1, -1]));
        Assert.Equal(NotTestableReason.BlockNotRecorded, Reason([1, 2], [0, 0], [0, -1]));
    }

    [Fact]
    public void Reasons_come_in_their_order()
    {
        Assert.Equal(NotTestableReason.TooFewGroups, Reason([1, 1, 1], [1, 1, 1], [0, 0, 1]));
        Assert.Equal(NotTestableReason.DisconnectedBlocks, Reason([5, 5], [0, 1], [0, 1]));
        Assert.Equal(NotTestableReason.NoReplication, Reason([5, 5], [0, 1], [0, 0]));
        Assert.Equal(NotTestableReason.ConstantResponse, Reason([5, 5, 6, 6], [0, 1, 0, 1], [0, 0, 1, 1]));
        Assert.Equal(NotTestableReason.ZeroWithinVariation, Reason([5, 7, 6, 8], [0, 1, 0, 1], [0, 0, 1, 1]));
    }

    [Fact]
    public void One_unit_in_the_last_of_nineteen_digits_is_variation()
    {
        const long Far = 9_000_000_000_000_000_000;
        Assert.Equal(NotTestableReason.ZeroWithinVariation, Reason([-Far, 5, 0, Far + 5], [0, 1, 0, 1], [0, 0, 1, 1]));
        Tested tested = Assert.IsType<Tested>(Test([-Far, 5, 0, Far + 6], [0, 1, 0, 1], [0, 0, 1, 1]));
        Assert.Equal(0.25, tested.Variation!.Within.SumOfSquares);
    }

    [Fact]
    public void Groups_and_block_numbers_without_a_value_are_left_out()
    {
        TestOutcome with = new BlockFTest().Test(new GroupedSample([1L, 2, 4, 7, 5, 9], 0, [1, 3, 1, 3, 1, 3], 5) { Blocks = [7, 7, 1000000, 1000000, 2, 2] });
        TestOutcome without = new BlockFTest().Test(new GroupedSample([1L, 2, 4, 7, 5, 9], 0, [0, 1, 0, 1, 0, 1], 2) { Blocks = [0, 0, 1, 1, 2, 2] });
        Assert.Equal(without, with);
        Assert.IsType<Tested>(with);
        GroupEstimates estimates = GroupEstimates.InBlocks(new GroupedSample([1L, 2, 4, 7, 5, 9], 0, [1, 3, 1, 3, 1, 3], 5) { Blocks = [7, 7, 1000000, 1000000, 2, 2] })!;
        Assert.Equal([0, 3, 0, 3, 0], [.. Enumerable.Range(0, 5).Select(estimates.CountOf)]);
        Assert.Equal(8.0 / 3, estimates.Difference(1, 3));
    }

    [Fact]
    public void Groups_that_do_not_differ_within_blocks_give_F_0_and_p_1()
    {
        Tested tested = Assert.IsType<Tested>(Test([1, 3, 7, 5], [0, 1, 0, 1], [0, 0, 1, 1]));
        Assert.Equal((0, 1.0, 0.0), (tested.Statistic, tested.P.Value, tested.P.Log));
    }

    [Fact]
    public void Nothing_is_fitted_where_the_design_forbids_it()
    {
        Assert.Null(FittedLayout.InBlocks(new GroupedSample([5L, 6], 0, [0, 1], 2) { Blocks = [0, 0] }));
        Assert.Null(GroupEstimates.InBlocks(new GroupedSample([5L, 6, 7, 8], 0, [0, 0, 1, 1], 2) { Blocks = [0, 0, 1, 1] }));
        FittedLayout constant = FittedLayout.InBlocks(new GroupedSample([5L, 5, 6, 6], 0, [0, 1, 0, 1], 2) { Blocks = [0, 0, 1, 1] })!;
        Assert.All(constant.Residuals, r => Assert.Equal(0, r));
        Assert.All(constant.Leverages, h => Assert.Equal(0.75, h, 1e-15));
    }

    [Fact]
    public void A_value_of_an_unknown_group_is_refused() =>
        Assert.Throws<ArgumentException>(() => Test([1, 2], [0, 2], [0, 0]));

    [Fact]
    public void An_F_beyond_the_doubles_keeps_the_logarithm_of_its_p()
    {
        // Groups {0, 1} and {10^200, 10^200 + 2} in two blocks: F = (10^200 + 1/2)^2/(1/4), about 4 * 10^400, and P(F > f) with (1, 1) degrees of freedom is about 2/(pi sqrt(f)).
        var far = System.Numerics.BigInteger.Pow(10, 200);
        Tested tested = Assert.IsType<Tested>(new BlockFTest().Test(new GroupedSample([0, 1, far, far + 2], 0, [0, 0, 1, 1], 2) { Blocks = [0, 1, 0, 1] }));
        Assert.Equal(double.MaxValue, tested.Statistic);
        Relative.AssertNear(-Math.Log(Math.PI) - (200 * Math.Log(10)), tested.P.Log, 1e-14, "log p");
    }

    private static TestOutcome Test(long[] values, ushort[] groups, int[] blocks) =>
        new BlockFTest().Test(new GroupedSample(values, 0, groups, 2) { Blocks = blocks });

    private static NotTestableReason Reason(long[] values, ushort[] groups, int[] blocks) =>
        Assert.IsType<NotTestable>(Test(values, groups, blocks)).Reason;
}
