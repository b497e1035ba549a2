using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>m (1 + 1/2 + ... + 1/m), the factor of the Benjamini-Yekutieli correction.</summary>
internal static class HarmonicFactor
{
    /// <summary>Up to this m numerator, denominator and the denominator times m stay below 2^50, as an exact quotient needs.</summary>
    private const int LargestExact = 36;

    /// <summary>Up to this m the terms are summed; beyond it the expansion below is right to 32 digits.</summary>
    private const int LargestSummed = 1 << 16;

    // Two doubles each: ln 2, and Euler's constant (Abramowitz and Stegun 1964, table 1.1).
    private static readonly DoubleDouble Log2 = DoubleDouble.From(0.6931471805599453) + DoubleDouble.From(2.3190468138462996e-17);
    private static readonly DoubleDouble Euler = DoubleDouble.From(0.5772156649015329) + DoubleDouble.From(-4.942915152430645e-18);

    /// <summary>The factor with 32 digits, to be divided by a whole number.</summary>
    /// <param name="m">Size of the family; up to 65536 its terms are summed.</param>
    /// <returns>Up to m = 36 numerator and denominator, both exact; beyond, where no quotient can lie halfway between two doubles except by an accident of odds below 2^-35, the factor to about 30 digits and 1.</returns>
    public static (DoubleDouble Factor, double Divisor) Of(int m)
    {
        if (m > LargestExact)
        {
            return ((m > LargestSummed ? Expansion(m) : Sum(m)) * DoubleDouble.From((double)m), 1);
        }

        long denominator = 1;
        for (int k = 2; k <= m; k++)
        {
            denominator *= k / GreatestCommonDivisor(denominator, k);
        }

        long numerator = 0;
        for (int k = 1; k <= m; k++)
        {
            numerator += denominator / k;
        }

        long common = GreatestCommonDivisor(numerator * m, denominator);
        return (DoubleDouble.From((double)(numerator * m / common)), denominator / common);
    }

    private static DoubleDouble Sum(int m)
    {
        // Smallest terms first.
        DoubleDouble one = DoubleDouble.From(1.0);
        DoubleDouble sum = default;
        for (int k = m; k >= 1; k--)
        {
            sum += one / (double)k;
        }

        return sum;
    }

    /// <summary>1 + 1/2 + ... + 1/m = ln m + Euler's constant + 1/(2 m) - 1/(12 m^2) + 1/(120 m^4) - ... (Abramowitz and Stegun 1964, 6.3.18); the first term left out is below 1e-31.</summary>
    private static DoubleDouble Expansion(int m)
    {
        double inverseSquare = 1 / ((double)m * m);
        double small = inverseSquare * (-1.0 / 12 + (inverseSquare / 120));
        return Log(m) + (Euler + (DoubleDouble.From(0.5) / m + DoubleDouble.From(small)));
    }

    /// <summary>ln m: a power of two, and for the rest f near 1 the series 2 (z + z^3/3 + z^5/5 + ...) with z = (f - 1) / (f + 1) (Abramowitz and Stegun 1964, 4.1.27).</summary>
    private static DoubleDouble Log(int m)
    {
        int power = Math.ILogB(m * Math.Sqrt(2));
        double f = Math.ScaleB(m, -power);
        DoubleDouble z = DoubleDouble.From(f - 1) / (f + 1);
        DoubleDouble square = z * z;
        DoubleDouble sum = default;
        for (int n = 45; n >= 1; n -= 2)
        {
            sum = (sum * square) + (DoubleDouble.From(1.0) / n);
        }

        return (Log2 * DoubleDouble.From((double)power)) + (DoubleDouble.From(2.0) * z * sum);
    }

    private static long GreatestCommonDivisor(long a, long b)
    {
        while (b != 0)
        {
            (a, b) = (b, a % b);
        }

        return a;
    }
}
