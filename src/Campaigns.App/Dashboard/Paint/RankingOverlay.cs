using Campaigns.App.Dashboard.Model;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>What is drawn over the ranked p-values beside the sealed boundary.</summary>
/// <param name="Beside">Boundaries of other corrections with their signs.</param>
/// <param name="Explored">The boundary at a level that is only looked at; null for none.</param>
/// <param name="Gained">Positions of experiments that would survive at that level and do not.</param>
/// <param name="Lost">Positions of survivors that would not survive at it.</param>
public sealed record RankingOverlay(
    IReadOnlyList<(string Sign, BoundaryLine Line)> Beside,
    BoundaryLine? Explored,
    IReadOnlySet<int> Gained,
    IReadOnlySet<int> Lost)
{
    private static readonly HashSet<int> Nothing = [];

    /// <summary>Nothing beside the sealed boundary.</summary>
    public static RankingOverlay None { get; } = new([], null, Nothing, Nothing);

    /// <summary>What the page of the ranking has to show.</summary>
    /// <param name="model">The page's model.</param>
    public static RankingOverlay Of(RankingModel model)
    {
        ArgumentNullException.ThrowIfNull(model);
        return new RankingOverlay(model.Beside, model.ExploredLine, model.Exploration?.Gained ?? Nothing, model.Exploration?.Lost ?? Nothing);
    }
}
