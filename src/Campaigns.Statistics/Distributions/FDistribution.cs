using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Distributions;

/// <summary>The F law with (df1, df2) degrees of freedom, whole or fractional: both tails with their logarithms, density, quantiles of both tails.</summary>
/// <remarks>
/// With a = df2/2, b = df1/2, w = df2 + df1 f, x = df2/w, y = df1 f/w: P(F > f) = I_x(a, b), P(F at most f) = I_y(b, a).
/// The tail on f's own side of 1 is computed directly, the other from its logarithm; that one is then at least 0.3, or close to one.
/// Everything is formed in logarithms, so that tails below the smallest double keep their ln; relative error of ln p a few units in the last place, up to 2e-13 where p is close to 1, of p at most |ln p| times 4e-16 and 1e-14.
/// Constants are computed once per pair of degrees of freedom. A tail costs 0.05 to 0.2 us. Objects are immutable and may be shared between threads.
/// </remarks>
public sealed class FDistribution
{
    /// <summary>Up to this many terms the finite sum beats the continued fraction.</summary>
    private const int MostTerms = 24;

    /// <summary>From here on the upper tail is a pure power of f, to far beyond double accuracy, for any degrees of freedom that an experiment can have.</summary>
    internal const double PowerLawFrom = 1e300;

    private const double Far = 1e280;
    private const int CacheBits = 10;

    private static readonly FDistribution?[] Cache = new FDistribution?[1 << CacheBits];

    private readonly double _a;
    private readonly double _b;
    private readonly double _logConstant;
    private readonly TailFraction _upper;
    private readonly TailFraction _lower;
    private readonly double[]? _sum;

    /// <summary>Makes the law; <see cref="For"/> reuses one made before.</summary>
    /// <param name="df1">Numerator degrees of freedom, positive and finite.</param>
    /// <param name="df2">Denominator degrees of freedom, positive and finite.</param>
    /// <exception cref="ArgumentOutOfRangeException">Either is not positive and finite.</exception>
    public FDistribution(double df1, double df2)
        : this(df1, df2, TailFraction.UsualSteps)
    {
    }

    private FDistribution(double df1, double df2, int tabledSteps)
    {
        Df1 = Positive(df1, nameof(df1));
        Df2 = Positive(df2, nameof(df2));
        _a = df2 / 2;
        _b = df1 / 2;
        double n = _a + _b;
        _logConstant = (0.5 * Math.Log(_a / n * _b / (2 * Math.PI)))
            + (StirlingError.Of(n) - StirlingError.Of(_a) - StirlingError.Of(_b));
        _upper = new TailFraction(_a, _b, tabledSteps);
        _lower = new TailFraction(_b, _a, tabledSteps);
        if (_b == Math.Floor(_b) && _b <= MostTerms)
        {
            _sum = new double[(int)_b - 1];
            for (int j = 0; j < _sum.Length; j++)
            {
                _sum[j] = (_a + j) / (j + 1);
            }
        }
    }

    /// <summary>Numerator degrees of freedom.</summary>
    public double Df1 { get; }

    /// <summary>Denominator degrees of freedom.</summary>
    public double Df2 { get; }

    /// <summary>The law with given degrees of freedom, from a fixed-size table of those used lately where it is there.</summary>
    /// <inheritdoc cref="FDistribution(double, double)"/>
    public static FDistribution For(double df1, double df2)
    {
        // Slots are replaced whole; a race between threads costs a second construction at worst.
        int slot = Slot(df1, df2);
        FDistribution? law = Volatile.Read(ref Cache[slot]);
        if (law is null || law.Df1 != df1 || law.Df2 != df2)
        {
            law = new FDistribution(df1, df2);
            Volatile.Write(ref Cache[slot], law);
        }

        return law;
    }

    /// <summary>The law with degrees of freedom that no other experiment will have, such as fractional ones: made at a third of the cost, and kept from the table that <see cref="For"/> looks in.</summary>
    /// <inheritdoc cref="FDistribution(double, double)"/>
    /// <remarks>The same bits as any other.</remarks>
    public static FDistribution Once(double df1, double df2) => new(df1, df2, tabledSteps: 0);

    /// <summary>ln P(F > f).</summary>
    /// <param name="f">Any number.</param>
    /// <returns>0 for f of at most 0, negative infinity at positive infinity, NaN for NaN.</returns>
    public double LogUpperTail(double f)
    {
        double near = LogNearTail(f, out bool isUpper);
        return isUpper ? near : Accurate.Log1mExp(near);
    }

    /// <summary>ln P(F at most f).</summary>
    /// <param name="f">Any number.</param>
    /// <returns>Negative infinity for f of at most 0, 0 at positive infinity, NaN for NaN.</returns>
    public double LogLowerTail(double f)
    {
        double near = LogNearTail(f, out bool isUpper);
        return isUpper ? Accurate.Log1mExp(near) : near;
    }

