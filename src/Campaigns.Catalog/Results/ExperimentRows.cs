using System.Text.Json;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Catalog.Results;

/// <summary>Walks through the experiments of a campaign with their latest results: two scans in the order of the same keys, merged.</summary>
internal sealed class ExperimentRows : IDisposable
{
    private readonly GroupSets _sets;
    private readonly SqliteStatement _plans;
    private readonly SqliteStatement _results;
    private bool _more;
    private int _position;

    /// <param name="catalog">The open catalog.</param>
    /// <param name="campaignId">The campaign.</param>
    /// <param name="only">Keys of the experiments wanted; null for all.</param>
    public ExperimentRows(Catalog catalog, long campaignId, long[]? only)
    {
        // Where only some are wanted, the list of them is where SQLite is told to begin.
        string chosen = only is null ? "experiments e" : "(SELECT value FROM json_each(?2)) wanted CROSS JOIN experiments e ON e.id = wanted.value";
        _sets = new GroupSets(catalog, campaignId);
        _plans = catalog.Prepare($"SELECT {PlanStore.ExperimentColumns} FROM {chosen} WHERE e.campaign_id = ?1 ORDER BY e.id");
        _results = catalog.Prepare(
            $"""
            SELECT r.experiment_id, r.status, r.group_count, r.observation_count, r.statistic, r.df1, r.df2, r.p, r.log_p, r.eta_squared, r.omega_squared, t.includes_incomplete, r.specimen_count, r.arrangements, r.as_extreme, r.seed
            FROM {chosen} CROSS JOIN test_results r ON r.experiment_id = e.id JOIN test_runs t ON t.id = r.test_run_id WHERE e.campaign_id = ?1 ORDER BY e.id, r.test_run_id
            """);
        foreach (SqliteStatement statement in (SqliteStatement[])[_plans, _results])
        {
            statement.Bind(1, campaignId);
            if (only is not null)
            {
                statement.Bind(2, JsonSerializer.Serialize(only, JsonArrays.Default.Int64Array));
            }
        }

        _more = _results.Read();
    }

    /// <summary>Key of the experiment given last.</summary>
    public long Id { get; private set; }

    /// <summary>The next experiment, numbered as it comes; null at the end. Of several results the latest stands, and none where values came in after it.</summary>
    public ExperimentResult? Next(AmendedExperiments amended)
    {
        if (!_plans.Read())
        {
            return null;
        }

        Id = _plans.Integer(0);
        _position++;
        PlannedExperiment plan = PlanStore.Row(_plans, _sets);
        IReadOnlyList<string> amendments = amended.Reasons(Id);
        ExperimentResult? tested = null;
        for (; _more && _results.Integer(0) == Id; _more = _results.Read())
        {
            tested = amended.AwaitsTest(Id) ? null : Result(plan, _position, tested?.Amendments ?? amendments, _results);
        }

        return tested ?? new ExperimentResult { Plan = plan, Position = _position, Status = ExperimentStatus.Planned, Amendments = amendments };
    }

    public void Dispose()
    {
        _results.Dispose();
        _plans.Dispose();
        _sets.Dispose();
    }

    // Made at once instead of copied from one without a result: this is done for every experiment of a campaign.
    private static ExperimentResult Result(PlannedExperiment plan, int position, IReadOnlyList<string> amendments, SqliteStatement row) => new()
    {
        Plan = plan,
        Position = position,
        Status = ExperimentStatusWords.Parse(row.Text(1)),
        GroupCount = (int)row.Integer(2),
        ObservationCount = (int)row.Integer(3),
        Statistic = row.NullableReal(4),
        Df1 = row.NullableReal(5),
        Df2 = row.NullableReal(6),
        P = FamilyReader.ReadP(row, 7),
        EtaSquared = row.NullableReal(9),
        OmegaSquared = row.NullableReal(10),
        SpecimenCount = (int?)row.NullableInteger(12),
        Resampling = row.IsNull(13) ? null : new Resampling(row.Integer(13), row.Integer(14), unchecked((ulong?)row.NullableInteger(15))),
        Amendments = row.Integer(11) != 0 && IsShort(plan, (int)row.Integer(2), (int)(row.NullableInteger(12) ?? row.Integer(3)))
            ? [.. amendments, FormattableString.Invariant($"tested short of its plan, with {row.NullableInteger(12) ?? row.Integer(3)} {(row.IsNull(12) ? "values" : "specimens")} where {plan.Replicates} in each group were planned")]
            : amendments,
    };

    private static bool IsShort(PlannedExperiment plan, int groups, int values) =>
        plan.Replicates is { } replicates && (groups < plan.Groups.Count || values < replicates * plan.Groups.Count);
}
