using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Distributions;

/// <summary>The law of an extreme of normal variables divided by an independent estimate of their standard deviation: the studentized range, Dunnett's largest |T|.</summary>
/// <remarks>
/// With s the estimate over the true value and g its density, P(Q > q) = integral of g(s) P(W > q s), formed as the upper tail itself and in logarithms, so that tails below the smallest double keep their ln.
/// In t = ln s the weight is a constant times exp(-df/2 (e^2t - 1 - 2t)) and the integrand is smooth, single-peaked and falls fast on both sides: trapezoidal rule in steps of min(0.06, 0.4/sqrt(2 df)), smaller for more than a hundred variables, outwards from the peak (method: the trapezoidal rule for analytic integrands, e.g. Trefethen and Weideman 2014, SIAM Review 56:385).
/// Relative error of the tail about 1e-14 plus 2e-16 times |ln p|. A tail costs 1 to 40 us, most at few degrees of freedom; from the table of a law that <c>For</c> gave, 0.1 us. Whether a tail comes from the table depends on the law object and on q alone.
/// Objects are immutable to their users and may be shared between threads.
/// </remarks>
public abstract class StudentizedLaw
{
    private const double LargestStep = 0.06;
    private const double Negligible = 1e-18;
    private const double Squarable = 1e150;
    private const int TabledTo = 40;
    private const double TableTolerance = 2e-14;
    private const double LogRootTwoPi = 0.918938533204672741780329736406;

    private readonly NormalExtreme _extreme;
    private readonly PiecewiseChebyshev? _table;
    private readonly double _step;
    private readonly double _logConstant;
    private KnownQuantile? _known;

    private protected StudentizedLaw(NormalExtreme extreme, double df, bool tabled)
    {
        if (!(df >= 1))
        {
            throw new ArgumentOutOfRangeException(nameof(df), df, "Degrees of freedom are at least 1.");
        }

        _extreme = extreme;
        Df = df;
        _step = Math.Min(LargestStep / extreme.Sharpness, 0.4 / Math.Sqrt(2 * df));
        _logConstant = double.IsInfinity(df) ? 0 : (0.5 * Math.Log(2 * df)) - LogRootTwoPi - StirlingError.Of(df / 2);
        _table = tabled ? new PiecewiseChebyshev(TabledFunction, 1, TabledTo, TableTolerance) : null;
    }

    /// <summary>Degrees of freedom of the estimate of the standard deviation; positive infinity where it is known.</summary>
    public double Df { get; }

    /// <summary>ln P(Q > q).</summary>
    /// <param name="q">Any number.</param>
    /// <returns>At most 0; 0 for q of at most 0, negative infinity at positive infinity, NaN for NaN.</returns>
    public double LogUpperTail(double q)
    {
        if (!(q > 0 && double.IsFinite(q)))
        {
            return q <= 0 ? 0 : double.IsNaN(q) ? q : double.NegativeInfinity;
        }

        double y = NormalScale(q);
        return Math.Min(0, _table is not null && y < _table.End ? _table.At(y) - (y * y / 2) : ByQuadrature(q));
    }

    /// <summary>P(Q > q).</summary>
    /// <param name="q">Any number.</param>
    /// <returns>In [0, 1]; 0 below the smallest double; NaN for NaN.</returns>
    public double UpperTail(double q) => Math.Exp(LogUpperTail(q));

    /// <summary>P(Q > q) with its logarithm.</summary>
    /// <param name="q">Any number but NaN.</param>
    public PValue UpperTailPValue(double q) => PValue.FromLog(LogUpperTail(Math.Min(q, double.MaxValue)));

    /// <summary>The q that is exceeded with a given probability.</summary>
    /// <param name="probability">In [0, 1].</param>
    /// <returns>0 for 1; positive infinity for 0 and where q is beyond the range of doubles. Relative error about 1e-14.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Outside [0, 1], or NaN.</exception>
    /// <remarks>Found on the quadrature, never on the table; the last one is kept, because every experiment of a campaign asks for the same.</remarks>
    public double UpperQuantile(double probability)
    {
        if (!(probability >= 0 && probability <= 1))
        {
            throw new ArgumentOutOfRangeException(nameof(probability), probability, "A probability lies in [0, 1].");
        }

        KnownQuantile? known = Volatile.Read(ref _known);
        if (known is null || known.Probability != probability)
        {
            double q = probability == 0 ? double.PositiveInfinity : probability == 1 ? 0 : FromNormalScale(Root(Math.Log(probability)));
            known = new KnownQuantile(probability, q);
            Volatile.Write(ref _known, known);
        }

        return known.Quantile;
    }

