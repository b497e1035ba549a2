using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;

namespace Campaigns.App.Commands;

/// <summary>The survivors of a campaign with what is told of each: the widest gap, and the comparisons inside.</summary>
/// <param name="Overview">The campaign in figures.</param>
/// <param name="Listed">The survivors, the smallest p first; the first of them, where not all were asked for.</param>
/// <param name="Gaps">The widest gap of each, by its code.</param>
/// <param name="Comparisons">The comparisons inside each, by its code.</param>
internal sealed record SurvivorData(
    CampaignOverview Overview, IReadOnlyList<ExperimentResult> Listed, IReadOnlyDictionary<string, WidestGap> Gaps, ILookup<string, ExperimentComparison> Comparisons)
{
    /// <summary>Reads them, all of one moment.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="code">The campaign.</param>
    /// <param name="most">Survivors to list.</param>
    public static SurvivorData Read(Catalog.Catalog catalog, string code, int most) => catalog.Snapshot(() =>
    {
        (CampaignOverview overview, IReadOnlyList<ExperimentResult> listed) = new OverviewReader(catalog).ReadSurvivors(code, most);
        return new SurvivorData(
            overview, listed, new EffectReader(catalog).WidestGaps(code, listed.Select(e => e.Plan.Code)), new ComparisonReader(catalog).OfSurvivors(overview, listed));
    });

    /// <summary>The claimed comparison of a survivor whose groups lie farthest apart; null where none is claimed.</summary>
    /// <param name="survivor">One of the listed.</param>
    public ExperimentComparison? Leading(ExperimentResult survivor) =>
        Comparisons[survivor.Plan.Code].Where(c => c.Survives == true).MaxBy(c => Math.Abs(c.Comparison.Difference));

    /// <summary>The selected interval of highest less lowest mean; null where the follow-up does not compare these two, or estimates another difference, as within incomplete blocks.</summary>
    public static Interval? OfGap(WidestGap gap, IEnumerable<ExperimentComparison> comparisons)
    {
        const double Rounding = 1e-9;
        foreach (ExperimentComparison c in comparisons)
        {
            bool upwards = (c.GroupA, c.GroupB) == (gap.Lowest, gap.Highest);
            if ((upwards || (c.GroupB, c.GroupA) == (gap.Lowest, gap.Highest)) && Math.Abs(Math.Abs(c.Comparison.Difference) - gap.Difference) <= Rounding * gap.Difference)
            {
                return upwards || c.SelectedInterval is not { } downwards ? c.SelectedInterval : new Interval(-downwards.Upper, -downwards.Lower);
            }
        }

        return null;
    }
}
