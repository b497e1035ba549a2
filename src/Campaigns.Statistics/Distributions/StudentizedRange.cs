namespace Campaigns.Statistics.Distributions;

/// <summary>The studentized range: the range of k independent normal variables with equal variances over an independent estimate of their standard deviation with df degrees of freedom.</summary>
/// <remarks>For k = 2 it is sqrt 2 |T| with Student's T. Method and accuracy: <see cref="StudentizedLaw"/> and <see cref="RangeOfNormals"/>; checked against quadruple-precision quadrature to 1e-300.</remarks>
public sealed class StudentizedRange : StudentizedLaw
{
    private const int CacheSize = 512;

    private static readonly StudentizedRange?[] Cache = new StudentizedRange?[CacheSize];

    private StudentizedRange(int k, double df, bool tabled)
        : base(RangeOfNormals.For(k >= 2 ? k : throw new ArgumentOutOfRangeException(nameof(k), k, "A range needs at least two variables.")), df, tabled) => K = k;

    /// <summary>Number of variables.</summary>
    public int K { get; }

    /// <summary>The law for many tails with the same k and df: they come from a table, and the object from a fixed-size table of those used lately where it is there.</summary>
    /// <param name="k">Number of variables, from 2 to a million.</param>
    /// <param name="df">Degrees of freedom, at least 1, whole or fractional; positive infinity for a known standard deviation.</param>
    /// <exception cref="ArgumentOutOfRangeException">k is below 2, or df below 1 or NaN.</exception>
    public static StudentizedRange For(int k, double df)
    {
        ref StudentizedRange? slot = ref Cache[(uint)HashOf(k, df) % CacheSize];
        StudentizedRange? law = Volatile.Read(ref slot);
        if (law is null || law.K != k || law.Df != df)
        {
            law = new StudentizedRange(k, df, tabled: true);
            Volatile.Write(ref slot, law);
        }

        return law;
    }

    /// <summary>The law for a few tails: each is a quadrature of its own.</summary>
    /// <inheritdoc cref="For"/>
    public static StudentizedRange Direct(int k, double df) => new(k, df, tabled: false);

    private static int HashOf(int k, double df) => (int)(((BitConverter.DoubleToUInt64Bits(df) + (ulong)(uint)k) * 0x9E3779B97F4A7C15) >> 40);
}
