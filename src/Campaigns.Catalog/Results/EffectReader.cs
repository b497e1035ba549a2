using System.Text.Json;
using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Statistics.GroupTests;

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
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.code, e.group_set_id, m.packed FROM (SELECT value AS wanted FROM json_each(?2)) w
            CROSS JOIN experiments e ON e.campaign_id = ?1 AND e.code = w.wanted
            CROSS JOIN measurements m ON m.experiment_id = e.id ORDER BY e.id, m.load_id
            """);
        select.Bind(1, campaignId).Bind(2, JsonSerializer.Serialize([.. experiments], JsonArrays.Default.StringArray));
        var gaps = new Dictionary<string, WidestGap>(StringComparer.Ordinal);
        var values = new ObservationColumns();
        string code = "";
        string[] labels = [];
        while (select.Read())
        {
            if (!select.TextEquals(0, code))
            {
                Finish();
                values.Clear();
                code = select.Text(0);
                labels = sets.Labels(select.NullableInteger(1));
            }

            PackedMeasurements.Read(select.Blob(2), values);
        }

        Finish();
        return gaps;

        void Finish()
        {
            if (Gap(values.Sample(labels.Length), labels) is { } gap)
            {
                gaps[code] = gap;
            }
        }
    }

    private static WidestGap? Gap(GroupedSample sample, string[] labels)
    {
        GroupSummary[] groups = GroupSummaries.Of(sample, DetailReader.Confidence);
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
