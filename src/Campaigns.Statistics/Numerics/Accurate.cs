namespace Campaigns.Statistics.Numerics;

/// <summary>Elementary functions that keep their relative accuracy where the textbook form cancels.</summary>
/// <remarks>.NET's own <c>double.LogP1</c> and <c>double.ExpM1</c> compute ln(1 + x) and e^x - 1 as written and lose every digit near zero; they are banned in this project.</remarks>
public static class Accurate
{
    private const double Ln2 = 0.693147180559945309417232121458;

    /// <summary>ln(1 + x) to within two units in the last place for every x above -1.</summary>
    /// <param name="x">Any number.</param>
    /// <returns>Negative infinity at -1, NaN below it, positive infinity at positive infinity; the sign of a zero is kept.</returns>
    /// <remarks>1 + x is rounded to u; what the rounding dropped is c, known exactly, and ln(u + c) = ln u + c/u to first order, c/u being at most half a unit in the last place of one.</remarks>
    public static double Log1p(double x)
    {
        double u = 1 + x;
        if (u == 1)
        {
            return x;
        }

        if (u <= 0 || double.IsPositiveInfinity(u))
        {
            return Math.Log(u);
        }

        double c = x >= 1 ? 1 - (u - x) : x - (u - 1);
        return Math.Log(u) + (c / u);
    }

    /// <summary>e^x - 1 to within two units in the last place for every x.</summary>
    /// <param name="x">Any number.</param>
    /// <returns>-1 at negative infinity; positive infinity where e^x exceeds the range of doubles; the sign of a zero is kept.</returns>
    /// <remarks>Up to 0.35 the power series, even and odd terms summed apart; beyond, the subtraction costs little more than one unit in the last place.</remarks>
    public static double Expm1(double x)
    {
        if (!(Math.Abs(x) < 0.35))
        {
            return Math.Exp(x) - 1;
        }

        if (x == 0)
        {
            return x;
        }

        double q = x * x;
        double even = 1.0 / 87178291200;
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 479001600);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 3628800);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 40320);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 720);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 24);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 2);
        double odd = 1.0 / 6227020800;
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 39916800);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 362880);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 5040);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 120);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 6);
        return x + (q * Math.FusedMultiplyAdd(odd, x, even));
    }

    /// <summary>ln(1 - e^l): from the logarithm of a probability, the logarithm of its complement.</summary>
    /// <param name="l">At most 0.</param>
    /// <returns>At most 0; negative infinity at 0, 0 at negative infinity; NaN for a positive argument.</returns>
    /// <remarks>The change of branch at -ln 2 keeps the relative error at a few units in the last place on both sides. Source: Maechler, Accurately computing log(1 - exp(-|a|)) (2012).</remarks>
    public static double Log1mExp(double l) =>
        l == 0 ? double.NegativeInfinity
        : l > -Ln2 ? Math.Log(-Expm1(l))
        : Log1p(-Math.Exp(l));

    /// <summary>ln(1 + x) - x without cancellation: never positive, about -x^2/2 near zero.</summary>
    /// <param name="x">Above -1.</param>
    /// <remarks>With r = x/(2 + x): ln(1 + x) = 2 artanh r and 2r - x = -xr, so the difference is r (2 (r^2/3 + r^4/5 + ...) - x), where the bracket keeps its sign and size.</remarks>
    public static double Log1pMinus(double x)
    {
        if (!(Math.Abs(x) < 0.5))
        {
            return Log1p(x) - x;
        }

        double r = x / (2 + x);
        return r * ((2 * ArtanhTail(r * r)) - x);
    }

    /// <summary>The sum of s^j/(2j + 1) over j from 1 on, that is artanh(r)/r - 1 with s = r^2.</summary>
    /// <param name="s">In [0, 1/9], where 18 terms are enough.</param>
    /// <remarks>Even and odd terms are summed apart, which halves the chain of dependent operations.</remarks>
    internal static double ArtanhTail(double s)
    {
        double q = s * s;
        double odd = 1.0 / 35;
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 31);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 27);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 23);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 19);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 15);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 11);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 7);
        odd = Math.FusedMultiplyAdd(odd, q, 1.0 / 3);
        double even = 1.0 / 37;
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 33);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 29);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 25);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 21);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 17);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 13);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 9);
        even = Math.FusedMultiplyAdd(even, q, 1.0 / 5);
        return s * Math.FusedMultiplyAdd(even, s, odd);
    }
}
