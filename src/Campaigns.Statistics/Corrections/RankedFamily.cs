using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Corrections;

/// <summary>The p-values of one family, ranked once for all corrections, with the size of the family as it was planned.</summary>
public sealed class RankedFamily
{
    /// <summary>P-values at hand.</summary>
    public int Count => throw new NotImplementedException();

    /// <summary>Hypotheses in the family, at least <see cref="Count"/>; those without a p-value count as p = 1.</summary>
    public int FamilySize => throw new NotImplementedException();

    /// <summary>Ranks p-values.</summary>
    public static RankedFamily Of(ReadOnlySpan<PValue> pValues, int familySize) => throw new NotImplementedException();

    /// <summary>Ranks p-values given as doubles in [0, 1].</summary>
    public static RankedFamily Of(ReadOnlySpan<double> pValues, int familySize) => throw new NotImplementedException();
}
