using System.Numerics;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>1 - (1 - p)^m, the adjusted p-value of Sidak, without cancellation and rounded once.</summary>
internal static class SidakPower
{
    /// <summary>Below this m p the second term of the expansion, m p (1 - (m-1) p / 2 + ...), is too small for 32 digits to hold.</summary>
    private const double LinearBelow = 5.2e-26; // 2^-84

    /// <summary>Above this m p, (1 - p)^m is below exp(-40), less than half the distance from 1 to the double before it.</summary>
    private const double OneAbove = 40;

    /// <summary>The probability that the smallest of m independent p-values is at most p.</summary>
    /// <param name="p">In [0, 1].</param>
    /// <param name="m">How many; at least 1.</param>
    /// <returns>In [0, 1].</returns>
    /// <remarks>
    /// Method: with q_a = 1 - (1 - p)^a, q_(a+b) = q_a + q_b (1 - q_a): all terms positive, doubling along the bits of m, with 32 digits.
    /// </remarks>
    public static double Of(double p, int m)
    {
        double product = p * m;
        if (p == 0 || m == 1)
        {
            return p;
        }

        if (product > OneAbove)
        {
            return 1;
        }

        if (product < LinearBelow)
        {
            return JustBelow(product, Math.FusedMultiplyAdd(p, m, -product));
        }

        DoubleDouble one = DoubleDouble.From(1.0);
        DoubleDouble single = DoubleDouble.From(p);
        DoubleDouble sum = single;
        for (int bit = BitOperations.Log2((uint)m) - 1; bit >= 0; bit--)
        {
            sum += sum * (one - sum);
            if ((m >> bit & 1) != 0)
            {
                sum += single * (one - sum);
            }
        }

        return Math.Min(1, sum.High);
    }

    /// <summary>The double nearest to a number that lies below an exact product by less than anything representable.</summary>
    private static double JustBelow(double rounded, double error)
    {
        // Only where the product was halfway between two doubles and went up does the little that is missing decide.
        double before = Math.BitDecrement(rounded);
        return error < 0 && 2 * error == before - rounded ? before : rounded;
    }
}
