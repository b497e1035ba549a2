using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Distributions;

/// <summary>One tail of the noncentral F law as the sum over j of P_j times a tail of the beta law, P_j the Poisson probabilities with mean lambda/2.</summary>
/// <remarks>
/// With a = df2/2, b = df1/2, y = df1 f/(df2 + df1 f), x = 1 - y: lower = sum of P_j I_y(b + j, a), upper = sum of P_j I_x(a, b + j); I_y(b + j, a) = I_y(b + j + 1, a) + T_j and I_x(a, b + j + 1) = I_x(a, b + j) + T_j with T_j = y^(b+j) x^a/((b + j) B(b + j, a)).
/// Up to <see cref="MostByRecurrence"/> the terms follow from one beta tail by the recurrence in its adding direction: downward from the far end for the lower tail, upward from j = 0 for the upper. The sum ends when the product P_j I_j no longer counts, not when P_j alone does: in the far upper tail the products peak far above lambda/2.
/// Beyond, every term is a beta tail of its own, and the sum over j is taken at a stride of about a third of the terms' width or less: they are smooth and nearly bell-shaped in j, so the sum of every s-th term times s differs from the whole sum by less than 1e-30 (Poisson's summation formula). That bounds the cost for any lambda.
/// Products are scaled, so that sums below the range of doubles keep their logarithm.
/// </remarks>
internal sealed class PoissonMixture(double df1, double df2, double noncentrality)
{
    private const double MostByRecurrence = 128;
    private const int MostSteps = 512;

    /// <summary>Below this mean the Poisson law is 0, for all that a double can tell.</summary>
    private const double LeastMean = 1e-40;

    /// <summary>Above this mean the Poisson law is its mean, for all that a double can tell.</summary>
    private const double GreatestMean = 1e24;

    /// <summary>More degrees of freedom than these change nothing that a double could tell.</summary>
    private const double MostDegreesOfFreedom = 1e25;

    /// <summary>Where y is below this, the first term is the lower tail.</summary>
    private const double LeastRatio = 1e-60;
    private const double Negligible = 1e-18;

    /// <summary>Poisson probabilities fall so fast beyond their mean that from one this small, over the largest, all together are below 1e-18.</summary>
    private const double LeastWeight = 1e-20;
    private const double Large = 1e100;
    private const double LogLarge = 230.25850929940456840179914546844;

    private readonly double _a = df2 / 2;
    private readonly double _b = df1 / 2;
    private readonly double _mean = noncentrality / 2;

    /// <summary>A tail at f.</summary>
    /// <param name="f">Positive and finite.</param>
    /// <param name="isUpper">Which one.</param>
    public MixtureTail Tail(double f, bool isUpper)
    {
        if (_mean <= LeastMean || _mean >= GreatestMean)
        {
            return Only(_mean <= LeastMean ? 0 : _mean, f, 0, isUpper);
        }

        if (!isUpper && f * df1 < LeastRatio * df2)
        {
            // Each further term is smaller by that ratio, whatever the mean.
            return Only(0, f, -_mean, isUpper);
        }

        double w = df2 + (df1 * f);
        double y = double.IsFinite(w) ? df1 * f / w : 1;
        if (_mean <= MostByRecurrence)
        {
            // Where y is next to nothing a single step down would leave the range of doubles.
            MixtureTail? tail = isUpper ? Upward(f, y) : y > Negligible ? Downward(f, y) : null;
            if (tail is { } found)
            {
                return found;
            }
        }

        return ByStrides(f, isUpper);
    }

    /// <summary>The tail where one term is all of it.</summary>
    private MixtureTail Only(double j, double f, double logWeight, bool isUpper)
    {
        BetaTail only = At(f, j, isUpper);
        return new MixtureTail(logWeight + only.Log, double.IsNegativeInfinity(only.LogStep) ? 0 : Math.Exp(only.LogStep - only.Log));
    }

    /// <summary>The lower tail: from a j beyond which the Poisson law holds less than 1e-18 of what it holds below, down to 0. As the beta tails fall with j, what is left out is at most that part of the sum.</summary>
    private MixtureTail Downward(double f, double y)
    {
        double top = Math.Floor(_mean);
        double scale = LogPoisson(top);
        double weight = 1;
        while (weight > LeastWeight)
        {
            top++;
            weight *= _mean / top;
        }

        BetaTail start = At(f, top, isUpper: false);
        var sum = new ScaledSum(scale + Math.Log(weight) + start.Log, Math.Exp(start.LogStep - start.Log));
        for (double j = top; j > 0 && !sum.IsComplete; j--)
        {
            double ratio = j / _mean;
            double step = sum.Step * ratio * ((_b + j) / (y * (_a + _b + j - 1)));
            sum.Add((sum.Term * ratio) + step, step);
        }

        return sum.Result;
    }