    /// <summary>P(F > f).</summary>
    /// <param name="f">Any number.</param>
    /// <returns>In [0, 1]; 0 below the smallest double; NaN for NaN.</returns>
    public double UpperTail(double f)
    {
        double near = LogNearTail(f, out bool isUpper);
        return isUpper ? Math.Exp(near) : -Accurate.Expm1(near);
    }

    /// <summary>P(F at most f).</summary>
    /// <param name="f">Any number.</param>
    /// <returns>In [0, 1]; 0 below the smallest double; NaN for NaN.</returns>
    public double LowerTail(double f)
    {
        double near = LogNearTail(f, out bool isUpper);
        return isUpper ? -Accurate.Expm1(near) : Math.Exp(near);
    }

    /// <summary>P(F > f) with its logarithm, each computed to its own accuracy, in one go.</summary>
    /// <param name="f">Any number but NaN.</param>
    public PValue UpperTailPValue(double f)
    {
        double near = LogNearTail(f, out bool isUpper);
        if (isUpper)
        {
            return PValue.FromValueAndLog(Math.Exp(near), near);
        }

        double upper = -Accurate.Expm1(near);
        return PValue.FromValueAndLog(upper, upper < 0.5 ? Math.Log(upper) : Accurate.Log1mExp(near));
    }

    /// <summary>P(F > f) with its logarithm, for an f that may lie beyond the range of doubles.</summary>
    /// <param name="f">Not negative.</param>
    /// <remarks>Far out P(F > f) falls as f to the power of -df2/2.</remarks>
    public PValue UpperTailPValue(WideReal f)
    {
        double near = f.ToDouble();
        return near < PowerLawFrom
            ? UpperTailPValue(near)
            : PValue.FromLog(LogUpperTail(PowerLawFrom) - (_a * (f / PowerLawFrom).Log()));
    }

    /// <summary>The natural logarithm of the density at f.</summary>
    /// <param name="f">Any number.</param>
    /// <returns>Negative infinity below 0 and where the density is 0, positive infinity where it is infinite; NaN for NaN.</returns>
    public double LogDensity(double f)
    {
        if (f <= 0 || double.IsPositiveInfinity(f))
        {
            return f == 0 && Df1 <= 2 ? (Df1 == 2 ? 0 : double.PositiveInfinity) : double.NegativeInfinity;
        }

        return LogBetaTerm(f) - Math.Log(f);
    }

    /// <summary>The f that is exceeded with a given probability.</summary>
    /// <param name="probability">In [0, 1].</param>
    /// <returns>0 for 1; positive infinity for 0 and where f is beyond the range of doubles.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Outside [0, 1], or NaN.</exception>
    public double UpperQuantile(double probability) =>
        Quantile(Probability(probability), Math.Log(probability), Accurate.Log1p(-probability));

    /// <summary>The f that is exceeded with a probability given by its logarithm.</summary>
    /// <param name="logProbability">At most 0.</param>
    /// <returns>As <see cref="UpperQuantile"/>.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Positive, or NaN.</exception>
    public double UpperQuantileOfLog(double logProbability) =>
        logProbability <= 0
            ? Quantile(Math.Exp(logProbability), logProbability, Accurate.Log1mExp(logProbability))
            : throw new ArgumentOutOfRangeException(nameof(logProbability), logProbability, "The logarithm of a probability is at most 0.");

    /// <summary>The f that is not exceeded with a given probability.</summary>
    /// <param name="probability">In [0, 1].</param>
    /// <returns>0 for 0; positive infinity for 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Outside [0, 1], or NaN.</exception>
    public double LowerQuantile(double probability) =>
        Quantile(1 - Probability(probability), Accurate.Log1p(-probability), Math.Log(probability));

    /// <summary>Newton's method on ln f for the logarithm of the smaller tail, kept in a bracket by halving ln f where a step leaves it.</summary>
    private double Quantile(double upper, double logUpper, double logLower)
    {
        if (double.IsNegativeInfinity(logUpper) || logLower == 0)
        {
            return double.PositiveInfinity;
        }

        if (double.IsNegativeInfinity(logLower) || logUpper == 0)
        {
            return 0;
        }

        bool byUpper = upper <= 0.5;
        double target = byUpper ? logUpper : logLower;
        double below = double.Epsilon;
        double above = double.MaxValue;
        double f = 1;
        for (int step = 0; step < 2200; step++)
        {
            double tail = byUpper ? LogUpperTail(f) : LogLowerTail(f);
            double excess = tail - target;
            if (excess == 0)
            {
                return f;
            }

            if (excess > 0 == byUpper)
            {
                below = f;
            }
            else
            {
                above = f;
            }

            double slope = Math.Exp(LogBetaTerm(f) - tail);
            double next = f * Math.Exp(byUpper ? excess / slope : -excess / slope);
            if (!(next > below && next < above))
            {
                next = Math.Sqrt(below) * Math.Sqrt(above);
            }

            if (Math.Abs(next - f) <= 2e-16 * f || next == below || next == above)
            {
                return f >= double.MaxValue / 2 ? double.PositiveInfinity : next;
            }

            f = next;
        }

        throw new ArithmeticException(FormattableString.Invariant($"The F quantile with ({Df1:R}, {Df2:R}) degrees of freedom did not converge at ln p = {logUpper:R}."));
    }

