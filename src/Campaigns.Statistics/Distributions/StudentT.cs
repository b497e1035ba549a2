using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Distributions;

/// <summary>Student's t law, by way of F: t squared with df degrees of freedom is F with (1, df).</summary>
public static class StudentT
{
    private const int CacheSize = 256;
    private const double Ln2 = 0.693147180559945309417232121458;

    private static readonly Entry?[] Cache = new Entry?[CacheSize];

    /// <summary>ln P(T > t).</summary>
    /// <param name="t">Any number.</param>
    /// <param name="df">Degrees of freedom, positive and finite, whole or fractional.</param>
    /// <returns>-ln 2 at 0; NaN for NaN. Where t squared underflows, half the law lies beyond it.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The degrees of freedom are not positive and finite.</exception>
    public static double LogUpperTail(double t, double df)
    {
        double twoSided = LogTwoSidedTail(t, df);
        return t < 0 ? Accurate.Log1mExp(twoSided - Ln2) : twoSided - Ln2;
    }

    /// <summary>P(T > t).</summary>
    /// <inheritdoc cref="LogUpperTail"/>
    public static double UpperTail(double t, double df)
    {
        double half = FDistribution.For(1, df).UpperTail(t * t) / 2;
        return t < 0 ? 0.5 + (FDistribution.For(1, df).LowerTail(t * t) / 2) : half;
    }

    /// <summary>ln P(|T| > |t|).</summary>
    /// <inheritdoc cref="LogUpperTail"/>
    public static double LogTwoSidedTail(double t, double df)
    {
        FDistribution law = FDistribution.For(1, df);
        double size = Math.Abs(t);
        const double Squarable = 1e150;
        return size <= Squarable
            ? law.LogUpperTail(size * size)
            : law.LogUpperTail(Squarable * Squarable) - (df * (Math.Log(size) - Math.Log(Squarable)));
    }

    /// <summary>The t that |T| exceeds with a given probability: the half width, in standard errors, of a confidence interval at level 1 - probability.</summary>
    /// <param name="probability">In [0, 1].</param>
    /// <param name="df">Degrees of freedom, positive and finite, whole or fractional.</param>
    /// <returns>0 for 1, positive infinity for 0.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Either is outside its range.</exception>
    /// <remarks>Keeps the results used lately: every group of a balanced experiment asks for the same one.</remarks>
    public static double TwoSidedQuantile(double probability, double df)
    {
        uint slot = (uint)HashCode.Combine(probability, df) % CacheSize;
        Entry? entry = Volatile.Read(ref Cache[slot]);
        if (entry is null || entry.Probability != probability || entry.Df != df)
        {
            entry = new Entry(probability, df, Math.Sqrt(FDistribution.For(1, df).UpperQuantile(probability)));
            Volatile.Write(ref Cache[slot], entry);
        }

        return entry.Quantile;
    }

    private sealed record Entry(double Probability, double Df, double Quantile);
}
