using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Model;

/// <summary>The boundary of a correction over the ranks of a family.</summary>
/// <param name="correction">The correction.</param>
/// <param name="familySize">Hypotheses in the family, at least 1.</param>
/// <param name="level">The level.</param>
public sealed class BoundaryLine(Correction correction, int familySize, SignificanceLevel level)
{
    private readonly Dictionary<int, double?> _known = [];

    /// <summary>The correction.</summary>
    public Correction Correction => correction;

    /// <summary>The level.</summary>
    public SignificanceLevel Level => level;

    /// <summary>The boundary at a rank; null where there is none.</summary>
    /// <param name="rank">From 1 to the size of the family.</param>
    /// <remarks>Kept, since some corrections take time in proportion to the family.</remarks>
    public double? At(int rank)
    {
        if (!_known.TryGetValue(rank, out double? boundary))
        {
            boundary = correction.BoundaryAt(rank, familySize, level.Value);
            _known.Add(rank, boundary);
        }

        return boundary;
    }
}
