using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.TrueNulls;

/// <summary>Storey's q-values: for each tested hypothesis, the estimated false discovery rate if it and everything with a smaller p-value were rejected.</summary>
/// <remarks>
/// A description of the tested hypotheses, not a correction: an estimate of the share of true nulls enters, and nothing is held in a finite family. With p(1) &lt;= p(2) &lt;= ..., the q-value of rank k is the
/// smallest share m p(j) / j over j >= k, m counting the tested hypotheses alone, as their share does.
/// Source: J. D. Storey (2002), Journal of the Royal Statistical Society B 64:479-498; J. D. Storey and R. Tibshirani (2003), Proceedings of the National Academy of Sciences 100:9440-9445.
/// </remarks>
public static class QValues
{
    // The step-up minimum at the last rank is p itself, so its cap at 1 never acts before the share comes in.
    private static readonly BenjaminiHochberg StepUp = new();

    /// <summary>The q-values of tested hypotheses.</summary>
    /// <param name="pValues">The p-values of the tested hypotheses, in any order.</param>
    /// <param name="share">The share of true nulls among them.</param>
    /// <returns>One q-value for each p-value, in the order given, with logarithms in the tail: equal ones for equal p-values, never falling as p rises, 0 for p = 0 alone. Null where the share is not estimable: the q-values are not, either. O(m log m).</returns>
    /// <exception cref="InvalidOperationException">One of the p-values was never given.</exception>
    public static PValue[]? Of(ReadOnlySpan<PValue> pValues, TrueNullShare share)
    {
        ArgumentNullException.ThrowIfNull(share);
        if (share.Share is not { } factor)
        {
            return null;
        }

        PValue[] values = StepUp.Adjust(RankedFamily.Of(pValues, pValues.Length));
        double log = Math.Log(factor);
        foreach (ref PValue value in values.AsSpan())
        {
            value = value.Value < RankedFamily.SmallestNormal ? PValue.FromLog(value.Log + log) : PValue.FromValue(value.Value * factor);
        }

        return values;
    }
}
