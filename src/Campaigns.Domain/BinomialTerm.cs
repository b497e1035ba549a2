using Campaigns.Statistics.Numerics;

namespace Campaigns.Domain;

/// <summary>A single probability of the binomial law, without cancellation, in the saddle-point form.</summary>
/// <remarks>Source: C. Loader (2000), Fast and Accurate Computation of Binomial Probabilities.</remarks>
internal static class BinomialTerm
{
    /// <summary>The probability of exactly k successes.</summary>
    /// <param name="k">Above 0 and at most <paramref name="tests"/>.</param>
    /// <param name="tests">Independent trials.</param>
    /// <param name="level">The probability of success in each, in (0, 1).</param>
    public static double Of(int k, int tests, double level)
    {
        if (k == tests)
        {
            return Math.Pow(level, tests);
        }

        double failures = tests - k;
        double exponent = StirlingError.Of(tests) - StirlingError.Of(k) - StirlingError.Of(failures)
            - Deviance(k, tests * level) - Deviance(failures, tests * (1 - level));
        return Math.Sqrt(tests / (2 * Math.PI * k * failures)) * Math.Exp(exponent);
    }

    /// <summary>x ln(x / mean) + mean - x, without cancellation where x is near the mean.</summary>
    private static double Deviance(double x, double mean)
    {
        if (Math.Abs(x - mean) >= 0.1 * (x + mean))
        {
            return (x * Math.Log(x / mean)) + mean - x;
        }

        // With v = (x - mean) / (x + mean), ln(x / mean) = 2 (v + v^3 / 3 + v^5 / 5 + ...).
        double v = (x - mean) / (x + mean);
        double sum = (x - mean) * v;
        double power = 2 * x * v;
        for (int j = 1; ; j++)
        {
            power *= v * v;
            double next = sum + (power / ((2 * j) + 1));
            if (next == sum)
            {
                return sum;
            }

            sum = next;
        }
    }
}
