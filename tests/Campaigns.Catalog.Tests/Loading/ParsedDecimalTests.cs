using System.Globalization;
using System.Numerics;
using System.Text;
using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Tests.Loading;

/// <summary>Random texts of numbers against exact fractions, made from the text by another way than the product's: whole digits by BigInteger.Parse.</summary>
public sealed class ParsedDecimalTests
{
    private const int Texts = 20_000;

    [Fact]
    public void The_value_is_the_exact_fraction_that_the_text_says()
    {
        Random random = new(20250101);
        for (int i = 0; i < Texts; i++)
        {
            (string text, BigInteger numerator, BigInteger denominator) = RandomNumber(random, random.Next(1, 60), 100);

            Assert.Equal(NumberReading.Number, DecimalTextTests.Parse(text, DecimalMark.Point, out ParsedDecimal value));
            (BigInteger top, BigInteger bottom) = Fraction(value.WideMantissa, value.Decimals);
            Assert.True(top * denominator == numerator * bottom, text);
        }
    }

    [Fact]
    public void The_double_is_the_one_that_the_runtime_reads_from_the_text()
    {
        Random random = new(20250102);
        for (int i = 0; i < Texts; i++)
        {
            (string text, _, _) = RandomNumber(random, random.Next(1, 60), 240);

            Assert.Equal(NumberReading.Number, DecimalTextTests.Parse(text, DecimalMark.Point, out ParsedDecimal value));
            Assert.True(double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture) == value.ToDouble(), text);
        }
    }

    [Fact]
    public void No_other_double_is_nearer_to_the_fraction()
    {
        Random random = new(20250103);
        for (int i = 0; i < 5_000; i++)
        {
            (string text, BigInteger numerator, BigInteger denominator) = RandomNumber(random, random.Next(1, 24), 30);
            DecimalTextTests.Parse(text, DecimalMark.Point, out ParsedDecimal value);
            double nearest = value.ToDouble();

            BigInteger Distance(double candidate)
            {
                (BigInteger top, BigInteger bottom) = ExactFraction(candidate);
                return BigInteger.Abs((top * denominator) - (numerator * bottom)) * (BigInteger.One << 1200) / bottom;
            }

            Assert.True(Distance(nearest) <= Distance(double.BitIncrement(nearest)) && Distance(nearest) <= Distance(double.BitDecrement(nearest)), text);
        }
    }

    [Theory]
    [InlineData("9007199254740993", 9007199254740992)]
    [InlineData("9007199254740993.0000000000000000000000000000001", 9007199254740994)]
    [InlineData("0.1", 0.1)]
    [InlineData("1e22", 1e22)]
    [InlineData("1e23", 1e23)]
    [InlineData("-2.5e-300", -2.5e-300)]
    public void The_double_is_rounded_once(string text, double expected)
    {
        DecimalTextTests.Parse(text, DecimalMark.Point, out ParsedDecimal value);
        Assert.Equal(expected, value.ToDouble());
    }

    [Fact]
    public void A_wide_mantissa_is_not_given_as_a_narrow_one()
    {
        DecimalTextTests.Parse("1234567890123456789", DecimalMark.Point, out ParsedDecimal value);

        Assert.True(value.IsWide);
        Assert.Throws<InvalidOperationException>(() => value.Mantissa);
    }

    private static (string Text, BigInteger Numerator, BigInteger Denominator) RandomNumber(Random random, int digits, int largestExponent)
    {
        int whole = random.Next(0, digits + 1);
        StringBuilder all = new();
        for (int i = 0; i < digits; i++)
        {
            all.Append((char)('0' + random.Next(10)));
        }

        string sign = random.Next(3) switch { 0 => "-", 1 => "+", _ => "" };
        int? exponent = random.Next(2) == 0 ? random.Next(-largestExponent, largestExponent + 1) : null;
        string text = sign + all.ToString(0, whole) + (whole < digits || random.Next(5) == 0 ? "." : "") + all.ToString(whole, digits - whole)
            + (exponent is int e ? FormattableString.Invariant($"{(random.Next(2) == 0 ? 'e' : 'E')}{e}") : "");
        BigInteger mantissa = BigInteger.Parse(all.ToString(), CultureInfo.InvariantCulture) * (sign == "-" ? -1 : 1);
        (BigInteger numerator, BigInteger denominator) = Fraction(mantissa, digits - whole - (exponent ?? 0));
        return (text, numerator, denominator);
    }

    private static (BigInteger Numerator, BigInteger Denominator) Fraction(BigInteger mantissa, int decimals) =>
        decimals >= 0 ? (mantissa, BigInteger.Pow(10, decimals)) : (mantissa * BigInteger.Pow(10, -decimals), BigInteger.One);

    private static (BigInteger Numerator, BigInteger Denominator) ExactFraction(double value)
    {
        long bits = BitConverter.DoubleToInt64Bits(value);
        int exponent = (int)((bits >> 52) & 0x7FF);
        BigInteger fraction = (bits & ((1L << 52) - 1)) | (exponent == 0 ? 0 : 1L << 52);
        int shift = Math.Max(exponent, 1) - 1075;
        fraction = value < 0 ? -fraction : fraction;
        return shift >= 0 ? (fraction << shift, BigInteger.One) : (fraction, BigInteger.One << -shift);
    }
}
