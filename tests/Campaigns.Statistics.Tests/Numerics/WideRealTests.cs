using System.Numerics;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Tests.GroupTests;
using FsCheck.Xunit;

namespace Campaigns.Statistics.Tests.Numerics;

/// <summary>Against exact fractions of integers.</summary>
[Properties(Replay = "(20261202,7919)", MaxTest = 500)]
public sealed class WideRealTests
{
    [Property]
    public void A_result_is_the_exact_fraction_rounded_once(int seed)
    {
        var random = new Random(seed);
        BigInteger a = Integer(random);
        BigInteger b = Integer(random);
        BigInteger c = Integer(random);
        WideReal x = WideReal.From(a);
        WideReal y = WideReal.From(b);
        WideReal z = WideReal.From(c);
        Assert.Equal(Rounded(a, b), (x / y).ToDouble());
        Assert.Equal(Rounded(a * b, c * c), (x * y / (z * z)).ToDouble());
        Assert.Equal(Rounded((a * c) + (b * b), b * c), ((x / y) + (y / z)).ToDouble());
        Assert.Equal(Rounded((a * c) - (b * b), b * c), ((x / y) - (y / z)).ToDouble());
        Assert.Equal(Rounded(a, c * 7), (x / z / 7).ToDouble());
    }

    [Property]
    public void An_integer_is_rounded_to_the_nearest_double(int seed)
    {
        BigInteger value = Integer(new Random(seed));
        Assert.Equal(Rounded(value, 1), WideReal.From(value).ToDouble());
        if (BigInteger.Abs(value) < (BigInteger.One << 120))
        {
            Assert.Equal(Rounded(value, 1), DoubleDouble.From((Int128)value).High);
        }
    }

    [Property]
    public void An_integer_of_106_bits_is_kept_exactly(int seed)
    {
        var random = new Random(seed);
        Int128 value = ((Int128)random.NextInt64(1L << 53) << 53) | (Int128)random.NextInt64(1L << 53);
        DoubleDouble both = DoubleDouble.From(value);
        Assert.Equal((BigInteger)value, new BigInteger(both.High) + new BigInteger(both.Low));
        Assert.True(Math.Abs(both.Low) <= Math.BitIncrement(both.High) - both.High);
    }

    [Property]
    public void The_square_of_a_root_is_the_number_to_30_digits(int seed)
    {
        BigInteger value = BigInteger.Abs(Integer(new Random(seed)));
        WideReal root = WideReal.Sqrt(WideReal.From(value));
        WideReal rest = ((root * root) - WideReal.From(value)) / WideReal.From(value);
        Assert.True(Math.Abs(rest.ToDouble()) < 1e-30);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(22)]
    [InlineData(-1)]
    [InlineData(-17)]
    [InlineData(63)]
    [InlineData(-64)]
    [InlineData(65)]
    [InlineData(-65)]
    [InlineData(300)]
    [InlineData(-300)]
    [InlineData(-320)]
    public void A_power_of_ten_is_the_nearest_double(int power) =>
        Assert.Equal(double.Parse($"1e{power}", System.Globalization.CultureInfo.InvariantCulture), WideReal.PowerOfTen(power).ToDouble());

    [Fact]
    public void Numbers_far_outside_the_doubles_keep_their_ratio()
    {
        WideReal huge = WideReal.PowerOfTen(5000);
        Assert.Equal(double.PositiveInfinity, huge.ToDouble());
        Assert.Equal(0, (WideReal.From(1.0) / huge).ToDouble());
        Assert.Equal(3, (huge * WideReal.From(3.0) / huge).ToDouble());
        Assert.Equal(1e-10, (huge / WideReal.PowerOfTen(5010)).ToDouble());
        Assert.Equal(1e200, WideReal.Sqrt(huge / WideReal.PowerOfTen(4600)).ToDouble());
        Assert.Equal(5000 * Math.Log(10), huge.Log(), 1e-11);
        Assert.Equal(1, (huge + WideReal.From(1.0) - huge).Sign + 1);
        Assert.Equal(2e300, (WideReal.PowerOfTen(300) + WideReal.PowerOfTen(300)).ToDouble());
    }

    [Fact]
    public void What_has_no_value_is_refused()
    {
        Assert.Throws<DivideByZeroException>(() => WideReal.From(1.0) / WideReal.Zero);
        Assert.Throws<DivideByZeroException>(() => WideReal.From(1.0) / 0.0);
        Assert.Throws<ArgumentOutOfRangeException>(() => WideReal.Sqrt(WideReal.From(-1.0)));
        Assert.Equal(0, WideReal.Sqrt(WideReal.Zero).Sign);
    }

    /// <summary>An integer of 1 to 490 bits, either sign, not zero.</summary>
    private static BigInteger Integer(Random random)
    {
        byte[] bytes = new byte[random.Next(1, random.Next(2, 63))];
        random.NextBytes(bytes);
        var value = new BigInteger(bytes);
        return value.IsZero ? 1 : value;
    }

    /// <summary>The double nearest to a fraction, found by comparing the exact distances of a guess and its neighbours; ties to even.</summary>
    private static double Rounded(BigInteger above, BigInteger below)
    {
        if (below.Sign < 0)
        {
            return Rounded(-above, -below);
        }

        int shift = (int)Math.Max(0, 120 - (long)(BigInteger.Abs(above).GetBitLength() - below.GetBitLength()));
        BigInteger scaled = (above << shift) / below;
        int excess = (int)Math.Max(0, (long)BigInteger.Abs(scaled).GetBitLength() - 1000);
        double guess = Math.ScaleB((double)(scaled >> excess), excess - shift);
        double best = guess;
        foreach (double candidate in new[] { Math.BitDecrement(guess), Math.BitIncrement(guess) })
        {
            int closer = Distance(candidate, above, below).CompareTo(Distance(best, above, below));
            bool even = (BitConverter.DoubleToInt64Bits(candidate) & 1) == 0;
            best = closer < 0 || (closer == 0 && even) ? candidate : best;
        }

        return best;
    }

    /// <summary>|value - above/below| times below times 10^1100.</summary>
    private static BigInteger Distance(double value, BigInteger above, BigInteger below)
    {
        if (double.IsInfinity(value))
        {
            return BigInteger.Pow(10, 4000);
        }

        (BigInteger mantissa, int exponent) = TypedSample.ExactDecimal(value);
        BigInteger scaled = mantissa * BigInteger.Pow(10, 1100 + exponent);
        return BigInteger.Abs((scaled * below) - (above * BigInteger.Pow(10, 1100)));
    }
}
