using Campaigns.Statistics.Permutation;

namespace Campaigns.Statistics.Planning.Drawing;

/// <summary>Random numbers of the laws that an experiment follows, from one stream.</summary>
/// <remarks>Normal: the polar method, Marsaglia and Bray (1964), SIAM Review 6:260-264. Gamma: Marsaglia and Tsang (2000), ACM Transactions on Mathematical Software 26:363-372, with their boost for shapes below 1.</remarks>
internal struct Variates(ulong seed, ulong stream)
{
    private RandomNumbers _random = new(seed, stream);
    private double _spare = double.NaN;

    /// <summary>Uniform on (0, 1), never an end.</summary>
    public double Uniform() => ((_random.Next() >> 11) + 0.5) * (1.0 / (1UL << 53));

    /// <summary>Standard normal.</summary>
    public double Normal()
    {
        if (!double.IsNaN(_spare))
        {
            double spare = _spare;
            _spare = double.NaN;
            return spare;
        }

        while (true)
        {
            double x = (2 * Uniform()) - 1;
            double y = (2 * Uniform()) - 1;
            double s = (x * x) + (y * y);
            if (s is > 0 and < 1)
            {
                double scale = Math.Sqrt(-2 * Math.Log(s) / s);
                _spare = y * scale;
                return x * scale;
            }
        }
    }

    /// <summary>Chi-squared.</summary>
    /// <param name="df">Degrees of freedom; 0 gives 0.</param>
    public double ChiSquared(double df) => df == 0 ? 0 : 2 * Gamma(df / 2);

    /// <summary>Noncentral chi-squared: the square of a shifted normal, and the other degrees of freedom central.</summary>
    /// <param name="df">At least 1.</param>
    /// <param name="noncentrality">Lambda, at least 0.</param>
    public double ChiSquared(double df, double noncentrality)
    {
        double shifted = Normal() + Math.Sqrt(noncentrality);
        return (shifted * shifted) + ChiSquared(df - 1);
    }

    private double Gamma(double shape)
    {
        if (shape < 1)
        {
            return Gamma(shape + 1) * Math.Pow(Uniform(), 1 / shape);
        }

        double d = shape - (1.0 / 3);
        double c = 1 / Math.Sqrt(9 * d);
        while (true)
        {
            double x = Normal();
            double v = 1 + (c * x);
            if (v > 0)
            {
                v = v * v * v;
                if (Math.Log(Uniform()) < (0.5 * x * x) + d - (d * v) + (d * Math.Log(v)))
                {
                    return d * v;
                }
            }
        }
    }
}
