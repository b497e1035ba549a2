using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.TrueNulls;

/// <summary>An estimate of the share of true nulls among tested hypotheses, from the p-values that lie where those of false nulls are few.</summary>
/// <param name="Share">The estimate, in (0, 1]; null where there is none.</param>
/// <param name="Lambda">The p-value above which p-values were counted; for the smoother, at which its curve was read. Null where there were no p-values.</param>
/// <param name="Method">How it was estimated, in words for people.</param>
/// <param name="Reason">Why there is no estimate, in a sentence; null where there is one.</param>
/// <remarks>
/// With W the number of p-values above lambda among m, the share is W / (m (1 - lambda)), at most 1: true nulls of independent tests have uniform p-values. Not an upper bound, and not valid
/// where p-values depend strongly on each other; fewer than about 20 of them tell little.
/// Hypotheses that were planned and not tested are left out. Whether their nulls are true is what a test would have told; counted as p = 1, as a correction does to hold its error rate, they would push
/// the estimate up by as much as was left undone.
/// Sources: J. D. Storey (2002), Journal of the Royal Statistical Society B 64:479-498; J. D. Storey and R. Tibshirani (2003), Proceedings of the National Academy of Sciences 100:9440-9445;
/// J. D. Storey, J. E. Taylor and D. Siegmund (2004), Journal of the Royal Statistical Society B 66:187-205.
/// </remarks>
public sealed record TrueNullShare(double? Share, double? Lambda, string Method, string? Reason)
{
    /// <summary>Below this many p-values an estimate is hardly one.</summary>
    public const int FewPValues = 20;

    /// <summary>The values of lambda that are looked at: k / 20 for k from 1 to 19.</summary>
    private const int GridPoints = 19;
    private const int GridParts = GridPoints + 1;

    /// <summary>The value at 0.95 of the cubic smoothing spline with three degrees of freedom through 19 equally spaced points, as their weights; 400-bit arithmetic, table storey_smoother_constants.csv.</summary>
    private static readonly double[] SmootherWeights =
    [
        -0.0024931382208653891, -0.006528433558097119, -0.010535252422946586, -0.014436548459468549, -0.018071642694579535,
        -0.021165414806099261, -0.023299762795830781, -0.02388955654728693, -0.022166441729901374, -0.017175168254057904,
        -0.0077885578145879368, 0.0072513135149453196, 0.029256809306817986, 0.059473401999023769, 0.098903042672934816,
        0.14806256193180317, 0.20666945491715721, 0.27325135723606231, 0.34468197572497677,
    ];

    /// <summary>The share by one fixed lambda.</summary>
    /// <param name="pValues">The p-values of the tested hypotheses, in any order.</param>
    /// <param name="lambda">In (0, 1).</param>
    /// <returns>Without an estimate where there is no p-value, and where none lies above lambda.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Lambda is not between 0 and 1.</exception>
    public static TrueNullShare Estimate(ReadOnlySpan<PValue> pValues, double lambda = 0.5)
    {
        if (!(lambda > 0 && lambda < 1))
        {
            throw new ArgumentOutOfRangeException(nameof(lambda), lambda, "Lambda lies between 0 and 1, both excluded.");
        }

        string method = FormattableString.Invariant($"lambda {lambda:R}");
        return pValues.IsEmpty ? Without(method) : Counted(CountAbove(pValues, lambda), pValues.Length * (1 - lambda), lambda, method);
    }

