using Campaigns.Statistics.Distributions;

namespace Campaigns.Statistics.FollowUps;

/// <summary>Every group against a control by Dunnett's two-sided law, for any group sizes.</summary>
/// <remarks>
/// The statistic is Student's t of the comparison; its single-step p-value is the probability that the largest |T| of all comparisons exceeds it.
/// The correlations of plain groups are products lambda_i lambda_j with lambda_i^2 = n_i/(n_i + n_0), for which the law is exact (<see cref="DunnettLaw"/>). Within blocks they are tried for that structure (one or two treatments and balanced designs always have it); where it fails, independent numerators give Sidak's upper bound.
/// Cost: a few us a comparison where the same sizes were met before, else about 1 ms for each different size.
/// </remarks>
public sealed class Dunnett : FollowUp
{
    private const double StructureTolerance = 1e-9;

    /// <inheritdoc/>
    public override string Key => "dunnett";

    /// <inheritdoc/>
    public override string Name => "Dunnett";

    /// <inheritdoc/>
    public override string Holds => "Every group against the control: the probability of calling any group different that is equal to the control is at most the level, and all intervals hold together. Exact, except within unbalanced blocks, where Sidak's inequality keeps it on the safe side.";

    /// <inheritdoc/>
    public override string Assumes => "Independent observations; in every group a normal law with the same variance.";

    /// <inheritdoc/>
    public override string Source => "C. W. Dunnett (1955), Journal of the American Statistical Association 50:1096-1121, and (1964), Biometrics 20:482-491; Z. Sidak (1967), Journal of the American Statistical Association 62:626-633.";

    /// <inheritdoc/>
    public override bool NeedsControl => true;

    /// <inheritdoc/>
    public override IReadOnlyList<GroupComparison> Compare(GroupEstimates estimates, int? control, double confidence)
    {
        double risk = Pairing.Risk(confidence);
        if (control is not int from || from < 0 || from >= estimates.GroupCount || estimates.CountOf(from) == 0 || estimates.ComparedCount < 2)
        {
            return [];
        }

        int[] treatments = [.. Enumerable.Range(0, estimates.GroupCount).Where(i => i != from && estimates.CountOf(i) > 0)];
        double[] lambdas = estimates.WithinBlocks ? Lambdas(estimates, treatments, from) : Lambdas(estimates.CountOf(from), treatments.Select(estimates.CountOf));
        DunnettLaw law = DunnettLaw.For(lambdas, estimates.DegreesOfFreedom);
        double half = law.UpperQuantile(risk);
        return [.. treatments.Select(b => Pairing.Pooled(estimates, from, b, t => t, law.UpperTailPValue, half))];
    }

    private static double[] Lambdas(int controlCount, IEnumerable<int> counts) =>
        [.. counts.Select(n => Math.Sqrt(n / ((double)n + controlCount)))];

    /// <summary>Lambdas whose products are the correlations' sizes up to signs that a two-sided law does not see; all zero where there are none.</summary>
    private static double[] Lambdas(GroupEstimates estimates, int[] treatments, int from)
    {
        int m = treatments.Length;
        var lambdas = new double[m];
        if (m == 1)
        {
            return lambdas;
        }

        for (int i = 0; i < m; i++)
        {
            lambdas[i] = m == 2 ? Math.Sqrt(Math.Abs(Correlation(0, 1))) : FromTriple(i);
        }

        // Signs: relative to the first treatment, each lambda takes that of its correlation with it.
        for (int i = 1; i < m; i++)
        {
            lambdas[i] = Correlation(0, i) < 0 ? -lambdas[i] : lambdas[i];
        }

        return lambdas.All(l => Math.Abs(l) < 1) && (m == 2 || Fit()) ? lambdas : new double[m];

        double Correlation(int i, int j) => estimates.CorrelationOfDifferences(treatments[i], treatments[j], from);

        // lambda_i^2 = rho_ij rho_ik/rho_jk, with the pair j, k that hangs together most.
        double FromTriple(int i)
        {
            double best = 0;
            double square = 0;
            for (int j = 0; j < m; j++)
            {
                for (int k = j + 1; k < m; k++)
                {
                    if (j != i && k != i && Math.Abs(Correlation(j, k)) > best)
                    {
                        best = Math.Abs(Correlation(j, k));
                        square = Correlation(i, j) * Correlation(i, k) / Correlation(j, k);
                    }
                }
            }

            return square > 0 ? Math.Sqrt(square) : 0;
        }

        bool Fit()
        {
            for (int i = 0; i < m; i++)
            {
                for (int j = i + 1; j < m; j++)
                {
                    if (!(Math.Abs((lambdas[i] * lambdas[j]) - Correlation(i, j)) <= StructureTolerance))
                    {
                        return false;
                    }
                }
            }

            return true;
        }
    }
}
