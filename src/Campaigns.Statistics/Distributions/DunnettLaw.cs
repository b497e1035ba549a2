namespace Campaigns.Statistics.Distributions;

/// <summary>The largest |T_i| of comparisons of treatments with one control: Student variables with a common estimate of the standard deviation and correlations lambda_i lambda_j.</summary>
/// <remarks>
/// For groups of n_i values and a control of n_0, lambda_i = sqrt(n_i/(n_i + n_0)), for any sizes. All lambdas zero give independent numerators, Sidak's (1967) upper bound for any correlations.
/// Method and accuracy: <see cref="StudentizedLaw"/> and <see cref="MaximumOfNormals"/>.
/// </remarks>
public sealed class DunnettLaw : StudentizedLaw
{
    private const int CacheSize = 128;

    private static readonly DunnettLaw?[] Cache = new DunnettLaw?[CacheSize];

    private readonly MaximumOfNormals _maximum;

    private DunnettLaw(MaximumOfNormals maximum, double df)
        : base(maximum, df, tabled: false) => _maximum = maximum;

    /// <summary>The law, from a fixed-size table of those used lately where it is there.</summary>
    /// <param name="lambdas">One a treatment, in any order, each in (-1, 1); signs do not matter.</param>
    /// <param name="df">Degrees of freedom, at least 1, whole or fractional; positive infinity for a known standard deviation.</param>
    /// <exception cref="ArgumentException">No lambda, or one outside (-1, 1).</exception>
    /// <exception cref="ArgumentOutOfRangeException">df is below 1 or NaN.</exception>
    public static DunnettLaw For(ReadOnlySpan<double> lambdas, double df)
    {
        if (lambdas.IsEmpty)
        {
            throw new ArgumentException("There is no treatment to compare.", nameof(lambdas));
        }

        foreach (double lambda in lambdas)
        {
            if (!(Math.Abs(lambda) < 1))
            {
                throw new ArgumentException(FormattableString.Invariant($"A lambda lies between -1 and 1, both excluded; one is {lambda:R}."), nameof(lambdas));
            }
        }

        MaximumOfNormals maximum = MaximumOfNormals.For(lambdas);
        ref DunnettLaw? slot = ref Cache[(uint)HashCode.Combine(maximum, df) % CacheSize];
        DunnettLaw? law = Volatile.Read(ref slot);
        if (law is null || law._maximum != maximum || law.Df != df)
        {
            law = new DunnettLaw(maximum, df);
            Volatile.Write(ref slot, law);
        }

        return law;
    }
}
