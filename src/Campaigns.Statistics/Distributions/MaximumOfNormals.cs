using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Distributions;

/// <summary>The largest absolute value of standard normal variables whose correlations are products lambda_i lambda_j.</summary>
/// <remarks>
/// Given a common standard normal z the variables are independent: variable i exceeds w in absolute value with probability u_i(z) = P(Z > (w - lambda_i z)/r_i) + P(Z > (w + lambda_i z)/r_i), r_i^2 = 1 - lambda_i^2.
/// P(W > w) is the integral of phi(z) [1 - product of (1 - u_i(z))], the bracket formed by expm1 and log1p: the upper tail itself. Source: Dunnett (1955), Journal of the American Statistical Association 50:1096, in this complementary form.
/// Trapezoidal rule over z, whose integrand is even, in steps of 0.9/sqrt(1 + sum of lambda_i^2/r_i^2), at most 1/4; small tails are formed from logarithms. A quadrature costs about 5 us for each different lambda.
/// The signs of the lambdas do not matter, nor does their order.
/// </remarks>
internal sealed class MaximumOfNormals : NormalExtreme
{
    private const int TabledTo = 64;
    private const int CacheSize = 128;
    private const double Ln2 = 0.693147180559945309417232121458;
    private const double LogRootTwoPi = 0.918938533204672741780329736406;

    /// <summary>From here on 1 - u differs from one by less than can matter to a product, and u from its own logarithm's accuracy.</summary>
    private const double Tiny = 20;

    /// <summary>Where (w - lambda z)/r is below minus this, u is one.</summary>
    private const double Certain = 9;

    private static readonly MaximumOfNormals?[] Cache = new MaximumOfNormals?[CacheSize];

    private readonly double[] _given;
    private readonly double[] _lambdas;
    private readonly double[] _rests;
    private readonly int[] _times;
    private readonly double _step;

    private MaximumOfNormals(double[] sizes)
        : base(rate: 0.5, 2 * sizes.Length, TabledTo)
    {
        _given = sizes;
        _lambdas = [.. sizes.Distinct()];
        _times = [.. _lambdas.Select(l => sizes.Count(s => s == l))];
        _rests = [.. _lambdas.Select(l => Math.Sqrt((1 - l) * (1 + l)))];
        double sum = sizes.Sum(l => l * l / ((1 - l) * (1 + l)));
        _step = Math.Min(0.25, Math.Max(0.9 / Math.Sqrt(1 + sum), 0.12 * _rests.Min()));
    }

    /// <summary>The law for given lambdas, from a fixed-size table of those used lately where it is there.</summary>
    /// <param name="lambdas">At least one, each in (-1, 1).</param>
    public static MaximumOfNormals For(ReadOnlySpan<double> lambdas)
    {
        var sizes = new double[lambdas.Length];
        ulong mixed = 0;
        for (int i = 0; i < sizes.Length; i++)
        {
            sizes[i] = Math.Abs(lambdas[i]);
        }

        Array.Sort(sizes);
        foreach (double size in sizes)
        {
            mixed = (mixed + BitConverter.DoubleToUInt64Bits(size)) * 0x9E3779B97F4A7C15;
        }

        ref MaximumOfNormals? slot = ref Cache[(mixed >> 32) % CacheSize];
        MaximumOfNormals? law = Volatile.Read(ref slot);
        if (law is null || !law._given.AsSpan().SequenceEqual(sizes))
        {
            law = new MaximumOfNormals(sizes);
            Volatile.Write(ref slot, law);
        }

        return law;
    }

    /// <inheritdoc/>
    protected override double ScaledLogByQuadrature(double w)
    {
        if (_lambdas is [0.0])
        {
            return LogOfAny(Ln2 + NormalDistribution.LogUpperTail(w), _times[0]) + (w * w / 2);
        }

        double end = (_lambdas[^1] * w) + 10;
        double scale = w * w / 2;
        double sum = 0;
        for (int i = 0; i * _step <= end; i++)
        {
            double z = i * _step;
            double exponent = scale - (z * z / 2);
            sum += (i == 0 ? 1 : 2) * Math.Exp(exponent + LogOfAny(w, z));
        }

        return Math.Log(sum * _step) - LogRootTwoPi;
    }

    /// <summary>The logarithm of the probability that any variable exceeds w in absolute value, given z of at least 0.</summary>
    private double LogOfAny(double w, double z)
    {
        double least = double.PositiveInfinity;
        for (int i = 0; i < _lambdas.Length; i++)
        {
            least = Math.Min(least, (w - (_lambdas[i] * z)) / _rests[i]);
        }

        return least < -Certain ? 0 : least > Tiny ? LogOfTinySum(w, z) : Math.Log(OfAny(w, z));
    }

    private double OfAny(double w, double z)
    {
        double log = 0;
        for (int i = 0; i < _lambdas.Length; i++)
        {
            double shift = _lambdas[i] * z;
            double u = NormalDistribution.UpperTail((w - shift) / _rests[i]) + NormalDistribution.UpperTail((w + shift) / _rests[i]);
            log += _times[i] * Accurate.Log1p(-Math.Min(u, 1));
        }

        return -Accurate.Expm1(log);
    }

    private double LogOfTinySum(double w, double z)
    {
        double log = double.NegativeInfinity;
        for (int i = 0; i < _lambdas.Length; i++)
        {
            double shift = _lambdas[i] * z;
            double near = NormalDistribution.LogUpperTail((w - shift) / _rests[i]);
            double far = NormalDistribution.LogUpperTail((w + shift) / _rests[i]);
            double both = Math.Log(_times[i]) + near + Accurate.Log1p(Math.Exp(far - near));
            double larger = Math.Max(log, both);
            log = larger + Accurate.Log1p(Math.Exp(Math.Min(log, both) - larger));
        }

        return log;
    }

    /// <summary>ln(1 - (1 - p)^n) from ln p.</summary>
    private static double LogOfAny(double logP, int n) =>
        logP < -60 ? logP + Math.Log(n) : Math.Log(-Accurate.Expm1(n * Accurate.Log1mExp(Math.Min(logP, 0))));
}
