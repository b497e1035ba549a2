using System.Buffers;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Corrections;

/// <summary>A batch correction for many tests: one sealed class in one file, and one line in <see cref="CorrectionRegistry"/>.</summary>
/// <remarks>
/// A correction only gives adjusted p-values; whether a hypothesis is rejected is decided in one place, <see cref="SignificanceLevel.Rejects"/>.
/// A subclass writes <see cref="AdjustSorted"/> alone: sorting, the planned but untested rest of the family, tails below the range of doubles and the order of the input are dealt with once, here.
/// </remarks>
public abstract class Correction : ErrorProcedure
{
    /// <summary>Whether the procedure uses the weights of a family. Without them all hypotheses weigh 1, and it is its unweighted counterpart.</summary>
    public virtual bool NeedsWeights => false;

    /// <summary>Whether an adjusted p-value may lie below its p-value, so that a p-value above the level can survive: where the procedure estimates how many nulls are true, or weighs.</summary>
    public virtual bool MayGoBelowP => false;

    /// <summary>
    /// Whether an experiment's own p-value, as long as it is rejected, cannot change how many are: then selection by this procedure is a "simple" rule in the sense of Benjamini and Bogomolov (2014),
    /// Journal of the Royal Statistical Society B 76:297-318, as selection by any step-up or step-down procedure is.
    /// </summary>
    public virtual bool IsSimpleSelection => true;

    /// <summary>Adjusted p-values of a family, logarithms included, in the order in which the family's p-values were given.</summary>
    /// <param name="family">The p-values at hand with the size of the family they belong to.</param>
    /// <returns>One adjusted p-value for each p-value given; equal p-values get equal ones, smaller ones never larger ones. Only p = 0 gives 0.</returns>
    public PValue[] Adjust(RankedFamily family)
    {
        RankedFamily ranked = RanksOf(family);
        double[] values = ArrayPool<double>.Shared.Rent(ranked.Count);
        double[] tailLogs = new double[ranked.TailCount];
        AdjustRanked(ranked, values.AsSpan(0, ranked.Count), tailLogs);
        var adjusted = new PValue[ranked.Count];
        ReadOnlySpan<int> order = ranked.Order;
        for (int rank = 0; rank < order.Length; rank++)
        {
            double value = values[rank];
            adjusted[order[rank]] =
                rank < tailLogs.Length && value < RankedFamily.TailBound ? PValue.FromValueAndLog(value, tailLogs[rank])
                : value == ranked.Sorted[rank] ? PValue.FromValueAndLog(value, ranked.Log(rank))
                : PValue.FromValue(value);
        }

        ArrayPool<double>.Shared.Return(values);
        return adjusted;
    }

    /// <summary>Adjusted p-values as doubles, in the order in which the family's p-values were given.</summary>
    /// <param name="family">The p-values at hand with the size of the family they belong to.</param>
    /// <param name="adjusted">Takes one adjusted p-value for each p-value given; 0 only for p = 0 and below the range of doubles.</param>
    /// <exception cref="ArgumentException">The memory to fill is not as long as the p-values are many.</exception>
    public void Adjust(RankedFamily family, Span<double> adjusted)
    {
        if (adjusted.Length != family.Count)
        {
            throw new ArgumentException(
                FormattableString.Invariant($"Memory for {adjusted.Length} adjusted p-values was given for a family with {family.Count} p-values."),
                nameof(adjusted));
        }

        RankedFamily ranked = RanksOf(family);
        double[] values = ArrayPool<double>.Shared.Rent(ranked.Count);
        AdjustRanked(ranked, values.AsSpan(0, ranked.Count), new double[ranked.TailCount]);
        ReadOnlySpan<int> order = ranked.Order;
        for (int rank = 0; rank < order.Length; rank++)
        {
            adjusted[order[rank]] = values[rank];
        }

        ArrayPool<double>.Shared.Return(values);
    }

    /// <summary>The p-value up to which the procedure compares the hypothesis of a rank with its level, for pictures; decisions come from <see cref="Adjust(RankedFamily)"/> alone.</summary>
    /// <param name="rank">Rank of the p-value in its family, from 1.</param>
    /// <param name="familySize">Size of the family, at least <paramref name="rank"/>.</param>
    /// <param name="level">The level, in (0, 1).</param>
    /// <returns>The boundary, in (0, 1]; null where the procedure has none that depends on rank, family size and level alone.</returns>
    public virtual double? BoundaryAt(int rank, int familySize, double level) => null;

    /// <summary>The procedure itself, on ascending p-values.</summary>
    /// <param name="sorted">The p-values at hand, ascending, in [0, 1].</param>
    /// <param name="familySize">Size of the family, at least the number of p-values; the rest counts as p = 1.</param>
    /// <param name="adjusted">Takes the adjusted p-values, ascending; values above 1 are cut to 1 afterwards.</param>
    protected abstract void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted);

    /// <summary>The ranks that the procedure goes by.</summary>
    private protected virtual RankedFamily RanksOf(RankedFamily family) => family;

    /// <summary>The procedure as it runs on rescaled tails, where p-values that are not far down act as 1.</summary>
    private protected virtual FarTail.Procedure InTail(RankedFamily family) => AdjustSorted;

    /// <summary>Adjusted p-values by rank, and the logarithms of the family's tail.</summary>
    private protected virtual void AdjustRanked(RankedFamily family, Span<double> values, Span<double> tailLogs)
    {
        AdjustSorted(family.Sorted, family.FamilySize, values);
        foreach (ref double value in values)
        {
            value = Math.Min(value, 1);
        }

        if (tailLogs.Length > 0)
        {
            FarTail.Logs(family, InTail(family), tailLogs);
            FarTail.Restore(values, tailLogs);
        }
    }
}
