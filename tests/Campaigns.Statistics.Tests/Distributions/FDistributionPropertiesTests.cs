using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.GroupTests;
using FsCheck.Xunit;

namespace Campaigns.Statistics.Tests.Distributions;

[Properties(Replay = "(20261203,7919)", MaxTest = 1000)]
public sealed class FDistributionPropertiesTests
{
    [Property]
    public void The_upper_tail_is_the_lower_tail_of_the_reciprocal_law(int seed)
    {
        (double df1, double df2, double f) = Draw(seed);
        double upper = new FDistribution(df1, df2).LogUpperTail(f);
        double lower = new FDistribution(df2, df1).LogLowerTail(1 / f);

        // 1/f is off by half a unit in the last place, which the tail multiplies by at most f times its hazard, below (df1 + df2)/2.
        double tolerance = 1e-12 + ((df1 + df2) / 2 * 2.3e-16 / Math.Max(1e-300, Math.Abs(upper)));
        Assert.True(upper > -1e-9 || Relative.Error(lower, upper) <= tolerance, FormattableString.Invariant($"({df1:R}, {df2:R}) at {f:R}: {upper:R} against {lower:R}."));
    }

    [Property]
    public void The_quantile_of_a_tail_is_where_the_tail_was_taken(int seed)
    {
        (double df1, double df2, double f) = Draw(seed);
        var law = new FDistribution(df1, df2);
        double logUpper = law.LogUpperTail(f);
        double logLower = law.LogLowerTail(f);
        double back = logUpper < -0.69 ? law.UpperQuantileOfLog(logUpper) : law.LowerQuantile(Math.Exp(logLower));
        if (logUpper < -0.69 || logLower > -700)
        {
            // A logarithm rounded to a double moves f by its own unit in the last place over the slope of the tail.
            double slope = Math.Exp(law.LogDensity(f) + Math.Log(f) - Math.Min(logUpper, logLower));
            double tolerance = 1e-13 + (Math.Abs(Math.Min(logUpper, logLower)) * 1e-14 / slope);
            Relative.AssertNear(f, back, tolerance, FormattableString.Invariant($"({df1:R}, {df2:R})"));
        }
    }

    [Property]
    public void Both_tails_add_to_one_and_fall_and_rise(int seed)
    {
        (double df1, double df2, double f) = Draw(seed);
        var law = new FDistribution(df1, df2);
        Assert.Equal(1, law.UpperTail(f) + law.LowerTail(f), 1e-14);
        Assert.True(law.LogUpperTail(f * 1.001) <= law.LogUpperTail(f));
        Assert.True(law.LogLowerTail(f * 1.001) >= law.LogLowerTail(f));
    }

    [Property]
    public void The_p_value_with_its_logarithm_is_the_upper_tail(int seed)
    {
        (double df1, double df2, double f) = Draw(seed);
        var law = new FDistribution(df1, df2);
        Assert.Equal(law.UpperTail(f), law.UpperTailPValue(f).Value);
        Assert.Equal(law.LogUpperTail(f), law.UpperTailPValue(f).Log);
    }

    [Property]
    public void The_density_is_the_slope_of_the_tail(int seed)
    {
        (double df1, double df2, double f) = Draw(seed);
        var law = new FDistribution(df1, df2);
        double logTail = law.LogUpperTail(f);
        if (logTail is > -600 and < -0.01)
        {
            // Central difference in ln f of ln P: error of order h^2 and eps/h, both times the degrees of freedom.
            const double H = 1e-5;
            double slope = (law.LogUpperTail(f * Math.Exp(-H)) - law.LogUpperTail(f * Math.Exp(H))) / (2 * H);
            double expected = Math.Exp(law.LogDensity(f) + Math.Log(f) - logTail);
            Assert.True(Math.Abs(slope - expected) <= 1e-7 * (1 + expected) * (1 + ((df1 + df2) / 100)), FormattableString.Invariant($"({df1:R}, {df2:R}) at {f:R}: {slope:R} against {expected:R}."));
        }
    }

    /// <summary>Degrees of freedom 0.5 to 1000, whole and fractional; f from 1e-4 to 1e4, half of them near 1.</summary>
    private static (double Df1, double Df2, double F) Draw(int seed)
    {
        var random = new Random(seed);
        double df1 = 0.5 * Math.Pow(2000, random.NextDouble());
        double df2 = 0.5 * Math.Pow(2000, random.NextDouble());
        if (random.Next(2) == 0)
        {
            (df1, df2) = (Math.Ceiling(df1), Math.Ceiling(df2));
        }

        return (df1, df2, Math.Pow(10, ((random.NextDouble() * 8) - 4) / (random.Next(2) == 0 ? 1 : 8)));
    }
}
