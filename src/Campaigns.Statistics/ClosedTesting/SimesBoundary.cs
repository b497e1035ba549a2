using System.Numerics;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.ClosedTesting;

/// <summary>The comparison on which Simes' tests rest: size times p against rank times level, decided exactly.</summary>
/// <remarks>
/// For any dependence the level is divided by H = 1 + 1/2 + ... + 1/m, so that the comparison is size p (m H) against rank level m. Source of the divisor: G. Hommel (1983),
/// Biometrical Journal 25:423-430. Both sides are first rounded, then taken to 30 digits, and where these do not decide, to whole numbers.
/// </remarks>
internal sealed class SimesBoundary
{
    /// <summary>Up to this family size a tie is possible; beyond it the numerator of H, a prime to its denominator, exceeds every rank times the 53 bits of a level.</summary>
    private const int LargestTied = 64;

    /// <summary>Far above the smallest doubles, so that products keep their digits; 2^100.</summary>
    private const double Up = 1.2676506002282294e30;

    private readonly double _level;
    private readonly int _familySize;
    private readonly bool _anyDependence;
    private readonly DoubleDouble _factor;
    private readonly double _divisor;

    /// <summary>A comparison for a family.</summary>
    /// <param name="level">The level, in (0, 1).</param>
    /// <param name="familySize">Hypotheses in the family.</param>
    /// <param name="anyDependence">Whether the level is divided by H.</param>
    public SimesBoundary(double level, int familySize, bool anyDependence)
    {
        (_level, _familySize, _anyDependence) = (level, familySize, anyDependence && familySize > 1);
        (_factor, _divisor) = _anyDependence ? HarmonicFactor.Of(familySize) : (DoubleDouble.From(1.0), 1);
    }

    /// <summary>The level that a p-value is compared with, for a first guess.</summary>
    public double RoundedLevel => _level * _divisor * (_anyDependence ? _familySize : 1) / _factor.High;

    /// <summary>Whether size p is at most rank level (over H).</summary>
    /// <param name="p">In [0, 1].</param>
    /// <param name="size">A size from 0 to that of the family.</param>
    /// <param name="rank">A rank of at least 1.</param>
    public bool Reaches(double p, int size, int rank)
    {
        if (!_anyDependence)
        {
            return !ExactProducts.IsLess(_level, rank, p, size);
        }

        double left = p * Up * size * _factor.High;
        double right = _level * Up * rank * _divisor * _familySize;
        return Math.Abs(left - right) > 1e-14 * (left + right) ? left < right : ReachesClosely(p, size, rank);
    }

    private bool ReachesClosely(double p, int size, int rank)
    {
        DoubleDouble left = DoubleDouble.From(p * Up) * DoubleDouble.From((double)size) * _factor;
        DoubleDouble right = DoubleDouble.From(_level * Up) * DoubleDouble.From((double)rank) * DoubleDouble.From(_divisor * _familySize);
        double difference = (left - right).High;
        return Math.Abs(difference) > 1e-28 * right.High || _familySize > LargestTied ? difference <= 0 : ReachesExactly(p, size, rank);
    }

    private bool ReachesExactly(double p, int size, int rank)
    {
        BigInteger denominator = 1;
        BigInteger numerator = 0;
        for (int k = 1; k <= _familySize; k++)
        {
            (numerator, denominator) = ((numerator * k) + denominator, denominator * k);
        }

        return InSmallestDoubles(p) * size * numerator <= InSmallestDoubles(_level) * rank * denominator;
    }

    /// <summary>How many times the smallest double goes into a number from 0 up; a whole number.</summary>
    private static BigInteger InSmallestDoubles(double value)
    {
        long bits = BitConverter.DoubleToInt64Bits(value);
        int exponent = (int)(bits >> 52);
        BigInteger mantissa = bits & 0xFFFFFFFFFFFFF;
        return exponent == 0 ? mantissa : (mantissa + (BigInteger.One << 52)) << (exponent - 1);
    }
}
