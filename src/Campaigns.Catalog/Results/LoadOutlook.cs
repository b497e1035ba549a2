using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Results;

/// <summary>How far an experiment of a loaded file is now, with everything that was loaded for it before.</summary>
/// <param name="Code">The experiment.</param>
/// <param name="Groups">Its groups: those of the plan, or those that came with the data where the plan names none.</param>
/// <param name="GroupsInFile">Those of them that the file has a value of.</param>
/// <param name="Needed">Replicates that the plan asks for over all groups; null where it gives no number.</param>
/// <param name="Present">How many of these are there, at most the planned number of each group; 0 where the plan gives none.</param>
/// <param name="IsComplete">Whether a test run takes it.</param>
public sealed record LoadedExperiment(string Code, int Groups, int GroupsInFile, int? Needed, int Present, bool IsComplete);

/// <summary>What a loaded file means to its campaign's plan.</summary>
/// <param name="InFile">The experiments of the file, in the plan's order.</param>
/// <param name="NotInFile">Codes of the other experiments, without those that are withdrawn.</param>
/// <param name="WithoutData">Those of <paramref name="NotInFile"/> that have no value from any file.</param>
public sealed record LoadOutlook(IReadOnlyList<LoadedExperiment> InFile, IReadOnlyList<string> NotInFile, IReadOnlyList<string> WithoutData);

/// <summary>Holds the latest file of a campaign against its plan.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class LoadOutlookReader(Catalog catalog)
{
    private readonly ObservationColumns _values = new();
    private readonly Completeness _completeness = new();

    /// <summary>Looks at the file that was loaded last. O(values of its experiments + experiments of the campaign).</summary>
    /// <param name="code">The campaign; something was loaded into it.</param>
    public LoadOutlook Read(string code)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        long load = LatestLoad(stored.Id);
        (List<string> notInFile, List<string> withoutData) = Others(stored.Id, load);
        return new LoadOutlook(InFile(stored.Id, load), notInFile, withoutData);
    }

    private long LatestLoad(long campaign)
    {
        using SqliteStatement select = catalog.Prepare("SELECT max(id) FROM loads WHERE campaign_id = ?1");
        select.Bind(1, campaign).Read();
        return select.NullableInteger(0) ?? throw new InvalidOperationException("Nothing was loaded into the campaign.");
    }

    private List<LoadedExperiment> InFile(long campaign, long load)
    {
        // A cross join is SQLite's way of being told where to begin: at the experiments of the file.
        using SqliteStatement row = catalog.Prepare(
            """
            SELECT e.id, e.code, e.group_set_id, e.groups_are_planned, e.replicates, m.packed, m.load_id
            FROM (SELECT experiment_id FROM measurements WHERE load_id = ?1) n
            CROSS JOIN experiments e ON e.id = n.experiment_id CROSS JOIN measurements m ON m.experiment_id = e.id
            ORDER BY e.id, m.load_id
            """);
        row.Bind(1, load);
        using var sets = new GroupSets(catalog, campaign);
        List<LoadedExperiment> found = [];
        Experiment? current = null;
        while (row.Read())
        {
            if (current?.Id != row.Integer(0))
            {
                End();
                current = new Experiment(row.Integer(0), row.Text(1), sets.Labels(row.NullableInteger(2)).Length, row.Integer(3) != 0, (int?)row.NullableInteger(4));
            }

            int before = _values.Count;
            PackedMeasurements.Read(row.Blob(5), _values);
            if (row.Integer(6) == load)
            {
                current.GroupsInFile = _values.Groups[before..].ToArray().Distinct().Count();
            }
        }

        End();
        return found;

        void End()
        {
            if (current is { } e)
            {
                int? needed = e.Replicates is { } each ? each * e.Groups : null;
                int present = e.Replicates is { } planned ? _completeness.Present(_values, e.Groups, planned) : 0;
                found.Add(new LoadedExperiment(e.Code, e.Groups, e.GroupsInFile, needed, present, _completeness.IsComplete(_values, e.Groups, e.GroupsArePlanned, e.Replicates)));
            }

            _values.Clear();
        }
    }

    private (List<string> NotInFile, List<string> WithoutData) Others(long campaign, long load)
    {
        using SqliteStatement row = catalog.Prepare(
            """
            SELECT e.code, EXISTS (SELECT 1 FROM measurements m WHERE m.experiment_id = e.id)
            FROM experiments e WHERE e.campaign_id = ?1
                AND NOT EXISTS (SELECT 1 FROM measurements m WHERE m.experiment_id = e.id AND m.load_id = ?2)
                AND coalesce((SELECT w.is_withdrawn FROM withdrawals w WHERE w.experiment_id = e.id ORDER BY w.id DESC LIMIT 1), 0) = 0
            ORDER BY e.id
            """);
        row.Bind(1, campaign).Bind(2, load);
        List<string> notInFile = [], withoutData = [];
        while (row.Read())
        {
            notInFile.Add(row.Text(0));
            if (row.Integer(1) == 0)
            {
                withoutData.Add(row.Text(0));
            }
        }

        return (notInFile, withoutData);
    }

    private sealed record Experiment(long Id, string Code, int Groups, bool GroupsArePlanned, int? Replicates)
    {
        public int GroupsInFile { get; set; }
    }
}
