using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.Units;

public sealed class FittedLayoutTests
{
    [Fact]
    public void Residuals_and_leverages_of_plain_groups_are_those_of_a_calculation_by_hand()
    {
        FittedLayout fit = FittedLayout.OneWay(new GroupedSample([10L, 40, 20, 50, 70], 1, [0, 1, 0, 1, 1], 3))!;
        double scale = fit.Scale.ToDouble();
        double[] expected = [-0.5, -4.0 / 3, 0.5, -1.0 / 3, 5.0 / 3];
        Assert.All(expected.Zip(fit.Residuals), pair => Assert.Equal(pair.First, pair.Second * scale, 4e-16));
        Assert.Equal([0.5, 1.0 / 3, 0.5, 1.0 / 3, 1.0 / 3], fit.Leverages);
        Assert.Equal(3, fit.DegreesOfFreedom);
        Assert.False(fit.WithinBlocks);
        Assert.InRange(fit.Residuals.Max(Math.Abs), 0.5, 2);
    }

    [Fact]
    public void Groups_three_hundred_digits_apart_keep_their_residuals()
    {
        BigInteger far = BigInteger.Pow(10, 300);
        FittedLayout fit = FittedLayout.OneWay(new GroupedSample([1, 2, 4, far + 1, far + 2, far + 4], 0, [0, 0, 0, 1, 1, 1], 2))!;
        Assert.Equal(fit.Residuals.Take(3), fit.Residuals.Skip(3));
        Assert.Equal(5.0 / 3, fit.Residuals[5] * fit.Scale.ToDouble(), 4e-16);
    }

    [Theory]
    [InlineData(330)]
    [InlineData(-330)]
    public void Residuals_beyond_the_doubles_are_scaled(int power)
    {
        long[] values = [1, 2, 4, 7, 7, 9];
        ushort[] groups = [0, 0, 0, 1, 1, 1];
        FittedLayout plain = FittedLayout.OneWay(new GroupedSample(values, 0, groups, 2) { Blocks = [0, 1, 2, 0, 1, 2] })!;
        FittedLayout far = FittedLayout.OneWay(new GroupedSample(values, -power, groups, 2))!;
        Assert.Equal(plain.Residuals, far.Residuals);
        FittedLayout blocks = FittedLayout.InBlocks(new GroupedSample(values, 0, groups, 2) { Blocks = [0, 1, 2, 0, 1, 2] })!;
        FittedLayout farBlocks = FittedLayout.InBlocks(new GroupedSample(values, -power, groups, 2) { Blocks = [0, 1, 2, 0, 1, 2] })!;
        Assert.Equal(blocks.Residuals, farBlocks.Residuals);
        Assert.Equal(power * Math.Log(10), farBlocks.Scale.Log() - blocks.Scale.Log(), 1e-10);
    }

    [Fact]
    public void Nothing_is_fitted_without_a_residual_degree_of_freedom() =>
        Assert.Null(FittedLayout.OneWay(new GroupedSample([1L, 2], 0, [0, 1], 2)));

    [Fact]
    public void Constant_groups_have_residuals_of_zero()
    {
        FittedLayout fit = FittedLayout.OneWay(new GroupedSample([3L, 3, 3], 0, [0, 0, 1], 2))!;
        Assert.All(fit.Residuals, r => Assert.Equal(0, r));
        Assert.Equal([0.5, 0.5, 1], fit.Leverages);
    }
}
