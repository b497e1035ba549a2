using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Results;

/// <summary>One observation with where it came from.</summary>
/// <param name="Group">Its group.</param>
/// <param name="Value">Its value as it was typed, up to trailing zeros.</param>
/// <param name="File">Name of the file that brought it.</param>
/// <param name="Line">Line in that file, from 1.</param>
/// <param name="Specimen">Its specimen; null where none was recorded.</param>
/// <param name="Block">Its block; null where none was recorded.</param>
/// <param name="Order">Its place in the order of measuring; null where none was recorded.</param>
/// <param name="IsExcluded">Whether it is left out of the analysis.</param>
public sealed record TracedObservation(string Group, string Value, string File, long Line, string? Specimen, string? Block, long? Order, bool IsExcluded)
{
    /// <summary>The value as the nearest double.</summary>
    public required double Number { get; init; }
}

/// <summary>Traces the observations of an experiment to file and line.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class ObservationReader(Catalog catalog)
{
    /// <summary>The observations in the order in which they were loaded.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="experiment">The experiment.</param>
    /// <exception cref="RefusedException">There is no such campaign or experiment.</exception>
    public IReadOnlyList<TracedObservation> Read(string code, string experiment)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        new PlanStore(catalog).Demand(stored, experiment);
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.id, e.group_set_id, m.packed, l.file_name, l.id FROM experiments e
            JOIN measurements m ON m.experiment_id = e.id JOIN loads l ON l.id = m.load_id
            WHERE e.campaign_id = ?1 AND e.code = ?2 ORDER BY l.id
            """);
        select.Bind(1, stored.Id).Bind(2, experiment);
        var exclusions = new StandingExclusions(catalog, stored.Id);
        using var sets = new GroupSets(catalog, stored.Id);
        var found = new List<TracedObservation>();
        var values = new ObservationColumns();
        while (select.Read())
        {
            string[] labels = sets.Labels(select.NullableInteger(1));
            string file = select.Text(3);
            IReadOnlySet<StandingExclusions.Place> excluded = exclusions.Of(select.Integer(0));
            values.Clear();
            PackedMeasurements.Read(select.Blob(2), values);
            for (int i = 0; i < values.Count; i++)
            {
                found.Add(new TracedObservation(
                    labels[values.Groups[i]], values.Text(i), file, values.Lines[i],
                    values.Specimens[i] < 0 ? null : values.SpecimenNames.Text(values.Specimens[i]),
                    values.Blocks[i] < 0 ? null : values.BlockNames.Text(values.Blocks[i]),
                    values.Orders[i] == ObservationColumns.NoOrder ? null : values.Orders[i],
                    excluded.Contains(new StandingExclusions.Place(select.Integer(4), values.Lines[i])))
                {
                    Number = values.NearestDouble(i),
                });
            }
        }

        return found;
    }
}
