namespace Campaigns.Statistics.Corrections;

/// <summary>Products and quotients of p-values and whole numbers, compared exactly and rounded once.</summary>
/// <remarks>
/// The error of a product is had from a fused multiply-add. For a p-value and a whole number it is itself a double even in the subnormal range: both it and the product are multiples of
/// the smallest double. Source: T. J. Dekker (1971), Numerische Mathematik 18:224-242.
/// </remarks>
internal static class ExactProducts
{
    /// <summary>Below this p-value a quotient is formed in a scaled copy, because its remainder could be too small for a double.</summary>
    private const double ScaleBelow = 1e-240;

    private const double Up = 1.6069380442589903e60; // 2^200
    private const double Down = 6.2230152778611417e-61; // 2^-200
    private const double SmallestNormal = 2.2250738585072014e-308; // 2^-1022
    private const double HalfSmallestScaled = 3.9696644133184383e-264; // half of the smallest double times 2^200: 2^-875

    /// <summary>Whether p times m is less than q times n, decided exactly.</summary>
    /// <param name="p">At least 0.</param>
    /// <param name="m">A whole number below 2^53.</param>
    /// <param name="q">At least 0.</param>
    /// <param name="n">A whole number below 2^53.</param>
    public static bool IsLess(double p, double m, double q, double n)
    {
        double left = p * m;
        double right = q * n;

        // Rounding keeps the order; only equal roundings leave it to the errors.
        return left != right
            ? left < right
            : Math.FusedMultiplyAdd(p, m, -left) < Math.FusedMultiplyAdd(q, n, -right);
    }

    /// <summary>p (factor + factorRest) / (divisor + divisorRest), correctly rounded where both rests are 0 and the others whole; else to about 30 digits before it is rounded.</summary>
    /// <param name="p">In [0, 1].</param>
    /// <param name="factor">A whole number below 2^50, or the leading part of any factor from 10^-30 to 2^50.</param>
    /// <param name="factorRest">What the leading part leaves out.</param>
    /// <param name="divisor">A whole number from 1 to 2^50, or the leading part of any divisor from 10^-30 to 2^50.</param>
    /// <param name="divisorRest">What the leading part leaves out.</param>
    /// <returns>At least 0; in the subnormal range as well rounded once.</returns>
    /// <remarks>
    /// One division and one remainder step. With whole factors the exact quotient is either halfway between two doubles, which the remainder step meets exactly, or further from
    /// halfway than 1/divisor half units, which exceeds the error of the step, 2^-52 units.
    /// </remarks>
    public static double Quotient(double p, double factor, double factorRest, double divisor, double divisorRest = 0)
    {
        if (p < ScaleBelow)
        {
            return TinyQuotient(p, factor, factorRest, divisor, divisorRest);
        }

        double product = p * factor;
        double rest = Math.FusedMultiplyAdd(p, factor, -product) + (p * factorRest);
        double quotient = product / divisor;
        return quotient + ((Math.FusedMultiplyAdd(-quotient, divisor, product) + (rest - (quotient * divisorRest))) / divisor);
    }

    private static double TinyQuotient(double p, double factor, double factorRest, double divisor, double divisorRest)
    {
        double scaled = p * Up;
        double product = scaled * factor;
        double rest = Math.FusedMultiplyAdd(scaled, factor, -product) + (scaled * factorRest);
        double first = product / divisor;
        double correction = (Math.FusedMultiplyAdd(-first, divisor, product) + (rest - (first * divisorRest))) / divisor;
        double quotient = first + correction;
        double left = correction - (quotient - first);
        double result = quotient * Down;
        if (result >= SmallestNormal)
        {
            return result;
        }

        // Scaling back rounded for a second time: see on which side of the halfway point the unrounded quotient lies.
        double lost = quotient - (result * Up);
        return left > HalfSmallestScaled - lost ? result + double.Epsilon
            : left < -HalfSmallestScaled - lost ? result - double.Epsilon
            : result;
    }
}
