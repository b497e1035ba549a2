using System.Globalization;
using System.Numerics;
using System.Text;
using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Tests.Loading;

public sealed class DecimalTextTests
{
    [Theory]
    [InlineData("0", "0")]
    [InlineData("1.5", "1.5")]
    [InlineData("1.50", "1.50")]
    [InlineData("+1", "1")]
    [InlineData("-1", "-1")]
    [InlineData("\u22121.25", "-1.25")]
    [InlineData("-0", "0")]
    [InlineData("007", "7")]
    [InlineData("5.", "5")]
    [InlineData(".5", "0.5")]
    [InlineData("-.5", "-0.5")]
    [InlineData("  3.25\t", "3.25")]
    [InlineData("1e3", "1E3")]
    [InlineData("1E+3", "1E3")]
    [InlineData("1.5e-3", "0.0015")]
    [InlineData("2.50e1", "25.0")]
    [InlineData("1e\u22122", "0.01")]
    [InlineData("123456789012345678", "123456789012345678")]
    [InlineData("1234567890123456789", "1234567890123456789")]
    [InlineData("-12345678901234567890.12345", "-12345678901234567890.12345")]
    [InlineData("1000000000000.4", "1000000000000.4")]
    [InlineData("1e300", "1E300")]
    [InlineData("1e308", "1E308")]
    [InlineData("1.7976931348623157e308", "17976931348623157E292")]
    [InlineData("1e-307", "1E-307")]
    [InlineData("0.000", "0.000")]
    [InlineData("0e999", "0")]
    [InlineData("0.1000000000000000055511151231257827", "0.1000000000000000055511151231257827")]
    public void A_number_is_read_exactly_as_typed(string text, string expected)
    {
        Assert.Equal(NumberReading.Number, Parse(text, DecimalMark.Point, out ParsedDecimal value));
        Assert.Equal(expected, value.ToString());
    }

    [Theory]
    [InlineData("1,5", "1.5")]
    [InlineData("-0,250", "-0.250")]
    [InlineData("1,5e3", "15E2")]
    [InlineData("12", "12")]
    [InlineData(",5", "0.5")]
    public void With_decimal_commas_the_comma_is_the_mark(string text, string expected)
    {
        Assert.Equal(NumberReading.Number, Parse(text, DecimalMark.Comma, out ParsedDecimal value));
        Assert.Equal(expected, value.ToString());
    }

    [Theory]
    [InlineData("")]
    [InlineData("   ")]
    [InlineData("NA")]
    [InlineData("na")]
    [InlineData("Na")]
    [InlineData("N/A")]
    [InlineData("n/a")]
    [InlineData("\tNA ")]
    public void A_missing_mark_is_no_number_and_no_error(string text) => Assert.Equal(NumberReading.Missing, Parse(text, DecimalMark.Point, out _));

