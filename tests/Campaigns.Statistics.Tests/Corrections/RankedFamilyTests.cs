using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Corrections;

public sealed class RankedFamilyTests
{
    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(33)]
    [InlineData(5000)]
    [InlineData(100000)]
    public void Ranks_ascend_and_ties_keep_their_order(int count)
    {
        var random = new Random(20260406);
        double[][] kinds =
        [
            [.. Enumerable.Range(0, count).Select(_ => random.NextDouble())],
            [.. Enumerable.Range(0, count).Select(_ => random.Next(20) / 20.0)],
            [.. Enumerable.Range(0, count).Select(_ => Math.Pow(10, -320 * random.NextDouble()))],

            // All in one run of equal leading bits, in descending order with ties.
            [.. Enumerable.Range(0, count).Select(i => 0.5 + ((count - (i / 3)) * 1e-15))],
        ];
        foreach (double[] p in kinds)
        {
            var family = RankedFamily.Of(p, count);
            int[] expected = [.. Enumerable.Range(0, count).OrderBy(i => p[i])];
            Assert.Equal(expected, family.Order.ToArray());
            Assert.Equal(expected.Select(i => p[i]), family.Sorted.ToArray());
        }
    }

    [Fact]
    public void Below_the_range_of_doubles_the_logarithm_ranks()
    {
        PValue[] p = [PValue.FromLog(-800), PValue.FromValue(0.5), PValue.FromLog(-9000), PValue.FromValue(0), PValue.FromLog(-800), PValue.FromLog(-744.2), PValue.FromLog(-744.3)];
        Assert.Equal([3, 2, 0, 4, 6, 5, 1], RankedFamily.Of(p, 7).Order.ToArray());
    }

    [Fact]
    public void Negative_zero_ranks_as_zero()
    {
        Assert.Equal([1, 0], RankedFamily.Of([0.5, -0.0], 2).Order.ToArray());
        Assert.Equal([1, 0], RankedFamily.Of([PValue.FromValue(0.5), PValue.FromValue(-0.0)], 2).Order.ToArray());
    }

    [Fact]
    public void A_family_smaller_than_its_p_values_is_refused_with_both_numbers()
    {
        ArgumentException fault = Assert.Throws<ArgumentException>(() => RankedFamily.Of([0.1, 0.2, 0.3], 2));
        Assert.Contains("family of 2", fault.Message, StringComparison.Ordinal);
        Assert.Contains("3 p-values", fault.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => RankedFamily.Of([PValue.One], 0));
        Assert.Throws<ArgumentException>(() => RankedFamily.Of(ReadOnlySpan<double>.Empty, -1));
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(-0.1)]
    [InlineData(1.0000000000000002)]
    [InlineData(double.PositiveInfinity)]
    public void A_number_that_is_no_p_value_is_refused_with_its_place(double value)
    {
        ArgumentException fault = Assert.Throws<ArgumentException>(() => RankedFamily.Of([0.1, value], 2));
        Assert.Contains("number 2", fault.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void A_p_value_that_was_never_given_is_refused() =>
        Assert.Throws<InvalidOperationException>(() => RankedFamily.Of(new PValue[1], 1));

    [Fact]
    public void A_change_of_the_memory_given_does_not_reach_the_family()
    {
        double[] p = [0.3, 0.1];
        var family = RankedFamily.Of(p, 2);
        p[0] = 0;
        Assert.Equal([0.1, 0.3], family.Sorted.ToArray());
    }
}
