using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Catalog.Results;

/// <summary>Reads one experiment in full.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class DetailReader(Catalog catalog)
{
    /// <summary>Confidence of the intervals in the group table.</summary>
    public const double Confidence = 0.95;

    /// <summary>One experiment with its values, its group table and its table of variation.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="code">The experiment.</param>
    /// <exception cref="RefusedException">The campaign has no such experiment.</exception>
    public ExperimentDetail Read(CampaignStanding standing, string code)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ExperimentResult result = standing.Experiments.FirstOrDefault(e => e.Plan.Code == code)
            ?? throw new RefusedException($"The campaign '{standing.Campaign.Code}' has no experiment '{code}'; {Hint(standing, code)}.");
        long campaignId = new CampaignStore(catalog).Get(standing.Campaign.Code).Id;
        (ObservationColumns values, int missing) = ReadValues(campaignId, code);
        IReadOnlyList<string> labels = result.Plan.Groups;
        GroupedSample sample = values.Sample(labels.Count);
        GroupSummary[] summaries = GroupSummaries.Of(sample, Confidence);
        VariationTable? variation = result.P is not null && OneWayLayout.Of(sample) is { Obstacle: null } layout ? layout.Table() : null;
        var groups = new List<GroupDetail>();
        for (int group = 0; group < labels.Count; group++)
        {
            groups.Add(new GroupDetail(labels[group], labels[group] == result.Plan.Control, ValuesOf(values, group), summaries[group]));
        }

        return new ExperimentDetail(result, groups, Confidence, variation, missing);
    }

    private (ObservationColumns Values, int Missing) ReadValues(long campaignId, string code)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT m.packed, m.missing_count FROM experiments e JOIN measurements m ON m.experiment_id = e.id
            WHERE e.campaign_id = ?1 AND e.code = ?2 ORDER BY m.load_id
            """);
        select.Bind(1, campaignId).Bind(2, code);
        var values = new ObservationColumns();
        int missing = 0;
        while (select.Read())
        {
            PackedMeasurements.Read(select.Blob(0), values);
            missing += (int)select.Integer(1);
        }

        return (values, missing);
    }

    private static List<double> ValuesOf(ObservationColumns values, int group)
    {
        var inGroup = new List<double>();
        for (int i = 0; i < values.Count; i++)
        {
            if (values.Groups[i] == group)
            {
                inGroup.Add(values.NearestDouble(i));
            }
        }

        return inGroup;
    }

    private static string Hint(CampaignStanding standing, string code) =>
        Nearest.Of(code, standing.Experiments.Select(e => e.Plan.Code)) is { } near
            ? $"'{near}' may be meant"
            : $"'campaigns results {standing.Campaign.Code}' lists those it has";
}
