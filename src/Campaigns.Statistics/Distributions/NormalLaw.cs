using MathNet.Numerics;
using MathNet.Numerics.Distributions;

namespace Campaigns.Statistics.Distributions;

/// <summary>The standard normal law: its upper tail and its quantiles.</summary>
public static class NormalLaw
{
    /// <summary>P(Z > z).</summary>
    /// <param name="z">Any number.</param>
    /// <returns>In [0, 1], relative error at most |ln P| times 2e-16 and 1e-15, down to the smallest normal double; 0 below the smallest double; NaN for NaN.</returns>
    public static double UpperTail(double z) => SpecialFunctions.Erfc(z / Math.Sqrt(2)) / 2;

    /// <summary>The z that is not exceeded with a given probability.</summary>
    /// <param name="probability">In [0, 1].</param>
    /// <returns>Right to a few units in the last place; an infinity at either end.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Outside [0, 1], or NaN.</exception>
    public static double Quantile(double probability) =>
        probability >= 0 && probability <= 1
            ? Normal.InvCDF(0, 1, probability)
            : throw new ArgumentOutOfRangeException(nameof(probability), probability, "A probability lies in [0, 1].");
}
