namespace Campaigns.Statistics.Numerics;

/// <summary>What Stirling's formula leaves of the log-gamma function: ln Gamma(z) = (z - 1/2) ln z - z + ln(2 pi)/2 + error(z).</summary>
/// <remarks>Ratios of gamma functions written with it need no differences of large logarithms, hence lose nothing for large arguments.</remarks>
public static class StirlingError
{
    private const double SeriesFrom = 16;

    /// <summary>The error term at z, to about 1e-16 absolutely.</summary>
    /// <param name="z">Positive and finite.</param>
    /// <returns>Positive; about 1/(12 z) for large z.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Not positive, or not a number.</exception>
    /// <remarks>
    /// From 16 on the asymptotic series (Abramowitz and Stegun 1964, 6.1.41), seven terms.
    /// Below, error(z) = error(z + 1) + (z + 1/2) ln(1 + 1/z) - 1, which with r = 1/(2z + 1) is error(z + 1) + r^2/3 + r^4/5 + ..., a sum of positive terms.
    /// </remarks>
    public static double Of(double z)
    {
        if (!(z > 0))
        {
            throw new ArgumentOutOfRangeException(nameof(z), z, "The argument must be positive.");
        }

        double sum = 0;
        while (z < SeriesFrom)
        {
            double r = 1 / ((2 * z) + 1);
            sum += z >= 1 ? Accurate.ArtanhTail(r * r) : ((z + 0.5) * Accurate.Log1p(1 / z)) - 1;
            z += 1;
        }

        return sum + Series(z);
    }

    private static double Series(double z)
    {
        double r = 1 / z;
        double s = r * r;
        return r * ((1.0 / 12) - (s * ((1.0 / 360) - (s * ((1.0 / 1260) - (s * ((1.0 / 1680)
            - (s * ((1.0 / 1188) - (s * ((691.0 / 360360) - (s / 156))))))))))));
    }
}