    /// <summary>The share by the lambda that Storey's bootstrap would choose with endlessly many draws: smallest mean squared error about the least of the estimates.</summary>
    /// <param name="pValues">The p-values of the tested hypotheses, in any order.</param>
    /// <returns>Without an estimate where there is no p-value, and where none lies above the lambda chosen. No random numbers.</returns>
    /// <remarks>
    /// Drawn with replacement, W is binomial, so the expected squared distance from the least estimate c is (W/m)(1 - W/m) / (m (1 - lambda)^2) + (share - c)^2. Times m^2/400 it is a
    /// fraction of whole numbers, and these are compared, so that ties go to the smallest lambda as they should. Exact for up to a thousand million p-values.
    /// </remarks>
    public static TrueNullShare EstimateByBootstrap(ReadOnlySpan<PValue> pValues)
    {
        const string Method = "bootstrap choice of lambda";
        if (pValues.IsEmpty)
        {
            return Without(Method);
        }

        int[] above = CountAboveGrid(pValues);
        int least = 1;
        for (int k = 2; k <= GridPoints; k++)
        {
            least = (long)above[k] * (GridParts - least) < (long)above[least] * (GridParts - k) ? k : least;
        }

        int best = 1;
        for (int k = 2; k <= GridPoints; k++)
        {
            best = Error(k) * Square(GridParts - best) < Error(best) * Square(GridParts - k) ? k : best;
        }

        return Counted(GridParts * (double)above[best], (double)pValues.Length * (GridParts - best), best / (double)GridParts, Method);

        // The expected squared distance times m^3 (20 - k)^2 (20 - least)^2 / 400.
        Int128 Error(int k)
        {
            Int128 count = above[k];
            Int128 m = above[0];
            return (count * (m - count) * Square(GridParts - least)) + (m * Square((count * (GridParts - least)) - ((Int128)above[least] * (GridParts - k))));
        }
    }

    /// <summary>The share by a cubic smoothing spline with three degrees of freedom through the estimates at lambda = 0.05, 0.10 ... 0.95, read at 0.95.</summary>
    /// <param name="pValues">The p-values of the tested hypotheses, in any order.</param>
    /// <returns>Without an estimate where there is no p-value, and where the curve does not end above 0.</returns>
    /// <remarks>Grid and degrees of freedom are fixed, so the value is a weighted sum of the 19 estimates.</remarks>
    public static TrueNullShare EstimateBySmoother(ReadOnlySpan<PValue> pValues)
    {
        const string Method = "smoothing spline over lambda";
        if (pValues.IsEmpty)
        {
            return Without(Method);
        }

        int[] above = CountAboveGrid(pValues);
        double sum = 0;
        for (int k = 1; k <= GridPoints; k++)
        {
            sum += SmootherWeights[k - 1] * (GridParts * (double)above[k] / ((double)pValues.Length * (GridParts - k)));
        }

        double end = GridPoints / (double)GridParts;
        return sum > 0
            ? new TrueNullShare(Math.Min(1, sum), end, Method, null)
            : new TrueNullShare(null, end, Method, "The share of true nulls cannot be estimated: the curve through the estimates does not end above 0.");
    }

    private static TrueNullShare Without(string method) => new(null, null, method, "The share of true nulls cannot be estimated: there is no p-value.");

    private static TrueNullShare Counted(double above, double expected, double lambda, string method) =>
        above > 0
            ? new TrueNullShare(Math.Min(1, above / expected), lambda, method, null)
            : new TrueNullShare(
                null,
                lambda,
                method,
                FormattableString.Invariant($"The share of true nulls cannot be estimated: no p-value lies above {lambda:R}, which would make it 0 and every q-value 0."));

    private static int CountAbove(ReadOnlySpan<PValue> pValues, double lambda)
    {
        int count = 0;
        foreach (PValue p in pValues)
        {
            count += p.Value > lambda ? 1 : 0;
        }

        return count;
    }

    /// <summary>At k the number of p-values above k/20; at 0 all of them.</summary>
    private static int[] CountAboveGrid(ReadOnlySpan<PValue> pValues)
    {
        int[] above = new int[GridParts];
        foreach (PValue p in pValues)
        {
            // The largest grid point below p: the quotients k/20.0 decide, not the product.
            int k = Math.Clamp((int)(p.Value * GridParts), 0, GridPoints);
            k -= k > 0 && p.Value <= k / (double)GridParts ? 1 : 0;
            k += k < GridPoints && p.Value > (k + 1) / (double)GridParts ? 1 : 0;
            above[k]++;
        }

        for (int k = GridPoints - 1; k >= 0; k--)
        {
            above[k] += above[k + 1];
        }

        return above;
    }

    private static Int128 Square(Int128 value) => value * value;
}
