using System.Numerics;
using System.Runtime.CompilerServices;

namespace Campaigns.Statistics.Numerics;

/// <summary>A <see cref="DoubleDouble"/> times a power of two: about 32 significant digits and no practical limit of size.</summary>
/// <remarks>
/// Squares of typed decimals may lie far outside the range of doubles while their ratio, the statistic, does not.
/// The fraction is kept within 2^-200 and 2^200, so that a product or a quotient of two fractions cannot leave the range of doubles; ordinary numbers never need the exponent, which then costs a comparison.
/// Results are rounded once, by <see cref="ToDouble"/>: correctly, except where the exact number lies within about 2^-47 of a unit of the middle between two doubles.
/// </remarks>
public readonly struct WideReal
{
    private const int ComfortableBits = 200;
    private const double Small = 6.223015277861142e-61;
    private const double Large = 1.6069380442589903e60;
    private const int TabledPowers = 64;

    private static readonly WideReal[] PowersOfFive = TablePowersOfFive();
    private static readonly WideReal[] InversePowersOfFive = [.. PowersOfFive.Select(p => From(1.0) / p)];

    private readonly DoubleDouble _fraction;
    private readonly long _exponent;

    private WideReal(DoubleDouble fraction, long exponent)
    {
        double size = Math.Abs(fraction.High);
        if (size is > Small and < Large)
        {
            _fraction = fraction;
            _exponent = exponent;
        }
        else if (size != 0)
        {
            int shift = Math.ILogB(size);
            _fraction = DoubleDouble.ScaleB(fraction, -shift);
            _exponent = exponent + shift;
        }
    }

    /// <summary>Zero.</summary>
    public static WideReal Zero => default;

    /// <summary>The number without its sign; exact.</summary>
    public WideReal Size => Sign < 0 ? -this : this;

    /// <summary>-1, 0 or 1.</summary>
    public int Sign => Math.Sign(_fraction.High);

    /// <summary>A double as it stands.</summary>
    /// <param name="value">Finite.</param>
    public static WideReal From(double value) => new(DoubleDouble.From(value), 0);

    /// <summary>A double-double as it stands.</summary>
    /// <param name="value">Finite.</param>
    public static WideReal From(DoubleDouble value) => new(value, 0);

    /// <summary>An integer: exact up to 106 bits, else rounded to about that many.</summary>
    /// <param name="value">Any.</param>
    public static WideReal From(Int128 value) => new(DoubleDouble.From(value), 0);

    /// <inheritdoc cref="From(Int128)"/>
    public static WideReal From(UInt128 value) => new(DoubleDouble.From(value), 0);

    /// <inheritdoc cref="From(Int128)"/>
    /// <remarks>Gives the same bits as the other overload wherever that one could hold the integer.</remarks>
    public static WideReal From(BigInteger value)
    {
        const int Kept = 127;
        long excess = (long)BigInteger.Abs(value).GetBitLength() - Kept;
        return excess <= 0
            ? From((Int128)value)
            : new(DoubleDouble.From((Int128)(value >> (int)excess)), excess);
    }

    /// <summary>A power of ten.</summary>
    /// <param name="power">Positive, negative or zero.</param>
    /// <returns>Right to about 2^-102, for powers beyond 64 to about |power| times 2^-104.</returns>
    public static WideReal PowerOfTen(long power)
    {
        WideReal five =
            power >= 0 ? PowerOfFive(power)
            : power >= -TabledPowers ? InversePowersOfFive[-power]
            : From(1.0) / PowerOfFive(-power);
        return new(five._fraction, five._exponent + power);
    }

    /// <summary>A power of two; exact.</summary>
    /// <param name="power">Positive, negative or zero.</param>
    public static WideReal PowerOfTwo(long power) => new(DoubleDouble.From(1.0), power);

    /// <summary>The negated number; exact.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static WideReal operator -(WideReal value) => new(-value._fraction, value._exponent);

    /// <summary>The sum.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static WideReal operator +(WideReal left, WideReal right)
    {
        if (left._exponent == right._exponent)
        {
            return new(left._fraction + right._fraction, left._exponent);
        }

        if (left.Sign == 0 || right.Sign == 0)
        {
            return left.Sign == 0 ? right : left;
        }

        return left.Magnitude() >= right.Magnitude() ? AddSmaller(left, right) : AddSmaller(right, left);
    }

    /// <summary>The difference.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static WideReal operator -(WideReal left, WideReal right) => left + -right;

    /// <summary>The product.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static WideReal operator *(WideReal left, WideReal right) =>
        new(left._fraction * right._fraction, left._exponent + right._exponent);

    /// <summary>The quotient.</summary>
    /// <exception cref="DivideByZeroException">The divisor is zero.</exception>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static WideReal operator /(WideReal left, WideReal right) =>
        right.Sign == 0
            ? throw new DivideByZeroException()
            : new(left._fraction / right._fraction, left._exponent - right._exponent);

    /// <summary>The quotient by a double.</summary>
    /// <exception cref="DivideByZeroException">The divisor is zero.</exception>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static WideReal operator /(WideReal left, double right) =>
        right == 0 ? throw new DivideByZeroException() : new(left._fraction / right, left._exponent);

    /// <summary>Adds up in ascending order, so that the sum has the same bits in whatever order the terms come.</summary>
    /// <param name="terms">Any; sorted afterwards.</param>
    public static WideReal SumSorted(Span<WideReal> terms)
    {
        terms.Sort(Compare);
        WideReal sum = Zero;
        foreach (WideReal term in terms)
        {
            sum += term;
        }

        return sum;
    }

    /// <summary>The square root.</summary>
    /// <param name="value">Not negative.</param>
    /// <exception cref="ArgumentOutOfRangeException">Negative.</exception>
    public static WideReal Sqrt(WideReal value)
    {
        if (value.Sign < 0)
        {
            throw new ArgumentOutOfRangeException(nameof(value), "A square root needs a number that is not negative.");
        }

        bool odd = (value._exponent & 1) != 0;
        DoubleDouble even = odd ? DoubleDouble.ScaleB(value._fraction, 1) : value._fraction;
        return new(DoubleDouble.Sqrt(even), (value._exponent - (odd ? 1 : 0)) / 2);
    }

    /// <summary>The number rounded to the nearest double; an infinity where it lies beyond their range, zero or a subnormal number below it.</summary>
    public double ToDouble() =>
        _exponent == 0 ? _fraction.High : Math.ScaleB(_fraction.High, (int)Math.Clamp(_exponent, -4000, 4000));

    /// <summary>The natural logarithm, to double accuracy.</summary>
    /// <returns>Negative infinity at zero, NaN for a negative number.</returns>
    public double Log() => Math.Log(_fraction.High) + (_exponent * 0.693147180559945309417232121458);

    /// <summary>A whole number next to this one: right to 53 bits, and the nearest one where they suffice for that.</summary>
    internal BigInteger ToWhole()
    {
        if (Sign == 0)
        {
            return BigInteger.Zero;
        }

        const int FractionBits = 52;
        int shift = Math.ILogB(_fraction.High) - FractionBits;
        long digits = (long)Math.ScaleB(_fraction.High, -shift);
        long power = _exponent + shift;
        return power >= 0 ? (BigInteger)digits << (int)power
            : power < -FractionBits - 2 ? BigInteger.Zero
            : (digits + (1L << (int)(-power - 1))) >> (int)-power;
    }

    private static int Compare(WideReal left, WideReal right)
    {
        if (left._exponent != right._exponent)
        {
            return (left - right).Sign;
        }

        int high = left._fraction.High.CompareTo(right._fraction.High);
        return high != 0 ? high : left._fraction.Low.CompareTo(right._fraction.Low);
    }

    private static WideReal AddSmaller(WideReal larger, WideReal smaller)
    {
        // Beyond 2^-400 of the larger the smaller cannot touch a bit of the sum.
        long gap = smaller._exponent - larger._exponent;
        return Math.Abs(gap) > 4 * ComfortableBits
            ? larger
            : new(larger._fraction + DoubleDouble.ScaleB(smaller._fraction, (int)gap), larger._exponent);
    }

    private static WideReal PowerOfFive(long power)
    {
        if (power < PowersOfFive.Length)
        {
            return PowersOfFive[power];
        }

        WideReal root = PowerOfFive(power / 2);
        WideReal square = root * root;
        return power % 2 == 0 ? square : square * From(5.0);
    }

    private static WideReal[] TablePowersOfFive()
    {
        var powers = new WideReal[TabledPowers + 1];
        BigInteger power = BigInteger.One;
        for (int i = 0; i < powers.Length; i++)
        {
            powers[i] = From(power);
            power *= 5;
        }

        return powers;
    }

    private long Magnitude() => _exponent + Math.ILogB(_fraction.High);
}
