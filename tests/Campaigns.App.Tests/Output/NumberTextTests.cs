using System.Globalization;
using Campaigns.App.Output;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Output;

public sealed class NumberTextTests
{
    [Theory]
    [InlineData(1, "1.0000")]
    [InlineData(0.05, "0.0500")]
    [InlineData(0.0001, "0.0001")]
    [InlineData(0.000099, "9.9e-5")]
    [InlineData(0.0000999, "1.0e-4")]
    [InlineData(3.2e-7, "3.2e-7")]
    [InlineData(5e-324, "4.9e-324")]
    public void A_p_value_has_four_decimals_or_an_exponent(double p, string text) => Assert.Equal(text, NumberText.P(PValue.FromValue(p)));

    // mpmath 1.3.0, 40 digits: log(1.2e-5000) = -11512.7431434134345, exp(-1000) = 5.0759588975e-435, exp(-100000) = 3.5629495653e-43430.
    [Theory]
    [InlineData(-11512.7431434134, "1.2e-5000")]
    [InlineData(-1000, "5.1e-435")]
    [InlineData(-100000, "3.6e-43430")]
    public void Below_the_range_of_doubles_the_digits_come_from_the_logarithm(double log, string text) => Assert.Equal(text, NumberText.P(PValue.FromLog(log)));

    [Fact]
    public void A_p_value_given_as_zero_is_not_shown_as_zero() => Assert.Equal("<4.9e-324", NumberText.P(PValue.FromValue(0)));

    // mpmath 1.3.0, 40 digits: exp(-1000) = 5.075958897549456765e-435, exp(-800) = 3.667874584177687213e-348; half a unit of the last place of ln p is 5.7e-14: 13 digits.
    [Theory]
    [InlineData(-1000, "5.075958897549E-435")]
    [InlineData(-800, "3.667874584178E-348")]
    public void A_file_gets_the_digits_that_the_logarithm_carries(double log, string text) => Assert.Equal(text, NumberText.RoundTrip(PValue.FromLog(log)));

    [Theory]
    [InlineData(0.1)]
    [InlineData(1.0 / 3)]
    [InlineData(5e-324)]
    [InlineData(1.7976931348623157e308)]
    [InlineData(-2.5e-17)]
    public void What_is_written_to_a_file_reads_back_as_the_same_number(double value)
    {
        Assert.Equal(value, double.Parse(NumberText.RoundTrip(value), CultureInfo.InvariantCulture));
        if (value is > 0 and <= 1)
        {
            Assert.Equal(value, double.Parse(NumberText.RoundTrip(PValue.FromValue(value)), CultureInfo.InvariantCulture));
        }
    }

    [Theory]
    [InlineData(0, 4, "0")]
    [InlineData(12.3456, 4, "12.35")]
    [InlineData(172.5, 3, "173")]
    [InlineData(-172.5, 3, "-173")]
    [InlineData(173.5, 3, "174")]
    [InlineData(0.125, 2, "0.13")]
    [InlineData(1.005, 3, "1.01")]
    [InlineData(0.0012345, 4, "0.001235")]
    [InlineData(-12.3456, 3, "-12.3")]
    [InlineData(0.00123456, 4, "0.001235")]
    [InlineData(0.000123456, 4, "1.235e-4")]
    [InlineData(123456, 3, "123456")]
    [InlineData(1234567, 3, "1.23e6")]
    [InlineData(1234567, 1, "1e6")]
    [InlineData(double.PositiveInfinity, 4, ">1.8e308")]
    public void A_number_on_the_screen_has_its_significant_digits(double value, int digits, string text) => Assert.Equal(text, NumberText.Screen(value, digits));

    [Fact]
    public void What_is_no_number_is_never_written()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => NumberText.Screen(double.NaN, 4));
        Assert.Throws<ArgumentOutOfRangeException>(() => NumberText.RoundTrip(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => NumberText.RoundTrip(double.PositiveInfinity));
    }
}
