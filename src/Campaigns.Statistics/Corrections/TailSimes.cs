namespace Campaigns.Statistics.Corrections;

/// <summary>The Simes p-values of all tails of a family: of its s largest p-values, for every s.</summary>
/// <remarks>
/// a(s) = min over j of s p(m - s + j) / j. With i = m - s p-values left out, it is s times the least slope from the point (i, 0) to the points (k, p(k)) with k > i. If of two points
/// the further one has the lesser slope from i, it has so from every larger i: so the best k never falls as i grows, and halving finds all in n log n comparisons, each of two exact products.
/// </remarks>
internal static class TailSimes
{
    /// <summary>Fills in the Simes p-values of the tails that hold at least one tested hypothesis.</summary>
    /// <param name="sorted">The p-values at hand, ascending.</param>
    /// <param name="familySize">Size of the family; the rest counts as p = 1, which caps every tail at 1 and otherwise changes none.</param>
    /// <param name="tails">Takes at i the Simes p-value of the family without its i smallest p-values, rounded once; non-increasing in the number of p-values, so non-decreasing in i.</param>
    public static void Fill(ReadOnlySpan<double> sorted, int familySize, Span<double> tails) =>
        Halve(sorted, familySize, tails, 0, sorted.Length - 1, 0, sorted.Length - 1);

    private static void Halve(ReadOnlySpan<double> sorted, int familySize, Span<double> tails, int first, int last, int lowest, int highest)
    {
        while (first <= last)
        {
            int i = first + ((last - first) >> 1);
            int best = Best(sorted, i, Math.Max(i, lowest), highest);
            tails[i] = Math.Min(1, ExactProducts.Quotient(sorted[best], familySize - i, 0, best - i + 1));
            Halve(sorted, familySize, tails, first, i - 1, lowest, best);
            (first, lowest) = (i + 1, best);
        }
    }

    /// <summary>The position, counted from 0, with the least slope p / (position - i + 1).</summary>
    private static int Best(ReadOnlySpan<double> sorted, int i, int from, int to)
    {
        int best = from;
        double bestP = sorted[from];
        double bestDistance = from - i + 1;
        for (int k = from + 1; k <= to; k++)
        {
            double distance = k - i + 1;
            if (ExactProducts.IsLess(sorted[k], bestDistance, bestP, distance))
            {
                (best, bestP, bestDistance) = (k, sorted[k], distance);
            }
        }

        return best;
    }
}
