using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Catalog.Results;

/// <summary>The widest gap between group means of an experiment, in the unit of its response.</summary>
/// <param name="Highest">Group with the largest mean.</param>
/// <param name="HighestMean">Its mean.</param>
/// <param name="Lowest">Group with the smallest mean.</param>
/// <param name="LowestMean">Its mean.</param>
public sealed record WidestGap(string Highest, double HighestMean, string Lowest, double LowestMean)
{
    /// <summary>Largest less smallest mean.</summary>
    public double Difference => HighestMean - LowestMean;
}

/// <summary>Reads by how much the groups of given experiments differ.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class EffectReader(Catalog catalog)
{
    /// <summary>The widest gaps; one look-up for all experiments asked for, O(their values).</summary>
    /// <param name="campaignCode">The campaign.</param>
    /// <param name="experiments">Codes of the experiments.</param>
    /// <returns>A gap for each experiment with values in at least two groups.</returns>
    public IReadOnlyDictionary<string, WidestGap> WidestGaps(string campaignCode, IEnumerable<string> experiments)
    {
        long campaignId = new CampaignStore(catalog).Get(campaignCode).Id;
        using var rows = new ValueRows(catalog, campaignId, new StandingExclusions(catalog, campaignId), experiments);
        var gaps = new Dictionary<string, WidestGap>(StringComparer.Ordinal);
        while (rows.Next())
        {
            if (Gap(rows.Values.Sample(rows.Labels.Length), rows.Labels) is { } gap)
            {
                gaps[rows.Code] = gap;
            }
        }

        return gaps;
    }

    private static WidestGap? Gap(GroupedSample sample, string[] labels)
    {
        // The means of the values that were tested: of the specimens, where readings of one were averaged.
        GroupSummary[] groups = GroupSummaries.Of(SpecimenMeans.Of(sample) is { } means ? means.Sample : sample, DetailReader.Confidence);
        int high = -1, low = -1;
        for (int group = 0; group < groups.Length; group++)
        {
            if (groups[group].Mean is not { } mean)
            {
                continue;
            }

            high = high < 0 || mean > groups[high].Mean ? group : high;
            low = low < 0 || mean < groups[low].Mean ? group : low;
        }

        return high < 0 || high == low ? null : new WidestGap(labels[high], groups[high].Mean!.Value, labels[low], groups[low].Mean!.Value);
    }
}
