using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>A correction in which hypotheses weigh differently: ranks go by p/w, and adjusted p-values are p/w times a sum of weights.</summary>
/// <remarks>
/// Weights enter only through quotients of weights, so their scale does not matter; texts speak of weights whose mean over the family is 1. They must be fixed before the data.
/// A hypothesis of weight 0 is never rejected. Sums and quotients of weights are formed with 32 digits, each adjusted p-value is rounded once. Tails go by logarithms.
/// Without weights, and with equal ones, the adjusted p-values are those of the unweighted correction.
/// </remarks>
public abstract class WeightedCorrection : Correction
{
    /// <inheritdoc/>
    public sealed override bool NeedsWeights => true;

    /// <summary>Whether no adjusted p-value may lie above that of a later rank (step-up) rather than below that of an earlier one (step-down).</summary>
    private protected abstract bool IsStepUp { get; }

    /// <summary>What p/w of a rank is multiplied with, as a sum of weights and a whole number to divide by.</summary>
    /// <param name="rank">From 0.</param>
    /// <param name="total">The weights of the whole family.</param>
    /// <param name="from">The weights from this rank on, the untested rest included.</param>
    private protected abstract (DoubleDouble Weights, int Divisor) FactorAt(int rank, DoubleDouble total, DoubleDouble from);

    /// <inheritdoc/>
    protected sealed override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        for (int rank = 0; rank < sorted.Length; rank++)
        {
            (DoubleDouble weights, int divisor) = FactorAt(rank, DoubleDouble.From((double)familySize), DoubleDouble.From((double)(familySize - rank)));
            adjusted[rank] = ExactProducts.Quotient(sorted[rank], weights.High, weights.Low, divisor);
        }

        Step(adjusted, 1);
    }

    private protected sealed override RankedFamily RanksOf(RankedFamily family) => family.ByWeight ?? family;

    private protected sealed override void AdjustRanked(RankedFamily family, Span<double> values, Span<double> tailLogs)
    {
        if (family.Weights is not { } weights)
        {
            base.AdjustRanked(family, values, tailLogs);
            return;
        }

        DoubleDouble from = DoubleDouble.From(weights.Rest);
        for (int rank = values.Length - 1; rank >= 0; rank--)
        {
            from += DoubleDouble.From(weights.AtRank(rank));
            (DoubleDouble sum, int divisor) = FactorAt(rank, weights.Total, from);
            double weight = weights.AtRank(rank);
            double log = family.Log(rank) - Math.Log(weight) + Math.Log(sum.High) - Math.Log(divisor);
            values[rank] = weight == 0 ? 1 : Math.Min(1, Value(family.Sorted[rank], rank < tailLogs.Length, weight, sum, divisor, log));
            if (rank < tailLogs.Length)
            {
                tailLogs[rank] = Math.Min(log, 0);
            }
        }

        Step(values, 1);
        Step(tailLogs, tailLogs.Length < values.Length ? Math.Log(values[tailLogs.Length]) : 0);
        FarTail.Restore(values, tailLogs);
    }

    private static double Value(double p, bool isTail, double weight, DoubleDouble sum, int divisor, double log)
    {
        // Below the normal doubles digits are missing, or everything: in the tail that is put right afterwards, but a small weight brings p/w back above it.
        if (p < RankedFamily.SmallestNormal && !isTail)
        {
            return Math.Exp(log);
        }

        DoubleDouble under = DoubleDouble.From(weight) * DoubleDouble.From((double)divisor);
        return ExactProducts.Quotient(p, sum.High, sum.Low, under.High, under.Low);
    }

    /// <summary>Makes values or their logarithms monotone.</summary>
    /// <param name="adjusted">One for each rank, or for the first ones.</param>
    /// <param name="next">What the rank after the last one has.</param>
    private void Step(Span<double> adjusted, double next)
    {
        if (IsStepUp)
        {
            Steps.Up(adjusted, next);
        }
        else
        {
            Steps.Down(adjusted);
        }
    }
}
