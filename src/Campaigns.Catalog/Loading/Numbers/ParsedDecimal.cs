using System.Globalization;
using System.Numerics;

namespace Campaigns.Catalog.Loading;

/// <summary>A number exactly as it was typed: an integer mantissa and a count of decimals; the value is mantissa / 10^decimals.</summary>
/// <remarks>Trailing zeros are kept, so 1.5 and 1.50 are different as typed and equal as numbers.</remarks>
public readonly record struct ParsedDecimal
{
    private const long LargestExactInteger = 1L << 53;

    private static readonly double[] PowersOfTen =
    [
        1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11,
        1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22,
    ];

    private readonly long _mantissa;
    private readonly BigInteger _wide;

    /// <summary>Makes a number of at most 18 significant digits.</summary>
    /// <param name="mantissa">All its digits, with the sign.</param>
    /// <param name="decimals">How many of them are decimals; negative for trailing zeros that are not written out.</param>
    public ParsedDecimal(long mantissa, int decimals)
    {
        _mantissa = mantissa;
        Decimals = decimals;
    }

    internal ParsedDecimal(BigInteger wide, int decimals)
    {
        _wide = wide;
        Decimals = decimals;
    }

    /// <summary>How many digits of the mantissa are decimals; negative for numbers such as 1e300.</summary>
    public int Decimals { get; }

    /// <summary>Whether the mantissa has more than 18 significant digits, so that only <see cref="WideMantissa"/> holds it.</summary>
    public bool IsWide => !_wide.IsZero;

    /// <summary>The mantissa, with the sign; at most 18 digits.</summary>
    /// <exception cref="InvalidOperationException">The number is wide.</exception>
    public long Mantissa => IsWide ? throw new InvalidOperationException("This mantissa is wider than 18 digits.") : _mantissa;

    /// <summary>The mantissa of any width, with the sign.</summary>
    public BigInteger WideMantissa => IsWide ? _wide : _mantissa;

    /// <summary>The nearest double; ties go to the even one.</summary>
    /// <remarks>
    /// Below 2^53 and within 22 powers of ten both operands are exact doubles, and the one operation rounds once (Clinger 1990);
    /// all others take the runtime's correctly rounded conversion of the decimal text.
    /// </remarks>
    public double ToDouble()
    {
        if (!IsWide && Math.Abs(_mantissa) <= LargestExactInteger && Math.Abs(Decimals) <= 22)
        {
            return Decimals >= 0 ? _mantissa / PowersOfTen[Decimals] : _mantissa * PowersOfTen[-Decimals];
        }

        return double.Parse(ExponentForm().AsSpan(), NumberStyles.Float, CultureInfo.InvariantCulture);
    }

    /// <summary>The number in invariant form with all its digits: plain where it has decimals that fit, else mantissa and exponent.</summary>
    public override string ToString()
    {
        if (Decimals == 0)
        {
            return WideMantissa.ToString(CultureInfo.InvariantCulture);
        }

        if (Decimals is < 0 or > 40)
        {
            return ExponentForm();
        }

        string digits = BigInteger.Abs(WideMantissa).ToString(CultureInfo.InvariantCulture).PadLeft(Decimals + 1, '0');
        string sign = WideMantissa.Sign < 0 ? "-" : "";
        return $"{sign}{digits.AsSpan(0, digits.Length - Decimals)}.{digits.AsSpan(digits.Length - Decimals)}";
    }

    private string ExponentForm() => string.Create(CultureInfo.InvariantCulture, $"{WideMantissa}E{-(long)Decimals}");
}
