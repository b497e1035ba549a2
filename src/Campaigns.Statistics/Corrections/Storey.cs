namespace Campaigns.Statistics.Corrections;

/// <summary>The adaptive step-up correction of Storey, Taylor and Siegmund for the false discovery rate, in the form that holds it in finite families.</summary>
/// <remarks>
/// With W the number of p-values above lambda = 1/2 in the family (the untested among them), m0 = (W + 1)/(1 - lambda) estimates the number of true nulls, not capped at m.
/// The procedure rejects p-values up to the largest t, at most lambda, at which m0 t / R(t) is at most the level, R(t) counting p-values up to t. So the adjusted p-value of rank i is the
/// smallest m0 p(j) / j over j >= i with p(j) at most lambda, at most 1, and 1 for every p-value above lambda: those take no part in the step-up. Each quotient is rounded once.
/// </remarks>
public sealed class Storey : Correction
{
    /// <summary>P-values above it count as those of true nulls and never survive.</summary>
    public const double Lambda = 0.5;

    /// <summary>1 / (1 - lambda).</summary>
    private const double Scale = 2;

    /// <inheritdoc/>
    public override string Key => "storey";

    /// <inheritdoc/>
    public override string Name => "Storey, with lambda 0.5";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Independent;

    /// <inheritdoc/>
    public override string Guarantee =>
        "The expected share of false survivors among all survivors is at most the level if the experiments are independent; where most nulls look false, an experiment with p above the level, up to 0.5, can survive.";

    /// <inheritdoc/>
    public override string Source => "J. D. Storey, J. E. Taylor and D. Siegmund (2004), Journal of the Royal Statistical Society B 66:187-205";

    /// <inheritdoc/>
    public override bool MayGoBelowP => true;

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted) =>
        StepUp(sorted, familySize - CountUpTo(sorted, Lambda), adjusted);

    /// <summary>In a rescaled tail nothing tells any more how many p-values lie above lambda: the family does.</summary>
    private protected override FarTail.Procedure InTail(RankedFamily family)
    {
        int above = family.FamilySize - CountUpTo(family.Sorted, Lambda);
        return (sorted, _, adjusted) => StepUp(sorted, above, adjusted);
    }

    private static void StepUp(ReadOnlySpan<double> sorted, int above, Span<double> adjusted)
    {
        double trueNulls = Scale * (above + 1.0);
        for (int k = 0; k < sorted.Length; k++)
        {
            adjusted[k] = sorted[k] <= Lambda ? ExactProducts.Quotient(sorted[k], trueNulls, 0, k + 1) : 1;
        }

        Steps.Up(adjusted);
    }

    private static int CountUpTo(ReadOnlySpan<double> sorted, double bound)
    {
        int count = 0;
        while (count < sorted.Length && sorted[count] <= bound)
        {
            count++;
        }

        return count;
    }
}