    /// <summary>The logarithm of the upper tail for f of at least 1, else that of the lower tail.</summary>
    private double LogNearTail(double f, out bool isUpper)
    {
        isUpper = f >= 1;
        if (isUpper)
        {
            return LogUpperFrom1(f);
        }

        if (f > 1 / Far)
        {
            double w = Df2 + (Df1 * f);
            double lambda = Df1 * (Df2 * (1 - f) / (2 * w));
            return Math.Min(0, LogBetaTerm(f) - Math.Log(_lower.Denominator(Df1 * f / w, Df2 / w, lambda)));
        }

        // Far down the lower tail is the power df1/2 of f; 1/f would overflow and products underflow.
        return f > 0 ? LogNearTail(2 / Far, out _) + (_b * (Math.Log(f) - Math.Log(2 / Far)))
            : f <= 0 ? double.NegativeInfinity
            : double.NaN;
    }

    private double LogUpperFrom1(double f)
    {
        if (f > Far)
        {
            return LogUpperFrom1(Far) - (_a * (Math.Log(f) - Math.Log(Far)));
        }

        double w = Df2 + (Df1 * f);
        double y = Df1 * f / w;
        if (_sum is not null)
        {
            return Math.Min(0, Math.Log(FiniteSum(y)) - (_a * Accurate.Log1p(Df1 * f / Df2)));
        }

        double lambda = Df2 * (Df1 * (f - 1) / (2 * w));
        return Math.Min(0, LogBetaTerm(f) - Math.Log(_upper.Denominator(Df2 / w, y, lambda)));
    }

    /// <summary>For whole b: I_x(a, b) = x^a times the sum over j below b of a (a + 1) ... (a + j - 1)/j! y^j. All terms are positive.</summary>
    private double FiniteSum(double y)
    {
        double sum = 1;
        for (int j = _sum!.Length - 1; j >= 0; j--)
        {
            sum = 1 + (_sum[j] * y * sum);
        }

        return sum;
    }

    /// <summary>ln of x^a y^b/B(a, b), which is also ln of f times the density at f.</summary>
    /// <remarks>
    /// With u = n x/a - 1 and v = n y/b - 1, formed without cancellation, a u + b v = 0, hence a ln(1 + u) + b ln(1 + v) = a g(u) + b g(v) with g(z) = ln(1 + z) - z.
    /// The gamma functions enter by Stirling errors alone. Idea: Loader (2000), Fast and accurate computation of binomial probabilities.
    /// </remarks>
    private double LogBetaTerm(double f)
    {
        double w = Df2 + (Df1 * f);
        double u = Df1 * (1 - f) / w;
        double v = Df2 * (f - 1) / w;
        double total = (Df1 + Df2) / w;
        double kernel = Math.Abs(u) < 0.5 && Math.Abs(v) < 0.5
            ? (_a * Accurate.Log1pMinus(u)) + (_b * Accurate.Log1pMinus(v))
            : (_a * LogOnePlus(u, total)) + (_b * LogOnePlus(v, f * total));
        return kernel + _logConstant;
    }

    /// <summary>ln(1 + z), from z where that is small, else from 1 + z.</summary>
    private static double LogOnePlus(double z, double onePlus) =>
        Math.Abs(z) < 0.3 ? Accurate.Log1p(z) : Math.Log(onePlus);

    private static int Slot(double df1, double df2)
    {
        ulong mixed = (BitConverter.DoubleToUInt64Bits(df1) * 0x9E3779B97F4A7C15) + (BitConverter.DoubleToUInt64Bits(df2) * 0xC2B2AE3D27D4EB4F);
        return (int)(mixed >> (64 - CacheBits));
    }

    private static double Positive(double value, string name) =>
        value > 0 && double.IsFinite(value)
            ? value
            : throw new ArgumentOutOfRangeException(name, value, "Degrees of freedom are positive and finite.");

    private static double Probability(double value) =>
        value >= 0 && value <= 1
            ? value
            : throw new ArgumentOutOfRangeException(nameof(value), value, "A probability lies in [0, 1].");
}
