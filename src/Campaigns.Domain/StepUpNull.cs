namespace Campaigns.Domain;

/// <summary>The law of the number of survivors of a linear step-up procedure (Benjamini and Hochberg's, or Benjamini and Yekutieli's) if nothing is real and the tests are independent: every survivor is then false.</summary>
/// <remarks>
/// The k smallest of n uniform p-values survive if k is the largest rank with p(k) at most k s. For n s at most 1, P(k survive) is C(n, k) (k s)^k (1 - k s)^(n - k) (1 - n s) / (1 - k s), whose sum over k is 1 by Abel's
/// identity, and the mean is n s times the sum of (j + 1) (n - 1) (n - 2) ... (n - j) s^j over j from 0.
/// Sources: H. Finner and M. Roters (2002), Annals of Statistics 30:220-238; the ballot theorem of H. E. Daniels (1945), Proceedings of the Royal Society A 183:405-435.
/// </remarks>
public static class StepUpNull
{
    /// <summary>The probability that exactly k hypotheses survive.</summary>
    /// <param name="k">How many; 0 or more.</param>
    /// <param name="tests">True nulls tested, independent; the rest of a larger family counts as p = 1.</param>
    /// <param name="step">The boundary of rank 1, of which rank k has k times as much: level over family size for Benjamini and Hochberg's procedure; positive, at most 1 over <paramref name="tests"/>.</param>
    /// <returns>In [0, 1]; 0 above the number of tests. Within 10^-12, relative.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A negative count, or a step outside its range.</exception>
    public static double Exactly(int k, int tests, double step)
    {
        Check(tests, step);
        ArgumentOutOfRangeException.ThrowIfNegative(k);
        double share = k * step;
        return k > tests ? 0
            : k == 0 ? 1 - AtLeastOne(tests, step)
            : k == tests ? Math.Pow(share, k)
            : BinomialTerm.Of(k, tests, share) * (1 - AtLeastOne(tests, step)) / (1 - share);
    }

    /// <summary>The probability that at least one survives: tests times step, exactly.</summary>
    /// <inheritdoc cref="Exactly"/>
    public static double AtLeastOne(int tests, double step)
    {
        Check(tests, step);
        return Math.Min(1, tests * step);
    }

    /// <summary>The expected number of survivors.</summary>
    /// <returns>At least <see cref="AtLeastOne"/>. Within 10^-13, relative; time in proportion to the terms that count, at most to the tests.</returns>
    /// <inheritdoc cref="Exactly"/>
    public static double Expected(int tests, double step)
    {
        Check(tests, step);
        double sum = 0;
        double product = 1;
        for (int j = 0; j < tests && product * (j + 1) > sum * 1e-18; j++)
        {
            sum += product * (j + 1);
            product *= (tests - 1 - j) * step;
        }

        return tests * step * sum;
    }

    private static void Check(int tests, double step)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(tests);
        // A level just below 1 over a family size may round up.
        if (!(step > 0 && tests * step <= 1 + 1e-15))
        {
            throw new ArgumentOutOfRangeException(nameof(step), step, "A step lies above 0 and is at most 1 over the number of tests.");
        }
    }
}
