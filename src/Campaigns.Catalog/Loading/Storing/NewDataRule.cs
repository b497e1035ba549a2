using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Loading;

/// <summary>The rule that a confirmation needs new data: what a file brings to an experiment that confirms another, or to the one that is confirmed, must not be the other's values again.</summary>
/// <remarks>
/// Seen are a file with the bytes of one that brought values to the other experiment, and rows all of which stand in the other one with the same group and value (and specimen, where both record it).
/// Rows with fewer than four different values are let pass: a few coarse readings agree by chance. What cannot be seen: values that were altered, rounded or taken from the same specimens again, and anything that never was in this catalog.
/// Cost: a look at the experiments of the catalog that confirm another, which an index of their own lists, and the values of such pairs where the file touches one.
/// </remarks>
internal sealed class NewDataRule(Catalog catalog, long loadId, NameComplaints complaints)
{
    private const int FewestDifferentValues = 4;

    /// <summary>Looks at what the load brought, inside its transaction.</summary>
    /// <param name="sha256">Gives the digest of the file; asked for only where it matters.</param>
    public void Look(Func<string> sha256)
    {
        using SqliteStatement brought = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM measurements WHERE experiment_id = ?1 AND load_id = ?2)");
        foreach ((ConfirmedExperiment confirming, ConfirmedExperiment first) in Pairs())
        {
            bool isNew = !Brought(brought, confirming.Id)
                || IsNew(confirming, first, sha256, $"the experiment {ShownText.Quote(Name(confirming, first))} confirms {ShownText.Quote(Name(first, confirming))} on new data");
            if (isNew && Brought(brought, first.Id))
            {
                IsNew(first, confirming, sha256, $"the experiment {ShownText.Quote(Name(first, confirming))} is confirmed by {ShownText.Quote(Name(confirming, first))} on new data");
            }
        }
    }

    /// <summary>Its code, with its campaign where the other one's is another.</summary>
    private static string Name(ConfirmedExperiment experiment, ConfirmedExperiment beside) =>
        experiment.CampaignId == beside.CampaignId ? experiment.Code : $"{experiment.Campaign}/{experiment.Code}";

    private bool Brought(SqliteStatement statement, long experimentId)
    {
        statement.Bind(1, experimentId).Bind(2, loadId).Read();
        bool brought = statement.Integer(0) != 0;
        statement.Reset();
        return brought;
    }

    private List<(ConfirmedExperiment Confirming, ConfirmedExperiment First)> Pairs()
    {
        using var known = new ConfirmedExperiments(catalog);
        using SqliteStatement select = catalog.Prepare(
            "SELECT e.id, c.id, c.code, e.code, e.confirms FROM experiments e INDEXED BY ix_experiments_confirms JOIN campaigns c ON c.id = e.campaign_id WHERE e.confirms IS NOT NULL ORDER BY e.id");
        var pairs = new List<(ConfirmedExperiment, ConfirmedExperiment)>();
        while (select.Read())
        {
            var confirming = new ConfirmedExperiment(select.Integer(0), select.Integer(1), select.Text(2), select.Text(3), select.Text(4));
            if (known.Find(confirming.CampaignId, confirming.Confirms!) is { } first)
            {
                pairs.Add((confirming, first));
            }
        }

        return pairs;
    }

    /// <summary>Whether what the load brought to an experiment is new against another; where it is not, that is put among the complaints.</summary>
    private bool IsNew(ConfirmedExperiment receiving, ConfirmedExperiment other, Func<string> sha256, string why)
    {
        if (FileOf(other.Id, sha256()) is { } file)
        {
            complaints.Add("experiment", "same-file", $"{receiving.Code}\n{other.Campaign}\n{other.Code}", 1, 0, () =>
                $"{why}, and this file has the same bytes as '{file}', which brought values to {ShownText.Quote(Name(other, receiving))}. Load measurements of its own.");
            return false;
        }

        var fresh = new ObservationColumns();
        var others = new ObservationColumns();
        string[] freshLabels = Read(receiving, onlyThisLoad: true, fresh);
        string[] otherLabels = Read(other, onlyThisLoad: false, others);
        bool isNew = !StandsIn(fresh, freshLabels, others, otherLabels);
        if (!isNew)
        {
            complaints.Add("value", "no-new-data", $"{receiving.Code}\n{other.Campaign}\n{other.Code}", fresh.Lines[0], fresh.Count, () =>
                $"{why}, and every row stands in {ShownText.Quote(Name(other, receiving))} with the same group and value. Load measurements of its own.");
        }

        return isNew;
    }

    private string? FileOf(long experimentId, string sha256)
    {
        using SqliteStatement select = catalog.Prepare(
            "SELECT l.file_name FROM measurements m JOIN loads l ON l.id = m.load_id WHERE m.experiment_id = ?1 AND l.id <> ?2 AND l.sha256 = ?3 LIMIT 1");
        return select.Bind(1, experimentId).Bind(2, loadId).Bind(3, sha256).Read() ? select.Text(0) : null;
    }

    /// <returns>The labels of the experiment's groups.</returns>
    private string[] Read(ConfirmedExperiment experiment, bool onlyThisLoad, ObservationColumns values)
    {
        using var sets = new GroupSets(catalog, experiment.CampaignId);
        using SqliteStatement select = catalog.Prepare(
            "SELECT e.group_set_id, m.packed FROM experiments e JOIN measurements m ON m.experiment_id = e.id WHERE e.id = ?1 AND (m.load_id = ?2 OR ?3 = 0) ORDER BY m.load_id");
        select.Bind(1, experiment.Id).Bind(2, loadId).Bind(3, onlyThisLoad ? 1L : 0L);
        string[] labels = [];
        while (select.Read())
        {
            labels = sets.Labels(select.NullableInteger(0));
            PackedMeasurements.Read(select.Blob(1), values);
        }

        return labels;
    }

    private static bool StandsIn(ObservationColumns fresh, string[] freshLabels, ObservationColumns others, string[] otherLabels)
    {
        if (fresh.Count > others.Count || Enumerable.Range(0, fresh.Count).Select(fresh.NearestDouble).Distinct().Take(FewestDifferentValues).Count() < FewestDifferentValues)
        {
            return false;
        }

        bool withSpecimens = fresh.SpecimenNames.Count > 0 && others.SpecimenNames.Count > 0;
        var left = new Dictionary<(string, double, string), int>();
        for (int i = 0; i < others.Count; i++)
        {
            (string, double, string) row = Row(others, otherLabels, i);
            left[row] = left.GetValueOrDefault(row) + 1;
        }

        for (int i = 0; i < fresh.Count; i++)
        {
            (string, double, string) row = Row(fresh, freshLabels, i);
            if (left.GetValueOrDefault(row) == 0)
            {
                return false;
            }

            left[row]--;
        }

        return true;

        (string Group, double Value, string Specimen) Row(ObservationColumns values, string[] labels, int i) =>
            (labels[values.Groups[i]], values.NearestDouble(i), withSpecimens && values.Specimens[i] >= 0 ? values.SpecimenNames.Text(values.Specimens[i]) : "");
    }
}
