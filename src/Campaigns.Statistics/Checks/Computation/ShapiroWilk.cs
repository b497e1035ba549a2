using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>Shapiro and Wilk's test for a normal law, with Royston's approximations of the weights and of the law of W.</summary>
/// <param name="W">The statistic, in (0, 1]; small where the values are not normal.</param>
/// <param name="P">P(W is at most that small) for normal values; 0 only for three values of which two are equal.</param>
/// <remarks>
/// W is the squared cosine c^2 between the sorted sample and the weights; 1 - W is formed as (1 - c)(1 + c) from the distance of the two as unit vectors, 2 (1 - c) being its square, so that a W close to 1 keeps the digits of what it lacks.
/// Cost: sorting, and a normal quantile for every second value.
/// Sources: S. S. Shapiro and M. B. Wilk, Biometrika 52 (1965) 591; J. P. Royston, algorithm AS R94, Applied Statistics 44 (1995) 547.
/// </remarks>
public readonly record struct ShapiroWilk(double W, PValue P)
{
    /// <summary>Fewest values for which there is a law of W.</summary>
    public const int FewestValues = 3;

    /// <summary>Most values for which the approximation was made.</summary>
    public const int MostValues = 5000;

    /// <summary>Up to here the law of W is fitted by powers of n, beyond by powers of ln n.</summary>
    private const int Small = 11;

    /// <summary>Below that, 1 - W is nothing but rounding.</summary>
    private const double SmallestRest = 1e-17;

    /// <summary>Tests a sample.</summary>
    /// <param name="values">3 to 5000 finite numbers, not all the same, in any order, of a size whose squares are doubles.</param>
    /// <exception cref="ArgumentException">Too few or too many values, or all are the same.</exception>
    public static ShapiroWilk Of(ReadOnlySpan<double> values)
    {
        int n = values.Length;
        double[] x = values.ToArray();
        Array.Sort(x);
        if (n is < FewestValues or > MostValues || x[0] == x[^1])
        {
            throw new ArgumentException("The test needs 3 to 5000 values that are not all the same.", nameof(values));
        }

        double rest = Math.Max(Rest(x, Weights(n)), SmallestRest);
        double p = n == 3 ? OfThree(1 - rest) : NormalLaw.UpperTail(n <= Small ? SmallZ(n, rest) : LargeZ(n, rest));
        return new ShapiroWilk(1 - rest, PValue.FromValue(p));
    }

    /// <summary>1 - W.</summary>
    private static double Rest(double[] x, double[] upper)
    {
        int n = x.Length;
        double lowest = x[0];
        double range = x[^1] - lowest;
        double mean = 0;
        for (int i = 0; i < n; i++)
        {
            x[i] = (x[i] - lowest) / range;
            mean += x[i];
        }

        mean /= n;
        double squares = 0;
        double weightSquares = 0;
        for (int i = 0; i < n; i++)
        {
            x[i] -= mean;
            squares += x[i] * x[i];
            weightSquares += Weight(upper, i, n) * Weight(upper, i, n);
        }

        // The sample and its weights as unit vectors of cosine c: 1 - c is half the squared distance between them.
        double scale = 1 / Math.Sqrt(squares);
        double weightScale = 1 / Math.Sqrt(weightSquares);
        double distance = 0;
        for (int i = 0; i < n; i++)
        {
            double d = (Weight(upper, i, n) * weightScale) - (x[i] * scale);
            distance += d * d;
        }

        return distance * (1 - (distance / 4));
    }

    /// <summary>The weight of a place in the sorted sample: in the lower half that of the upper half with the other sign, so that the weights add up to zero.</summary>
    private static double Weight(double[] upper, int i, int n)
    {
        int fromEnd = Math.Min(i, n - 1 - i);
        return 2 * i == n - 1 ? 0 : i < n / 2 ? -upper[fromEnd] : upper[fromEnd];
    }

    /// <summary>The weights of the largest value, the second largest, and so on down to the middle.</summary>
    private static double[] Weights(int n)
    {
        var weights = new double[n / 2];
        if (n == 3)
        {
            weights[0] = Math.Sqrt(0.5);
            return weights;
        }

        double squares = 0;
        for (int i = 0; i < weights.Length; i++)
        {
            double m = -NormalLaw.Quantile((i + 1 - 0.375) / (n + 0.25));
            weights[i] = m;
            squares += 2 * m * m;
        }

        double u = 1 / Math.Sqrt(n);
        double root = Math.Sqrt(squares);
        double first = Polynomial(u, 0, 0.221157, -0.147981, -2.07119, 4.434685, -2.706056) + (weights[0] / root);
        double rest = squares - (2 * weights[0] * weights[0]);
        double share = 1 - (2 * first * first);
        int fitted = 1;
        double second = 0;
        if (n > 5)
        {
            second = Polynomial(u, 0, 0.042981, -0.293762, -1.752461, 5.682633, -3.582633) + (weights[1] / root);
            rest -= 2 * weights[1] * weights[1];
            share -= 2 * second * second;
            weights[1] = second;
            fitted = 2;
        }

        weights[0] = first;
        double scale = Math.Sqrt(rest / share);
        for (int i = fitted; i < weights.Length; i++)
        {
            weights[i] /= scale;
        }

        return weights;
    }

    /// <summary>The exact law for three values, whose W is at least 3/4.</summary>
    private static double OfThree(double w) =>
        Math.Clamp(6 / Math.PI * (Math.Asin(Math.Sqrt(w)) - Math.Asin(Math.Sqrt(0.75))), 0, 1);

    /// <summary>For 4 to 11 values. W is at least n a_n^2/(n - 1), which keeps ln(1 - W) well below gamma.</summary>
    private static double SmallZ(int n, double rest)
    {
        double gamma = Polynomial(n, -2.273, 0.459);
        double y = -Math.Log(gamma - Math.Log(rest));
        double mean = Polynomial(n, 0.544, -0.39978, 0.025054, -6.714e-4);
        double deviation = Math.Exp(Polynomial(n, 1.3822, -0.77857, 0.062767, -0.0020322));
        return (y - mean) / deviation;
    }

    /// <summary>For 12 values and more. As W is at least n a_n^2/(n - 1), z stays below about 25 and its tail among the doubles.</summary>
    private static double LargeZ(int n, double rest)
    {
        double log = Math.Log(n);
        double mean = Polynomial(log, -1.5861, -0.31082, -0.083751, 0.0038915);
        double deviation = Math.Exp(Polynomial(log, -0.4803, -0.082676, 0.0030302));
        return (Math.Log(rest) - mean) / deviation;
    }

    private static double Polynomial(double x, params ReadOnlySpan<double> coefficients)
    {
        double sum = 0;
        for (int i = coefficients.Length - 1; i >= 0; i--)
        {
            sum = (sum * x) + coefficients[i];
        }

        return sum;
    }
}
