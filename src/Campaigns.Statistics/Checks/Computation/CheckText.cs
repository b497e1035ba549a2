using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>Figures and values inside the sentences of checks, in the invariant culture.</summary>
internal static class CheckText
{
    private const int LongestTyped = 20;

    /// <summary>Three significant digits; an exponent below 0.001 and from a million on.</summary>
    public static string Figure(double value)
    {
        double size = Math.Abs(value);
        if (size == 0)
        {
            return "0";
        }

        if (double.IsInfinity(value))
        {
            return value > 0 ? "more than 1.8e308" : "less than -1.8e308";
        }

        if (size is < 1e-3 or >= 1e6)
        {
            return value.ToString("0.00e-0", CultureInfo.InvariantCulture);
        }

        int decimals = Math.Max(0, 2 - (int)Math.Floor(Math.Log10(size)));
        return value.ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
    }

    /// <summary>"p = 0.0123": three significant digits, in exponent form below 0.0001, from the logarithm below the range of doubles; never 0.</summary>
    public static string P(PValue p) => "p = " + (
        p.Value == 1 ? "1"
        : p.Value >= 1e-3 ? Figure(p.Value)
        : p.Value >= 1e-4 ? p.Value.ToString("0.000000", CultureInfo.InvariantCulture)
        : p.Log > -700 ? p.Value.ToString("0.00e-0", CultureInfo.InvariantCulture)
        : FarP(p.Log));

    /// <summary>A value as it was typed, zeros at the end of its decimals left out; a mean of readings, or a value of very many digits, as a double.</summary>
    public static string ValueOf(GroupedSample sample, int i)
    {
        double rounded = (WideReal.From(sample.MantissaOf(i)) * sample.Unit).ToDouble();
        if (!sample.Divisor.IsOne)
        {
            return double.IsFinite(rounded) ? rounded.ToString("G10", CultureInfo.InvariantCulture) : Figure(rounded);
        }

        return TypedText(sample.MantissaOf(i), sample.Decimals)
            ?? (double.IsFinite(rounded) ? rounded.ToString("R", CultureInfo.InvariantCulture) : Figure(rounded));
    }

    /// <summary>"1 value", "2 values".</summary>
    public static string Count(long n, string one, string several) =>
        n.ToString(CultureInfo.InvariantCulture) + " " + (n == 1 ? one : several);

    private static string? TypedText(BigInteger mantissa, int decimals)
    {
        if (Math.Abs((long)decimals) > LongestTyped)
        {
            return null;
        }

        string digits = BigInteger.Abs(mantissa).ToString(CultureInfo.InvariantCulture);
        if (decimals <= 0)
        {
            digits = mantissa.IsZero ? digits : digits + new string('0', -decimals);
        }
        else
        {
            digits = digits.PadLeft(decimals + 1, '0');
            digits = (digits[..^decimals] + "." + digits[^decimals..]).TrimEnd('0').TrimEnd('.');
        }

        return digits.Length > LongestTyped ? null : mantissa.Sign < 0 ? "-" + digits : digits;
    }

    private static string FarP(double log)
    {
        double tens = log / Math.Log(10);
        double power = Math.Floor(tens);
        double lead = Math.Min(9.99, Math.Pow(10, tens - power));
        return lead.ToString("0.00", CultureInfo.InvariantCulture) + "e" + power.ToString("F0", CultureInfo.InvariantCulture);
    }
}