    /// <summary>The root in y of ln P = target: as a function of y, sqrt(-2 ln P) is nearly a straight line, so that secants find it within a bracket in a few steps.</summary>
    private double Root(double target)
    {
        double goal = Math.Sqrt(-2 * target);
        double below = 0;
        double above = Math.Max(1, 2 * goal);
        double belowMiss = -goal;
        double aboveMiss = Miss(above);
        while (aboveMiss < 0)
        {
            (below, belowMiss) = (above, aboveMiss);
            above *= 2;
            aboveMiss = Miss(above);
        }

        double y = below - (belowMiss * (above - below) / (aboveMiss - belowMiss));
        for (int step = 0; step < 200; step++)
        {
            double miss = Miss(y);
            double next;
            if (miss < 0)
            {
                next = Secant(y, miss, below, belowMiss);
                (below, belowMiss) = (y, miss);
            }
            else
            {
                next = Secant(y, miss, above, aboveMiss);
                (above, aboveMiss) = (y, miss);
            }

            if (!(next > below && next < above))
            {
                next = step % 2 == 0 ? below - (belowMiss * (above - below) / (aboveMiss - belowMiss)) : (below + above) / 2;
            }

            if (miss == 0 || Math.Abs(next - y) <= 2e-16 * y || above - below <= 4e-16 * above)
            {
                return miss == 0 ? y : next;
            }

            y = next;
        }

        return y;

        // Beyond the largest double no tail can be computed, and none is needed.
        double Miss(double at)
        {
            double q = FromNormalScale(at);
            return (double.IsFinite(q) ? Math.Sqrt(-2 * Math.Min(0, ByQuadrature(q))) : at) - goal;
        }

        static double Secant(double x1, double y1, double x2, double y2) => x1 - (y1 * (x1 - x2) / (y1 - y2));
    }

    /// <summary>y with y^2/2 = df/2 ln(1 + 2 rate q^2/df): ln P(Q > q) is about -y^2/2 at both ends, and for all q where df is large.</summary>
    private double NormalScale(double q)
    {
        double scaled = Math.Sqrt(2 * _extreme.Rate) * q;
        return double.IsInfinity(Df) ? scaled
            : scaled < Squarable ? Math.Sqrt(Df * Accurate.Log1p(scaled * scaled / Df))
            : Math.Sqrt(Df * ((2 * Math.Log(scaled)) - Math.Log(Df)));
    }

    private double FromNormalScale(double y)
    {
        double half = y / 2 / Df * y;
        double scaled = double.IsInfinity(Df) ? y
            : half < 300 ? Math.Sqrt(Df * Accurate.Expm1(2 * half))
            : Math.Exp(half + (0.5 * Math.Log(Df)));
        return scaled / Math.Sqrt(2 * _extreme.Rate);
    }

    private double TabledFunction(double y) => ByQuadrature(FromNormalScale(y)) + (y * y / 2);

    private double ByQuadrature(double q)
    {
        if (double.IsInfinity(Df))
        {
            return _extreme.ScaledLog(q) - (_extreme.Rate * q * q);
        }

        double y = NormalScale(q);
        int start = (int)Math.Floor(-y * y / (2 * Df) / _step);
        double reference = Exponent(start, q);
        double sum = 1;
        for (int j = start + 1; Add(j); j++)
        {
        }

        for (int j = start - 1; Add(j); j--)
        {
        }

        return _logConstant + reference + Math.Log(_step * sum);

        bool Add(int j)
        {
            double term = Math.Exp(Exponent(j, q) - reference);
            sum += term;
            return term > Negligible * sum;
        }
    }

    /// <summary>The logarithm of the integrand at node j, the constant left out.</summary>
    private double Exponent(int j, double q)
    {
        double t = j * _step;
        double u = Accurate.Expm1(2 * t);
        double w = q * Math.Exp(t);

        // From e^2t - 1 = u: -(e^2t - 1 - 2t) = ln(1 + u) - u, without cancellation.
        double weight = Math.Abs(u) < 0.5 ? Accurate.Log1pMinus(u) : (2 * t) - u;
        return (Df / 2 * weight) + _extreme.ScaledLog(w) - (_extreme.Rate * w * w);
    }

    private sealed record KnownQuantile(double Probability, double Quantile);
}
