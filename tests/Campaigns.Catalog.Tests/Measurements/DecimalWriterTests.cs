using System.Numerics;
using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Tests.Measurements;

public sealed class DecimalWriterTests
{
    [Theory]
    [InlineData("0", 0, "0")]
    [InlineData("-5", 0, "-5")]
    [InlineData("150", 2, "1.50")]
    [InlineData("-7", 3, "-0.007")]
    [InlineData("0", 2, "0.00")]
    [InlineData("5", -3, "5e3")]
    [InlineData("-12", -300, "-12e300")]
    [InlineData("1", 300, "1e-300")]
    [InlineData("123456789012345678901234567890", 10, "12345678901234567890.1234567890")]
    public void Decimals_are_written_in_full_where_that_needs_few_zeros(string mantissa, int decimals, string text) =>
        Assert.Equal(text, DecimalWriter.Write(BigInteger.Parse(mantissa, System.Globalization.CultureInfo.InvariantCulture), decimals));

    [Fact]
    public void What_is_written_reads_back_as_the_same_number()
    {
        var random = new Random(20261201);
        for (int i = 0; i < 5000; i++)
        {
            (BigInteger mantissa, int decimals) = Draw(random);
            string text = DecimalWriter.Write(mantissa, decimals);
            Assert.Equal(NumberReading.Number, DecimalText.Parse(Encoding.UTF8.GetBytes(text), DecimalMark.Point, out ParsedDecimal read));
            int shared = Math.Max(decimals, read.Decimals);
            Assert.Equal(mantissa * BigInteger.Pow(10, shared - decimals), read.WideMantissa * BigInteger.Pow(10, shared - read.Decimals));
        }
    }

    [Fact]
    public void The_nearest_double_is_nearer_than_its_neighbours()
    {
        var random = new Random(20261202);
        for (int i = 0; i < 5000; i++)
        {
            (BigInteger mantissa, int decimals) = Draw(random);
            double nearest = DecimalWriter.NearestDouble(mantissa, decimals);
            BigInteger distance = Distance(mantissa, decimals, nearest);
            Assert.True(distance <= Distance(mantissa, decimals, Math.BitIncrement(nearest)));
            Assert.True(distance <= Distance(mantissa, decimals, Math.BitDecrement(nearest)));
        }
    }

    private static (BigInteger Mantissa, int Decimals) Draw(Random random)
    {
        BigInteger mantissa = random.NextInt64(long.MinValue / 4, long.MaxValue / 4) >> random.Next(62);
        if (random.Next(3) == 0)
        {
            mantissa *= BigInteger.Pow(10, random.Next(20)) + 1;
        }

        return (mantissa, random.Next(-200, 280));
    }

    /// <summary>Distance of a decimal from a double, in units of 2^-1074 / 10^decimals: exact.</summary>
    private static BigInteger Distance(BigInteger mantissa, int decimals, double x)
    {
        long bits = BitConverter.DoubleToInt64Bits(Math.Abs(x));
        int exponent = (int)(bits >> 52);
        BigInteger size = bits & 0xfffffffffffff;
        size = exponent == 0 ? size : (size + (1L << 52)) << (exponent - 1);
        size = x < 0 ? -size : size;
        return BigInteger.Abs((mantissa * BigInteger.Pow(10, Math.Max(-decimals, 0)) << 1074) - (size * BigInteger.Pow(10, Math.Max(decimals, 0))));
    }
}
