using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Loading;

public sealed class PValueTextTests
{
    // Logarithms from mpmath 1.2.1 at 50 digits (mp.log(mpf(text))), rounded to 17 digits.
    [Theory]
    [InlineData("0.05", 0.05, -2.9957322735539910)]
    [InlineData("1", 1.0, 0.0)]
    [InlineData("5e-1", 0.5, -0.69314718055994531)]
    [InlineData("1e-300", 1e-300, -690.77552789821371)]
    [InlineData("1e-310", 1e-310, -713.80137882815417)]
    [InlineData("1e-400", 0.0, -921.03403719761827)]
    [InlineData("2.5E-1000", 0.0, -2301.6688022621715)]
    [InlineData(" 3e-5 ", 3e-5, -10.414313176302118)]
    public void A_p_value_comes_with_its_logarithm(string text, double value, double log)
    {
        Assert.True(PValueText.TryParse(Encoding.UTF8.GetBytes(text), DecimalMark.Point, out PValue p, out string reason), reason);
        Assert.Equal(value, p.Value);
        Assert.InRange(p.Log - log, -1e-15 * Math.Abs(log), 1e-15 * Math.Abs(log));
    }

    [Fact]
    public void Zero_is_taken_as_given()
    {
        Assert.True(PValueText.TryParse("0.000"u8, DecimalMark.Point, out PValue p, out _));
        Assert.Equal(double.NegativeInfinity, p.Log);
    }

    [Fact]
    public void P_values_below_the_smallest_double_keep_their_order()
    {
        PValueText.TryParse("1e-400"u8, DecimalMark.Point, out PValue larger, out _);
        PValueText.TryParse("1e-401"u8, DecimalMark.Point, out PValue smaller, out _);
        Assert.True(smaller < larger);
    }

    [Fact]
    public void A_decimal_comma_is_read_when_the_file_has_them()
    {
        Assert.True(PValueText.TryParse("0,04"u8, DecimalMark.Comma, out PValue p, out _));
        Assert.Equal(0.04, p.Value);
    }

    [Theory]
    [InlineData("1.0001", "between 0 and 1")]
    [InlineData("1.00000000000000000001", "between 0 and 1")]
    [InlineData("10", "between 0 and 1")]
    [InlineData("1e400", "between 0 and 1")]
    [InlineData("-0.1", "between 0 and 1")]
    [InlineData("<0.001", "limit")]
    [InlineData("NA", "no value")]
    [InlineData("", "no value")]
    [InlineData("0,05", "--decimal comma")]
    [InlineData("5%", "unit")]
    [InlineData("NaN", "finite")]
    public void What_is_no_p_value_is_refused_with_its_reason(string text, string expected)
    {
        Assert.False(PValueText.TryParse(Encoding.UTF8.GetBytes(text), DecimalMark.Point, out _, out string reason));
        Assert.Contains(expected, reason, StringComparison.Ordinal);
    }
}
