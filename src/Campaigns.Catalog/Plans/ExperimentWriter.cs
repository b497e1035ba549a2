using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Plans;

/// <summary>Writes experiments, one prepared statement for all of them; inside a transaction.</summary>
internal sealed class ExperimentWriter : IDisposable
{
    private readonly SqliteStatement _insert;
    private readonly SqliteStatement _regroup;
    private readonly Lazy<SqliteStatement> _delete;
    private readonly long _campaignId;
    private long _lastId;

    public ExperimentWriter(Catalog catalog, long campaignId)
    {
        _campaignId = campaignId;
        _insert = catalog.Prepare($"INSERT INTO experiments ({PlanStore.ExperimentColumns}, first_load_id, amendment_id) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15, ?16, ?17, ?18, ?19, ?20)");
        _regroup = catalog.Prepare("UPDATE experiments SET group_set_id = ?2 WHERE id = ?1");
        _delete = new Lazy<SqliteStatement>(() => catalog.Prepare("DELETE FROM experiments WHERE id = ?1"));
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
        Insert(++_lastId, experiment, groupSetId, groupsArePlanned, firstLoadId, amendmentId);
        return _lastId;
    }

    /// <summary>Puts another plan in the place of an experiment that has no data.</summary>
    public void Replace(long id, PlannedExperiment experiment, long? groupSetId)
    {
        _delete.Value.Bind(1, id).Run();
        Insert(id, experiment, groupSetId, groupSetId is not null, null, null);
    }

    /// <summary>Gives an experiment whose groups come with the data a larger set.</summary>
    public void Regroup(long id, long groupSetId) => _regroup.Bind(1, id).Bind(2, groupSetId).Run();

    public void Dispose()
    {
        _insert.Dispose();
        _regroup.Dispose();
        if (_delete.IsValueCreated)
        {
            _delete.Value.Dispose();
        }
    }

    private void Insert(long id, PlannedExperiment experiment, long? groupSetId, bool groupsArePlanned, long? firstLoadId, long? amendmentId) =>
        _insert.Bind(1, id).Bind(2, _campaignId).Bind(3, experiment.Code)
            .Bind(4, OrNull(experiment.Title)).Bind(5, OrNull(experiment.Response)).Bind(6, OrNull(experiment.Unit))
            .Bind(7, groupSetId).Bind(8, groupsArePlanned ? 1L : 0L).Bind(9, experiment.Control)
            .Bind(10, experiment.Test).Bind(11, experiment.FollowUp).Bind(12, (long?)experiment.Replicates)
            .Bind(13, experiment.SmallestEffect).Bind(14, experiment.AssumedStandardDeviation)
            .Bind(15, experiment.Weight).Bind(16, experiment.Family)
            .Bind(17, experiment.Confirms).Bind(18, experiment.SharedControl)
            .Bind(19, firstLoadId).Bind(20, amendmentId).Run();

    private static string? OrNull(string text) => text.Length == 0 ? null : text;
}
