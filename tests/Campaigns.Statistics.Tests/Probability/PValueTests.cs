using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Probability;

public sealed class PValueTests
{
    [Fact]
    public void A_p_value_that_was_never_given_throws_when_read()
    {
        Assert.Throws<InvalidOperationException>(() => default(PValue).Value);
        Assert.Throws<InvalidOperationException>(() => default(PValue).Log);
        Assert.Throws<InvalidOperationException>(() => default(PValue) < PValue.One);
        Assert.Equal("(no p-value)", default(PValue).ToString());
        Assert.NotEqual(PValue.FromValue(0), default);
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(-1e-300)]
    [InlineData(1.0000000000000002)]
    public void Only_numbers_from_0_to_1_are_p_values(double value)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => PValue.FromValue(value));
        Assert.Throws<ArgumentOutOfRangeException>(() => PValue.FromValueAndLog(value, -1));
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(1e-300)]
    public void The_logarithm_of_a_p_value_is_at_most_0(double log)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => PValue.FromLog(log));
        Assert.Throws<ArgumentOutOfRangeException>(() => PValue.FromValueAndLog(0.5, log));
    }

    [Fact]
    public void Below_the_range_of_doubles_order_and_print_go_by_the_logarithm()
    {
        var smaller = PValue.FromLog(-1000001);
        var larger = PValue.FromLog(-1000000.5);
        Assert.True(smaller < larger && larger > smaller && smaller <= larger && larger >= smaller && smaller != larger);
        Assert.True(smaller.IsBelowDoubleRange);
        Assert.Equal("exp(-1000000.5)", larger.ToString());
        Assert.False(PValue.FromValue(0).IsBelowDoubleRange);
        Assert.True(PValue.FromValue(0) < smaller);
    }

    [Fact]
    public void Values_print_so_that_they_read_back_the_same()
    {
        Assert.Equal("0.1", PValue.FromValue(0.1).ToString());
        Assert.Equal("5E-324", PValue.FromValue(5e-324).ToString());
    }

    [Fact]
    public void Equal_p_values_are_equal_and_hash_alike()
    {
        Assert.True(PValue.FromValue(0.25) == PValue.FromValue(0.25));
        Assert.Equal(PValue.FromValue(0.25).GetHashCode(), PValue.FromValue(0.25).GetHashCode());
        Assert.True(PValue.FromValue(0.25).Equals((object)PValue.FromValue(0.25)));
    }
}
