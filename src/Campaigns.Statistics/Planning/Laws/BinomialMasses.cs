namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The binomial law as masses over a band of counts.</summary>
internal static class BinomialMasses
{
    /// <summary>Fills the masses of a number of successes.</summary>
    /// <param name="n">Trials; at least 0.</param>
    /// <param name="success">Probability of success.</param>
    /// <param name="failure">Its complement, to its own accuracy.</param>
    /// <param name="negligible">Masses at most this are left out on both sides.</param>
    /// <param name="masses">Takes the masses at their counts; zero on entry, at least n + 1 long.</param>
    /// <returns>The band of counts that was filled, both ends included.</returns>
    /// <remarks>Ratios of neighbours outwards from the mode, then divided by their sum: no gamma functions, no cancellation; the relative error grows by a unit in the last place a step.</remarks>
    public static (int Low, int High) Fill(int n, double success, double failure, double negligible, Span<double> masses)
    {
        int mode = failure <= 0 ? n : success <= 0 ? 0 : (int)Math.Min(n, Math.Floor((n + 1.0) * success));
        (int low, int high) = (mode, mode);
        double sum = 1;
        double odds = success / failure;
        masses[mode] = 1;
        double mass = 1;
        for (int k = mode + 1; k <= n && failure > 0; k++)
        {
            mass *= (n - k + 1) / (double)k * odds;
            if (mass <= negligible)
            {
                break;
            }

            (masses[k], high) = (mass, k);
            sum += mass;
        }

        mass = 1;
        for (int k = mode - 1; k >= 0 && failure > 0; k--)
        {
            mass *= (k + 1) / ((n - k) * odds);
            if (mass <= negligible)
            {
                break;
            }

            (masses[k], low) = (mass, k);
            sum += mass;
        }

        foreach (ref double each in masses[low..(high + 1)])
        {
            each /= sum;
        }

        return (low, high);
    }
}
