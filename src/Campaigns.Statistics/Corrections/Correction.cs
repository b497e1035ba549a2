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
    /// <summary>Adjusted p-values of a family, logarithms included, in the order in which the family's p-values were given.</summary>
    /// <param name="family">The p-values at hand with the size of the family they belong to.</param>
    /// <returns>One adjusted p-value for each p-value given; equal p-values get equal ones, smaller ones never larger ones. Only p = 0 gives 0.</returns>
    public PValue[] Adjust(RankedFamily family)
    {
        double[] values = ArrayPool<double>.Shared.Rent(family.Count);
        double[] tailLogs = new double[family.TailCount];
        AdjustRanked(family, values.AsSpan(0, family.Count), tailLogs);
        var adjusted = new PValue[family.Count];
        ReadOnlySpan<int> order = family.Order;
        for (int rank = 0; rank < order.Length; rank++)
        {
            double value = values[rank];
            adjusted[order[rank]] =
                rank < tailLogs.Length && value < RankedFamily.TailBound ? PValue.FromValueAndLog(value, tailLogs[rank])
                : value == family.Sorted[rank] ? PValue.FromValueAndLog(value, family.Log(rank))
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

        double[] values = ArrayPool<double>.Shared.Rent(family.Count);
        AdjustRanked(family, values.AsSpan(0, family.Count), new double[family.TailCount]);
        ReadOnlySpan<int> order = family.Order;
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

    private void AdjustRanked(RankedFamily family, Span<double> values, Span<double> tailLogs)
    {
        AdjustSorted(family.Sorted, family.FamilySize, values);
        foreach (ref double value in values)
        {
            value = Math.Min(value, 1);
        }

        if (tailLogs.Length > 0)
        {
            FarTail.Logs(family, AdjustSorted, tailLogs);
            FarTail.Restore(values, tailLogs);
        }
    }
}
