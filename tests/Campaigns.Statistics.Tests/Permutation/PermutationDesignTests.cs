using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Permutation;

namespace Campaigns.Statistics.Tests.Permutation;

public sealed class PermutationDesignTests
{
    [Theory]
    [InlineData(new[] { 5, 5, 5 }, 756_756, 126_126)] // 15!/(5! 5! 5!), over 3!
    [InlineData(new[] { 3, 5, 4 }, 27_720, 27_720)]
    [InlineData(new[] { 2, 2 }, 6, 3)]
    [InlineData(new[] { 2, 2, 2 }, 90, 15)]
    [InlineData(new[] { 1, 3, 1, 3 }, 1120, 280)] // 8!/(3! 3!), over 2! 2!
    [InlineData(new[] { 99_999, 1 }, 100_000, 100_000)]
    [InlineData(new[] { 10, 0, 10 }, 184_756, 92_378)]
    public void Arrangements_are_counted_whole_and_without_exchanges_of_equal_groups(int[] sizes, long all, long distinct)
    {
        PermutationDesign design = PermutationDesign.Of(sizes);
        Assert.Equal(all, design.Arrangements);
        Assert.Equal(distinct, design.DistinctArrangements);
        Assert.True(design.IsEnumerated);
        Assert.Equal(1.0 / distinct, PermutationTest.SmallestP(sizes, 99_999));
    }

    [Fact]
    public void Designs_too_large_to_enumerate_are_drawn_from()
    {
        // 24!/6!^4 = 2308743493056 arrangements fit 64 bits, 100,000!/... do not.
        PermutationDesign four = PermutationDesign.Of([6, 6, 6, 6]);
        Assert.Equal(2_308_743_493_056, four.Arrangements);
        Assert.False(four.IsEnumerated);
        PermutationDesign large = PermutationDesign.Of([50_000, 50_000]);
        Assert.Null(large.Arrangements);
        Assert.Null(large.DistinctArrangements);
        Assert.False(large.IsEnumerated);
        Assert.Equal(1e-5, PermutationTest.SmallestP([6, 6, 6, 6], 99_999));
        Assert.Equal(1.0 / 1000, PermutationTest.SmallestP([50_000, 50_000], 999));

        // 59 groups of one and a group of two: 61!/2 arrangements do not fit, though only 1830 are distinct.
        Assert.False(PermutationDesign.Of([.. Enumerable.Repeat(1, 59), 2]).IsEnumerated);
    }

    [Fact]
    public void A_design_does_not_depend_on_the_order_of_the_groups_nor_on_empty_ones()
    {
        Assert.Equal(PermutationDesign.Of([3, 5, 4]), PermutationDesign.Of([5, 0, 4, 3]));
        Assert.Equal(PermutationDesign.Of([3, 5, 4]).GetHashCode(), PermutationDesign.Of([5, 0, 4, 3]).GetHashCode());
        Assert.NotEqual(PermutationDesign.Of([3, 5, 4]), PermutationDesign.Of([4, 4, 4]));
        Assert.Equal([3, 4, 5], PermutationDesign.Of([5, 0, 4, 3]).Sizes.ToArray());
    }

    [Fact]
    public void What_is_no_design_is_refused()
    {
        Assert.Throws<ArgumentException>(() => PermutationDesign.Of([5, 0]));
        Assert.Throws<ArgumentException>(() => PermutationDesign.Of([5, -1, 3]));
        Assert.Throws<ArgumentOutOfRangeException>(() => PermutationTest.SmallestP([5, 5], 0));
        Assert.Equal(1, PermutationTest.SmallestP([5, 0], 10));
        Assert.Equal(1, PermutationTest.SmallestP([], 10));
    }
}
