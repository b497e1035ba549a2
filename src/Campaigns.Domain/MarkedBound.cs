namespace Campaigns.Domain;

/// <summary>The bound of a set of experiments, at a confidence that holds for all sets together.</summary>
/// <param name="Marked">Experiments in the set.</param>
/// <param name="RealAtLeast">The least number of them whose group means differ.</param>
/// <param name="Untested">Experiments in the set that have no result and count as p = 1.</param>
public sealed record MarkedBound(int Marked, int RealAtLeast, int Untested)
{
    /// <summary>The most of them that may be false.</summary>
    public int FalseAtMost => Marked - RealAtLeast;
}
