using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Units;

/// <summary>How the variation inside the groups of an experiment splits into that between specimens and that between readings of one specimen: the nested analysis of variance.</summary>
/// <param name="SpecimenCount">Specimens, b; a reading without one counts as its own.</param>
/// <param name="ReadingCount">Readings, N.</param>
/// <param name="UnmarkedCount">Readings for which no specimen is recorded.</param>
/// <param name="FewestReadings">Readings of the specimen that has the fewest.</param>
/// <param name="MostReadings">Readings of the specimen that has the most.</param>
/// <param name="BetweenSpecimens">Between the specimen means inside groups: b - k degrees of freedom, each mean weighted by its readings.</param>
/// <param name="WithinSpecimens">Between the readings inside specimens: N - b degrees of freedom; positive.</param>
/// <param name="RawComponent">Variance between specimens as estimated, (MSB - MSW)/n0, in squared units of the response; negative where specimens differ less than their readings would make them differ. Null where no group holds two specimens.</param>
/// <remarks>
/// n0 = (N - sum over groups of (sum of n_ij^2)/n_i)/(b - k) is the number of readings that counts for a specimen: the common one where all have as many.
/// Source: S. R. Searle, G. Casella and C. E. McCulloch, Variance Components, 1992, on the nested classification; R. R. Sokal and F. J. Rohlf, Biometry, on nested analysis of variance with unequal sample sizes.
/// Sums of squares come from exact integers and are rounded once. Cost: about 70 ns a reading.
/// </remarks>
public sealed record SpecimenVariation(
    int SpecimenCount,
    int ReadingCount,
    int UnmarkedCount,
    int FewestReadings,
    int MostReadings,
    VariationLine BetweenSpecimens,
    VariationLine WithinSpecimens,
    double? RawComponent)
{
    /// <summary>Variance between specimens for display: <see cref="RawComponent"/>, 0 where that is negative.</summary>
    public double? Component => RawComponent is { } raw ? Math.Max(0, raw) : null;

    /// <summary>Variance between readings of one specimen, in squared units of the response.</summary>
    public double ReadingComponent => WithinSpecimens.MeanSquare;

    /// <summary>Splits the variation inside groups.</summary>
    /// <param name="readings">All values of an experiment.</param>
    /// <returns>Null where no specimen has more than one reading, or readings of one specimen stand in several groups.</returns>
    public static SpecimenVariation? Of(GroupedSample readings)
    {
        if (SpecimenIndex.Of(readings) is not { IsTrivial: false } index)
        {
            return null;
        }

        int[] groupOf = new int[index.Counts.Length];
        Array.Fill(groupOf, -1);
        for (int i = 0; i < readings.Count; i++)
        {
            ref int group = ref groupOf[index.Specimens[i]];
            if (group >= 0 && group != readings.Groups[i])
            {
                return null;
            }

            group = readings.Groups[i];
        }

        return Split(readings, index, groupOf);
    }

    private static SpecimenVariation Split(GroupedSample readings, SpecimenIndex index, int[] groupOf)
    {
        var groupCounts = new int[readings.GroupCount];
        var squaredCounts = new long[readings.GroupCount];
        for (int j = 0; j < groupOf.Length; j++)
        {
            groupCounts[groupOf[j]] += index.Counts[j];
            squaredCounts[groupOf[j]] += (long)index.Counts[j] * index.Counts[j];
        }

        // What n0 leaves of the readings: N less the sum over groups of (sum of n_ij^2)/n_i.
        WideReal spare = WideReal.From((double)readings.Count);
        for (int i = 0; i < groupCounts.Length; i++)
        {
            spare -= WideReal.From((double)squaredCounts[i]) / Math.Max(1, groupCounts[i]);
        }

        (WideReal within, WideReal between) = readings.IsWide
            ? WideSums(readings.WideMantissas, index, groupOf, groupCounts)
            : NarrowSums(readings.Mantissas, index, groupOf, groupCounts);
        int betweenDf = groupOf.Length - groupCounts.Count(n => n > 0);
        int withinDf = readings.Count - groupOf.Length;
        WideReal squaredUnit = readings.Unit * readings.Unit;
        WideReal? component = betweenDf == 0 ? null
            : ((between / betweenDf) - (within / withinDf)) * WideReal.From((double)betweenDf) / spare;
        return new SpecimenVariation(
            groupOf.Length,
            readings.Count,
            index.UnmarkedCount,
            index.Counts.Min(),
            index.Counts.Max(),
            Line(between * squaredUnit, betweenDf),
            Line(within * squaredUnit, withinDf),
            component is { } c ? (c * squaredUnit).ToDouble() : null);
    }

    /// <summary>Sums of squares from deviations that are exact 128-bit integers: n x - S inside a specimen, and n_i S_ij - n_ij S_i inside a group; counts are below 2^31, so that the latter stay below 2^126.</summary>
    private static (WideReal Within, WideReal Between) NarrowSums(ReadOnlySpan<long> mantissas, SpecimenIndex index, int[] groupOf, int[] groupCounts)
    {
        var sums = new Int128[groupOf.Length];
        var groupSums = new Int128[groupCounts.Length];
        for (int i = 0; i < mantissas.Length; i++)
        {
            sums[index.Specimens[i]] += mantissas[i];
            groupSums[groupOf[index.Specimens[i]]] += mantissas[i];
        }

        var within = new WideReal[mantissas.Length];
        for (int i = 0; i < mantissas.Length; i++)
        {
            int n = index.Counts[index.Specimens[i]];
            within[i] = Square(WideReal.From(((Int128)mantissas[i] * n) - sums[index.Specimens[i]]) / n);
        }

        var between = new WideReal[sums.Length];
        for (int j = 0; j < sums.Length; j++)
        {
            int n = groupCounts[groupOf[j]];
            Int128 above = (sums[j] * n) - (groupSums[groupOf[j]] * index.Counts[j]);
            between[j] = Square(WideReal.From(above) / n) / index.Counts[j];
        }

        return (WideReal.SumSorted(within), WideReal.SumSorted(between));
    }

    /// <summary>As <see cref="NarrowSums"/>, in integers of any size.</summary>
    private static (WideReal Within, WideReal Between) WideSums(ReadOnlySpan<BigInteger> mantissas, SpecimenIndex index, int[] groupOf, int[] groupCounts)
    {
        var sums = new BigInteger[groupOf.Length];
        var groupSums = new BigInteger[groupCounts.Length];
        for (int i = 0; i < mantissas.Length; i++)
        {
            sums[index.Specimens[i]] += mantissas[i];
            groupSums[groupOf[index.Specimens[i]]] += mantissas[i];
        }

        var within = new WideReal[mantissas.Length];
        for (int i = 0; i < mantissas.Length; i++)
        {
            int n = index.Counts[index.Specimens[i]];
            within[i] = Square(WideReal.From((mantissas[i] * n) - sums[index.Specimens[i]]) / n);
        }

        var between = new WideReal[sums.Length];
        for (int j = 0; j < sums.Length; j++)
        {
            int n = groupCounts[groupOf[j]];
            BigInteger above = (sums[j] * n) - (groupSums[groupOf[j]] * index.Counts[j]);
            between[j] = Square(WideReal.From(above) / n) / index.Counts[j];
        }

        return (WideReal.SumSorted(within), WideReal.SumSorted(between));
    }

    private static WideReal Square(WideReal value) => value * value;

    private static VariationLine Line(WideReal sumOfSquares, int degreesOfFreedom) =>
        new(sumOfSquares.ToDouble(), degreesOfFreedom, degreesOfFreedom == 0 ? 0 : (sumOfSquares / degreesOfFreedom).ToDouble());
}
