using System.Globalization;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Output;

/// <summary>Numbers as text, in the invariant culture: short ones for screens, exact ones for files.</summary>
public static class NumberText
{
    /// <summary>Below this a p-value is written in exponent form.</summary>
    public const double SmallP = 1e-4;

    // ln 10 as the sum of two doubles: the nearest one and the rest (Abramowitz and Stegun 1964, table 1.1: 2.302585092994045684017991454684...).
    private const double Ln10 = 2.302585092994046;
    private const double Ln10Rest = -2.1707562233822494e-16;

    /// <summary>A p-value for screens: four decimals, below 0.0001 two digits and an exponent, as in <c>3.2e-7</c>; never 0.</summary>
    /// <param name="p">The p-value.</param>
    /// <returns>At most 6 characters down to 0.0001, and below that as many as its exponent needs; below the range of doubles the digits come from the logarithm, and a p-value given as 0 is shown as below the smallest double.</returns>
    public static string P(PValue p)
    {
        if (p.Value >= SmallP)
        {
            return p.Value.ToString("0.0000", CultureInfo.InvariantCulture);
        }

        return p.Value > 0 ? Exponent(p.Value, 2)
            : double.IsNegativeInfinity(p.Log) ? "<4.9e-324"
            : FromLog(p.Log, 2, 'e');
    }

    /// <summary>A number for screens.</summary>
    /// <param name="value">A finite number; positive infinity is written as beyond the range of doubles.</param>
    /// <param name="significantDigits">Digits that carry meaning, 1 to 17; the whole part is never shortened below them.</param>
    /// <returns>Plain decimals from 0.001 up to a million, an exponent outside.</returns>
    /// <exception cref="ArgumentOutOfRangeException">NaN, or a number of digits outside 1 to 17.</exception>
    public static string Screen(double value, int significantDigits)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(significantDigits, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(significantDigits, 17);
        if (double.IsNaN(value))
        {
            throw new ArgumentOutOfRangeException(nameof(value), "Not a number has no text.");
        }

        if (double.IsInfinity(value))
        {
            return value > 0 ? ">1.8e308" : "<-1.8e308";
        }

        double size = Math.Abs(value);
        if (size == 0)
        {
            return "0";
        }

        if (size is < 1e-3 or >= 1e6)
        {
            return Exponent(value, significantDigits);
        }

        int decimals = Math.Max(0, significantDigits - 1 - (int)Math.Floor(Math.Log10(size)));
        return Decimals(value, decimals);
    }

    /// <summary>The shortest text that reads back as the same double.</summary>
    /// <param name="value">A finite number.</param>
    /// <exception cref="ArgumentOutOfRangeException">Not finite.</exception>
    public static string RoundTrip(double value) =>
        double.IsFinite(value) ? value.ToString("R", CultureInfo.InvariantCulture) : throw new ArgumentOutOfRangeException(nameof(value), "Only finite numbers are written to files.");

    /// <summary>The shortest text that reads back as the same p-value; below the range of doubles decimal text from the logarithm, with as many digits as it carries.</summary>
    /// <param name="p">The p-value.</param>
    /// <returns><c>0</c> only where 0 itself was given.</returns>
    public static string RoundTrip(PValue p)
    {
        if (!p.IsBelowDoubleRange)
        {
            return RoundTrip(p.Value);
        }

        // An absolute error of half a unit in the last place of ln p is the same relative error of p.
        double halfUnit = (Math.BitIncrement(-p.Log) + p.Log) / 2;
        return FromLog(p.Log, Math.Clamp((int)Math.Floor(-Math.Log10(halfUnit)), 1, 17), 'E');
    }

    /// <summary>Rounds the decimal number that stands for the double, halves away from zero, as people round what they read: 172.5 becomes 173, and 0.125 becomes 0.13.</summary>
    private static string Decimals(double value, int decimals) =>
        Math.Round(decimal.Parse(RoundTrip(value), NumberStyles.Float, CultureInfo.InvariantCulture), decimals, MidpointRounding.AwayFromZero)
            .ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);

    private static string Exponent(double value, int digits) =>
        value.ToString("0" + (digits > 1 ? "." + new string('0', digits - 1) : "") + "e-0", CultureInfo.InvariantCulture);

    private static string FromLog(double log, int digits, char mark)
    {
        double power = Math.Floor(log / Ln10);
        double rest = Math.FusedMultiplyAdd(-power, Ln10, log) - power * Ln10Rest;
        if (rest < 0)
        {
            power--;
            rest += Ln10;
        }

        string lead = Math.Exp(rest).ToString("F" + (digits - 1).ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
        if (lead.StartsWith("10", StringComparison.Ordinal))
        {
            lead = lead[..1] + (digits > 1 ? "." + new string('0', digits - 1) : "");
            power++;
        }

        return lead + mark + power.ToString("F0", CultureInfo.InvariantCulture);
    }
}
