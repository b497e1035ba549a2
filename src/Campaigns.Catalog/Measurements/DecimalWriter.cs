using System.Globalization;
using System.Numerics;

namespace Campaigns.Catalog.Measurements;

/// <summary>Writes exact decimals.</summary>
internal static class DecimalWriter
{
    /// <summary>mantissa times 10 to the power of minus decimals in plain decimal form, or with an exponent where that would need many zeros.</summary>
    public static string Write(BigInteger mantissa, int decimals)
    {
        string digits = BigInteger.Abs(mantissa).ToString(CultureInfo.InvariantCulture);
        string sign = mantissa.Sign < 0 ? "-" : "";
        if (decimals == 0)
        {
            return sign + digits;
        }

        if (decimals < 0 || decimals > digits.Length + 20)
        {
            return FormattableString.Invariant($"{sign}{digits}e{-decimals}");
        }

        digits = digits.PadLeft(decimals + 1, '0');
        return $"{sign}{digits[..^decimals]}.{digits[^decimals..]}";
    }

    /// <summary>The double nearest to mantissa times 10 to the power of minus decimals, correctly rounded.</summary>
    public static double NearestDouble(BigInteger mantissa, int decimals)
    {
#pragma warning disable RS0030 // The text is this program's own, in the one form that the parser reads exactly.
        return double.Parse(FormattableString.Invariant($"{mantissa}e{-decimals}"), CultureInfo.InvariantCulture);
#pragma warning restore RS0030
    }
}
