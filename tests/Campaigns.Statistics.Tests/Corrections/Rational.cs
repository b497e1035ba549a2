using System.Numerics;

namespace Campaigns.Statistics.Tests.Corrections;

/// <summary>An exact fraction for oracles: what a double stands for, without rounding, and the correctly rounded way back.</summary>
internal readonly struct Rational(BigInteger numerator, BigInteger denominator) : IComparable<Rational>
{
    private readonly BigInteger _numerator = numerator;
    private readonly BigInteger _denominator = denominator;

    public static Rational One { get; } = new(1, 1);

    public static Rational Of(double value)
    {
        long bits = BitConverter.DoubleToInt64Bits(value);
        int exponent = (int)((bits >> 52) & 0x7FF);
        long mantissa = bits & 0xFFFFFFFFFFFFF;
        mantissa = exponent == 0 ? mantissa : mantissa | (1L << 52);
        int power = Math.Max(exponent, 1) - 1075;
        return power >= 0 ? new Rational((BigInteger)mantissa << power, 1) : new Rational(mantissa, BigInteger.One << -power);
    }

    public static Rational operator +(Rational a, Rational b)
    {
        BigInteger numerator = (a._numerator * b._denominator) + (b._numerator * a._denominator);
        BigInteger denominator = a._denominator * b._denominator;
        var common = BigInteger.GreatestCommonDivisor(numerator, denominator);
        return new Rational(numerator / common, denominator / common);
    }

    public static Rational operator *(Rational a, Rational b) => new(a._numerator * b._numerator, a._denominator * b._denominator);

    public static Rational operator *(int a, Rational b) => new(a * b._numerator, b._denominator);

    public static Rational operator /(Rational a, int b) => new(a._numerator, a._denominator * b);

    public Rational Complement() => new(_denominator - _numerator, _denominator);

    public Rational Power(int exponent) => new(BigInteger.Pow(_numerator, exponent), BigInteger.Pow(_denominator, exponent));

    public static Rational Min(Rational a, Rational b) => a.CompareTo(b) <= 0 ? a : b;

    public static Rational Max(Rational a, Rational b) => a.CompareTo(b) >= 0 ? a : b;

    public int CompareTo(Rational other) => (_numerator * other._denominator).CompareTo(other._numerator * _denominator);

    /// <summary>The nearest double, ties to even, subnormal numbers included; for numbers from 0 up.</summary>
    public double Round()
    {
        if (_numerator.IsZero)
        {
            return 0;
        }

        // A quotient of 55 bits or more, but no finer than the smallest double over 4.
        long shift = 56 - (_numerator.GetBitLength() - _denominator.GetBitLength());
        BigInteger quotient = Shifted(shift);
        int drop = (int)Math.Max(quotient.GetBitLength() - 53, shift - 1074);
        BigInteger kept = quotient >> drop;
        BigInteger lost = quotient - (kept << drop);
        BigInteger half = BigInteger.One << (drop - 1);
        bool exact = Remainder(shift).IsZero;
        int side = lost.CompareTo(half);
        bool up = side > 0 || (side == 0 && (!exact || !kept.IsEven));
        return Math.ScaleB((double)(kept + (up ? 1 : 0)), (int)(drop - shift));
    }

    private BigInteger Shifted(long shift) =>
        shift >= 0 ? (_numerator << (int)shift) / _denominator : _numerator / (_denominator << (int)-shift);

    private BigInteger Remainder(long shift) =>
        shift >= 0 ? (_numerator << (int)shift) % _denominator : _numerator % (_denominator << (int)-shift);
}
