using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>m (1 + 1/2 + ... + 1/m), the factor of the Benjamini-Yekutieli correction.</summary>
internal static class HarmonicFactor
{
    /// <summary>Up to this m numerator, denominator and the denominator times m stay below 2^50, as an exact quotient needs.</summary>
    private const int LargestExact = 36;

    /// <summary>The factor with 32 digits, to be divided by a whole number.</summary>
    /// <param name="m">Size of the family; its terms are summed, so the time is linear in it.</param>
    /// <returns>Up to m = 36 numerator and denominator, both exact; beyond, where no quotient can lie halfway between two doubles except by an accident of odds below 2^-35, the factor to about 30 digits and 1.</returns>
    public static (DoubleDouble Factor, double Divisor) Of(int m)
    {
        if (m > LargestExact)
        {
            // Smallest terms first.
            DoubleDouble one = DoubleDouble.From(1.0);
            DoubleDouble sum = default;
            for (int k = m; k >= 1; k--)
            {
                sum += one / (double)k;
            }

            return (sum * DoubleDouble.From((double)m), 1);
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

    private static long GreatestCommonDivisor(long a, long b)
    {
        while (b != 0)
        {
            (a, b) = (b, a % b);
        }

        return a;
    }
}
