using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Loading;

/// <summary>The rule that an experimental unit belongs to one group: readings of one specimen must not stand in several groups of an experiment.</summary>
internal sealed class SpecimenRule(NameComplaints complaints)
{
    private readonly Dictionary<int, int> _groupOf = [];

    /// <summary>Whether any experiment of the file records specimens.</summary>
    public bool SawSpecimens { get; private set; }

    /// <summary>Looks at what a file brings to one experiment. O(values).</summary>
    /// <param name="experiment">Code of the experiment.</param>
    /// <param name="values">Its values.</param>
    /// <param name="label">Label of a group by its number in the values.</param>
    public void Look(string experiment, ObservationColumns values, Func<int, string> label)
    {
        if (values.SpecimenNames.Count == 0)
        {
            return;
        }

        SawSpecimens = true;
        _groupOf.Clear();
        for (int i = 0; i < values.Count; i++)
        {
            Look(experiment, values, i, label);
        }
    }

    /// <summary>Looks at the experiments of a load that had values before it; one look-up for all.</summary>
    public void LookAtEarlierLoads(Catalog catalog, long campaignId, long loadId)
    {
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.id, e.code, e.group_set_id, m.load_id, m.packed FROM measurements n
            CROSS JOIN experiments e ON e.id = n.experiment_id CROSS JOIN measurements m ON m.experiment_id = e.id
            WHERE n.load_id = ?1 AND EXISTS (SELECT 1 FROM measurements o WHERE o.experiment_id = n.experiment_id AND o.load_id <> ?1)
            ORDER BY e.id, m.load_id
            """);
        select.Bind(1, loadId);
        var values = new ObservationColumns();
        long current = 0;
        while (select.Read())
        {
            if (select.Integer(0) != current)
            {
                current = select.Integer(0);
                values.Clear();
                _groupOf.Clear();
            }

            int from = values.Count;
            PackedMeasurements.Read(select.Blob(4), values);
            string[] labels = sets.Labels(select.NullableInteger(2));
            string code = select.Text(1);
            for (int i = from; i < values.Count && values.SpecimenNames.Count > 0; i++)
            {
                Look(code, values, i, group => labels[group]);
            }
        }
    }

    private void Look(string experiment, ObservationColumns values, int i, Func<int, string> label)
    {
        int specimen = values.Specimens[i];
        int group = values.Groups[i];
        if (specimen < 0 || _groupOf.TryAdd(specimen, group) || _groupOf[specimen] == group)
        {
            return;
        }

        string name = values.SpecimenNames.Text(specimen);
        int first = _groupOf[specimen];
        complaints.Add("specimen", "specimen-in-several-groups", $"{experiment}\n{name}\n{group}", values.Lines[i], 1, () =>
            $"specimen {ShownText.Quote(name)} of experiment {ShownText.Quote(experiment)} stands in group {ShownText.Quote(label(group))} here and in group {ShownText.Quote(label(first))} before; an experimental unit belongs to one group. Give every specimen of the experiment a name of its own.");
    }
}
