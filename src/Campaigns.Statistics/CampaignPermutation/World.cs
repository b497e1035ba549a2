using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>Responses whose arrangements are numbered together.</summary>
internal sealed class World(ArrangementColumns columns)
{
    /// <summary>Their shares.</summary>
    public ArrangementColumns Columns { get; } = columns;

    /// <summary>The responses, in the order in which they were given.</summary>
    public List<Hypothesis> Members { get; } = [];

    /// <summary>What stands behind the p-value of a response.</summary>
    /// <param name="reached">Arrangements of the columns that are at least as extreme, the observed one included.</param>
    /// <param name="design">The response's set.</param>
    public Resampling Resampling(int reached, ArrangedDesign design)
    {
        if (Columns.Seed is { } seed)
        {
            return new Resampling(Columns.Length - 1, reached - 1, seed);
        }

        long all = design.Arrangements!.Value;
        return new Resampling(all, reached * (all / Columns.Length), null);
    }
}
