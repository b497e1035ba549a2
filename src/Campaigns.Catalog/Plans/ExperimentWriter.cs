using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Plans;

/// <summary>Writes experiments, one prepared statement for all of them; inside a transaction.</summary>
internal sealed class ExperimentWriter : IDisposable
{
    private readonly SqliteStatement _insert;
    private readonly SqliteStatement _regroup;
    private readonly Lazy<SqliteStatement> _replace;
    private readonly long _campaignId;
    private long _lastId;

    public ExperimentWriter(Catalog catalog, long campaignId)
    {
        _campaignId = campaignId;
        _insert = catalog.Prepare($"INSERT INTO experiments ({PlanStore.ExperimentColumns}, first_load_id, amendment_id) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15, ?16, ?17, ?18, ?19, ?20)");
        _regroup = catalog.Prepare("UPDATE experiments SET group_set_id = ?2 WHERE id = ?1");
        _replace = new Lazy<SqliteStatement>(() => catalog.Prepare(
            """
            UPDATE experiments SET title = ?4, response = ?5, unit = ?6, group_set_id = ?7, groups_are_planned = ?8, control = ?9, test = ?10, follow_up = ?11, replicates = ?12,
                smallest_effect = ?13, assumed_sd = ?14, weight = ?15, family = ?16, confirms = ?17, shared_control = ?18, amendment_id = ?20
            WHERE id = ?1 AND campaign_id = ?2 AND code = ?3 AND first_load_id IS ?19
            """));
        using SqliteStatement last = catalog.Prepare("SELECT coalesce(max(id), 0) FROM experiments");
        last.Read();
        _lastId = last.Integer(0);
        last.Reset();
    }

    /// <summary>Adds an experiment at the end of the plan.</summary>
    /// <param name="experiment">Its plan.</param>
    /// <param name="groupSetId">Its groups; null where neither plan nor data named any.</param>
    /// <param name="groupsArePlanned">Whether the plan named them.</param>
    /// <param name="firstLoadId">The load that brings it; null where it is planned.</param>
    /// <param name="amendmentId">The amendment that adds it after the seal; null before.</param>
    /// <returns>Its key.</returns>
    public long Insert(PlannedExperiment experiment, long? groupSetId, bool groupsArePlanned, long? firstLoadId = null, long? amendmentId = null)
    {
        Run(_insert, ++_lastId, experiment, groupSetId, groupsArePlanned, firstLoadId, amendmentId);
        return _lastId;
    }

    /// <summary>Puts another plan in the place of a planned experiment's.</summary>
    /// <param name="id">Its key.</param>
    /// <param name="experiment">Its plan, under the same code.</param>
    /// <param name="groupSetId">Its groups; null where neither plan nor data named any.</param>
    /// <param name="groupsArePlanned">Whether the plan names them.</param>
    /// <param name="amendmentId">The amendment that changes it after the seal; null before.</param>
    public void Replace(long id, PlannedExperiment experiment, long? groupSetId, bool groupsArePlanned, long? amendmentId = null) =>
        Run(_replace.Value, id, experiment, groupSetId, groupsArePlanned, null, amendmentId);

    /// <summary>Gives an experiment whose groups come with the data a larger set.</summary>
    public void Regroup(long id, long groupSetId) => _regroup.Bind(1, id).Bind(2, groupSetId).Run();

    public void Dispose()
    {
        _insert.Dispose();
        _regroup.Dispose();
        if (_replace.IsValueCreated)
        {
            _replace.Value.Dispose();
        }
    }

    private void Run(SqliteStatement statement, long id, PlannedExperiment experiment, long? groupSetId, bool groupsArePlanned, long? firstLoadId, long? amendmentId) =>
        statement.Bind(1, id).Bind(2, _campaignId).Bind(3, experiment.Code)
            .Bind(4, OrNull(experiment.Title)).Bind(5, OrNull(experiment.Response)).Bind(6, OrNull(experiment.Unit))
            .Bind(7, groupSetId).Bind(8, groupsArePlanned ? 1L : 0L).Bind(9, experiment.Control)
            .Bind(10, experiment.Test).Bind(11, experiment.FollowUp).Bind(12, (long?)experiment.Replicates)
            .Bind(13, experiment.SmallestEffect).Bind(14, experiment.AssumedStandardDeviation)
            .Bind(15, experiment.Weight).Bind(16, experiment.Family)
            .Bind(17, experiment.Confirms).Bind(18, experiment.SharedControl)
            .Bind(19, firstLoadId).Bind(20, amendmentId).Run();

    private static string? OrNull(string text) => text.Length == 0 ? null : text;
}