    [Theory]
    [InlineData("1,5", "decimal-comma")]
    [InlineData("1,234", "decimal-comma")]
    [InlineData("-1,5e3", "decimal-comma")]
    [InlineData("1.234,5", "thousands-separator")]
    [InlineData("1,234.5", "thousands-separator")]
    [InlineData("1,234,567", "thousands-separator")]
    [InlineData("1.234.567", "thousands-separator")]
    [InlineData("1 234.5", "thousands-separator")]
    [InlineData("1\u00A0234", "thousands-separator")]
    [InlineData("1\u202F234,5", "thousands-separator")]
    [InlineData("1'234", "thousands-separator")]
    [InlineData("1\u2019234.5", "thousands-separator")]
    [InlineData("1_000", "thousands-separator")]
    [InlineData("NaN", "not-finite")]
    [InlineData("nan", "not-finite")]
    [InlineData("Inf", "not-finite")]
    [InlineData("-Infinity", "not-finite")]
    [InlineData("\u221E", "not-finite")]
    [InlineData("1.#INF", "not-finite")]
    [InlineData("0x10", "hexadecimal")]
    [InlineData("TRUE", "truth-value")]
    [InlineData("false", "truth-value")]
    [InlineData("2024-05-31", "date")]
    [InlineData("31.05.2024", "date")]
    [InlineData("5/31/2024", "date")]
    [InlineData("2024-05-31T10:00:00", "date")]
    [InlineData("10:30", "date")]
    [InlineData("1/2", "date")]
    [InlineData("5-Mar", "date")]
    [InlineData("Mar-05", "date")]
    [InlineData("3-4", "date")]
    [InlineData("\uFF11\uFF12", "foreign-digits")]
    [InlineData("\u0661\u0662", "foreign-digits")]
    [InlineData("1\u0665", "foreign-digits")]
    [InlineData("5 mPa", "unit")]
    [InlineData("5mPa", "unit")]
    [InlineData("12.5%", "unit")]
    [InlineData("20 °C", "unit")]
    [InlineData("<0.05", "limit")]
    [InlineData(">10", "limit")]
    [InlineData("~3", "limit")]
    [InlineData("\u22640.1", "limit")]
    [InlineData("< LOD", "limit")]
    [InlineData("1e999", "too-large")]
    [InlineData("-1e309", "too-large")]
    [InlineData("1.7976931348623159e308", "too-large")]
    [InlineData("1e99999999999999999999", "too-large")]
    [InlineData("1e-400", "too-small")]
    [InlineData("9.99e-308", "too-small")]
    [InlineData("1e", "not-a-number")]
    [InlineData("1e+", "not-a-number")]
    [InlineData("e5", "not-a-number")]
    [InlineData("-", "not-a-number")]
    [InlineData("+", "not-a-number")]
    [InlineData(".", "not-a-number")]
    [InlineData("--5", "not-a-number")]
    [InlineData("+-5", "not-a-number")]
    [InlineData("5-", "not-a-number")]
    [InlineData("(5)", "not-a-number")]
    [InlineData("1..5", "not-a-number")]
    [InlineData("abc", "not-a-number")]
    [InlineData("#N/A", "not-a-number")]
    [InlineData("=1+1", "not-a-number")]
    [InlineData("- 5", "not-a-number")]
    public void Anything_else_is_refused_with_its_reason(string text, string code)
    {
        NumberReading reading = Parse(text, DecimalMark.Point, out ParsedDecimal value);

        Assert.Equal(code, NumberRefusal.Code(reading));
        Assert.Equal(default, value);
        Assert.Contains(": ", NumberRefusal.Explain(reading, Encoding.UTF8.GetBytes(text)) + " ", StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("1.5", "decimal-point")]
    [InlineData("1.234", "decimal-point")]
    [InlineData("1.234,5", "thousands-separator")]
    [InlineData("1,234.5", "thousands-separator")]
    [InlineData("1,2,3", "not-a-number")]
    public void With_decimal_commas_a_point_is_refused(string text, string code) =>
        Assert.Equal(code, NumberRefusal.Code(Parse(text, DecimalMark.Comma, out _)));

    [Fact]
    public void The_advice_for_a_foreign_mark_names_the_option()
    {
        Assert.Contains("--decimal comma", NumberRefusal.Explain(NumberReading.DecimalComma, "1,5"u8), StringComparison.Ordinal);
        Assert.Contains("--decimal point", NumberRefusal.Explain(NumberReading.DecimalPoint, "1.5"u8), StringComparison.Ordinal);
    }

    [Fact]
    public void Four_hundred_significant_digits_are_kept_and_one_more_is_refused()
    {
        string digits = new('7', 400);

        Assert.Equal(NumberReading.Number, Parse("0.000" + digits, DecimalMark.Point, out ParsedDecimal value));
        Assert.Equal(BigInteger.Parse(digits, CultureInfo.InvariantCulture), value.WideMantissa);
        Assert.Equal(403, value.Decimals);
        Assert.Equal(NumberReading.TooManyDigits, Parse("0.000" + digits + "7", DecimalMark.Point, out _));
    }

    [Fact]
    public void A_text_of_any_length_is_answered()
    {
        Assert.Equal(NumberReading.TooManyDigits, Parse(new string('9', 60_000), DecimalMark.Point, out _));
        Assert.Equal(NumberReading.NotANumber, Parse(new string('(', 60_000), DecimalMark.Point, out _));
        Assert.Equal(NumberReading.Number, Parse(new string('0', 60_000), DecimalMark.Point, out ParsedDecimal zero));
        Assert.Equal(0, zero.Mantissa);
        Assert.Equal(NumberReading.TooSmall, Parse("0." + new string('0', 60_000) + "1", DecimalMark.Point, out _));
    }

    [Fact]
    public void Bytes_that_are_no_text_are_refused_and_shown_without_control_characters()
    {
        byte[] bytes = [0x1B, (byte)'[', (byte)'2', (byte)'J', 0xFF];

        NumberReading reading = DecimalText.Parse(bytes, DecimalMark.Point, out _);

        Assert.Equal(NumberReading.NotANumber, reading);
        Assert.DoesNotContain('\x1B', NumberRefusal.Explain(reading, bytes));
    }

    internal static NumberReading Parse(string text, DecimalMark mark, out ParsedDecimal value) => DecimalText.Parse(Encoding.UTF8.GetBytes(text), mark, out value);
}