    /// <summary>The upper tail: from 0 up until nothing is added; null where that takes too long.</summary>
    private MixtureTail? Upward(double f, double y)
    {
        BetaTail start = At(f, 0, isUpper: true);
        var sum = new ScaledSum(start.Log - _mean, Math.Exp(start.LogStep - start.Log));
        for (int j = 0; j < MostSteps; j++)
        {
            double ratio = _mean / (j + 1);
            double step = sum.Step * ratio * (y * ((_a + _b + j) / (_b + j + 1)));
            sum.Add((sum.Term + sum.Step) * ratio, step);
            if (sum.IsComplete)
            {
                return sum.Result;
            }
        }

        return null;
    }

    /// <summary>Either tail at any mean: from the largest term out to both sides.</summary>
    /// <remarks>The logarithm of a term bends at least as much as that of the Poisson law, 1/j: from a peak at 128 on, the term at 0 is below e^-128 of it, and four strides or more make up the narrowest half of a peak.</remarks>
    private MixtureTail ByStrides(double f, bool isUpper)
    {
        double peak = Peak(f, isUpper);
        double stride = peak < MostByRecurrence ? 1 : Math.Floor(Math.Sqrt(peak / 2) / 2);
        double scale = LogTerm(f, peak, isUpper);
        if (double.IsNegativeInfinity(scale))
        {
            return new MixtureTail(scale, 0);
        }

        double sum = 0;
        double steps = 0;
        foreach (double direction in (ReadOnlySpan<double>)[1, -1])
        {
            double before = double.PositiveInfinity;
            for (double j = direction > 0 ? peak : peak - stride; j >= 0; j += direction * stride)
            {
                BetaTail at = At(f, j, isUpper);
                double logPoisson = LogPoisson(j);
                double term = Math.Exp(logPoisson + at.Log - scale);
                sum += term;
                steps += Math.Exp(logPoisson + at.LogStep - scale);
                if (term <= Negligible * sum && term <= before)
                {
                    break;
                }

                before = term;
            }
        }

        return new MixtureTail(scale + Math.Log(sum * stride), steps / sum);
    }

    /// <summary>A whole j within a stride of the largest term, found by steps that double while they climb and shrink where they do not.</summary>
    private double Peak(double f, bool isUpper)
    {
        double at = Math.Floor(_mean);
        double best = LogTerm(f, at, isUpper);
        double reach = Math.Max(1, Math.Floor(Math.Sqrt(_mean)));
        while (true)
        {
            bool climbed = false;
            foreach (double direction in (ReadOnlySpan<double>)[1, -1])
            {
                double next = Math.Max(0, at + (direction * reach));
                double value = LogTerm(f, next, isUpper);
                if (value > best)
                {
                    (at, best, climbed) = (next, value, true);
                    break;
                }
            }

            if (!climbed && reach <= Math.Max(1, Math.Sqrt(at) / 2))
            {
                return at;
            }

            reach = climbed ? reach * 2 : Math.Max(1, Math.Floor(reach / 2));
        }
    }

    private double LogTerm(double f, double j, bool isUpper) => LogPoisson(j) + At(f, j, isUpper).Log;

    /// <summary>ln P_j, for real j too: by the deviance from the mean and Stirling's error, so that large j lose nothing (Loader 2000).</summary>
    private double LogPoisson(double j) =>
        j == 0 ? -_mean : (j * Accurate.Log1pMinus((_mean - j) / j)) - StirlingError.Of(j) - (0.5 * Math.Log(2 * Math.PI * j));

    /// <summary>The beta tail of a term is the F tail with df1 + 2j degrees of freedom at df1 f/(df1 + 2j), and T_j is that f times its density over b + j.</summary>
    private BetaTail At(double f, double j, bool isUpper)
    {
        double df = df1 + (2 * j);
        double at = f * (df1 / df);
        if (at == 0)
        {
            return new BetaTail(isUpper ? 0 : double.NegativeInfinity, double.NegativeInfinity);
        }

        var law = new FDistribution(Math.Min(df, MostDegreesOfFreedom), df2);
        double log = isUpper ? law.LogUpperTail(at) : law.LogLowerTail(at);
        return new BetaTail(log, law.LogDensity(at) + Math.Log(at) - Math.Log(_b + j));
    }

    /// <summary>ln of the beta tail of a term, and ln T_j.</summary>
    private readonly record struct BetaTail(double Log, double LogStep);

    /// <summary>A sum of P_j I_j and beside it of P_j T_j, both over e^scale.</summary>
    private struct ScaledSum(double scale, double step)
    {
        private double _scale = scale;
        private double _sum = 1;
        private double _steps = step;
        private double _ratio = double.PositiveInfinity;

        public double Term { get; private set; } = 1;

        public double Step { get; private set; } = step;

        /// <summary>Terms fall ever faster beyond their peak, so what follows is at most a geometric series.</summary>
        public readonly bool IsComplete => _ratio < 1 && Term * _ratio <= Negligible * _sum * (1 - _ratio);

        public readonly MixtureTail Result => new(_scale + Math.Log(_sum), _steps / _sum);

        public void Add(double term, double step)
        {
            _ratio = term / Term;
            Term = term;
            Step = step;
            _sum += term;
            _steps += step;
            if (term > Large)
            {
                Term /= Large;
                Step /= Large;
                _sum /= Large;
                _steps /= Large;
                _scale += LogLarge;
            }
        }
    }
}
