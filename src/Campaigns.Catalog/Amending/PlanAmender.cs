using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Amending;

/// <summary>Amends a sealed plan: experiments are added, or fields changed, each with what stood before; inside a transaction.</summary>
internal sealed class PlanAmender(Catalog catalog, StoredCampaign stored)
{
    private const int MostTold = 20;

    /// <summary>Amends the plan; all of it or nothing. Experiments that are not named stay as they are.</summary>
    /// <param name="experiments">Those to add or to change, each code once.</param>
    /// <param name="reason">Why.</param>
    /// <returns>What was done; where every experiment stands as it is asked for, nothing is recorded.</returns>
    /// <exception cref="RefusedException">The seal fixed what the amendment asks for; all such are listed.</exception>
    public PlanChange Amend(IReadOnlyList<PlannedExperiment> experiments, string reason)
    {
        ArgumentException.ThrowIfNullOrWhiteSpace(reason);
        OnlineVerdict.RefuseFamilies(stored.Campaign, experiments);
        Dictionary<string, (long Id, PlannedExperiment Plan)> known = new PlanStore(catalog).ReadPlanned(stored.Id).ToDictionary(e => e.Plan.Code, StringComparer.Ordinal);
        PlannedExperiment[] added = [.. experiments.Where(e => !known.ContainsKey(e.Code))];
        PlannedExperiment[] changed = [.. experiments.Where(e => known.TryGetValue(e.Code, out var old) && PlanFields.Differences(old.Plan, e).Any())];
        Refuse([.. Problems(known, changed), .. added.SelectMany(e => AmendmentRule.Problems(stored.Campaign, e))]);
        if (added.Length + changed.Length == 0)
        {
            return new PlanChange(0, 0, experiments.Count);
        }

        long setsBefore = GroupSets.LastId(catalog);
        long id = InsertAmendment(reason);
        var told = new List<LedgerChange>();
        using (var writer = new Writer(catalog, stored.Id, id, told))
        {
            foreach (PlannedExperiment experiment in changed)
            {
                writer.Change(known[experiment.Code].Id, known[experiment.Code].Plan, experiment);
            }

            foreach (PlannedExperiment experiment in added)
            {
                writer.Add(experiment);
            }
        }

        new ConfirmsRule(catalog, stored).Check([.. changed, .. added]);
        catalog.Record(new LedgerAct(LedgerAction.Amend, stored.Campaign.Code)
        {
            Subject = FormattableString.Invariant($"amendment {AmendmentNumber(id)}: {added.Length} added, {changed.Length} changed"),
            Reason = reason,
            Changes = told,
            Evidence = [EvidenceRegistry.Amendment.Of(id), EvidenceRegistry.Plan.Of(stored.Id), .. GroupSets.Since(catalog, stored.Id, setsBefore)],
        });
        return new PlanChange(added.Length, changed.Length, experiments.Count - added.Length - changed.Length);
    }

    private IEnumerable<string> Problems(Dictionary<string, (long Id, PlannedExperiment Plan)> known, PlannedExperiment[] changed)
    {
        using SqliteStatement progress = catalog.Prepare(
            "SELECT EXISTS (SELECT 1 FROM measurements WHERE experiment_id = ?1), EXISTS (SELECT 1 FROM test_results WHERE experiment_id = ?1)");
        foreach (PlannedExperiment experiment in changed)
        {
            (long id, PlannedExperiment before) = known[experiment.Code];
            progress.Bind(1, id).Read();
            var reached = new ExperimentProgress(progress.Integer(0) != 0, progress.Integer(1) != 0);
            progress.Reset();
            foreach (string problem in AmendmentRule.Problems(before, experiment, reached))
            {
                yield return problem;
            }
        }
    }

    private void Refuse(string[] problems)
    {
        if (problems.Length > 0)
        {
            throw new RefusedException(
                FormattableString.Invariant($"The amendment of '{stored.Campaign.Code}' was refused; nothing was changed. A row is the whole plan of its experiment: 'campaigns show {stored.Campaign.Code} --plan --format csv' gives the rows as they stand. Problems: {problems.Length}."),
                problems.Length <= MostTold ? problems : [.. problems.Take(MostTold), FormattableString.Invariant($"... and {problems.Length - MostTold} more")]);
        }
    }

    private long InsertAmendment(string reason)
    {
        using SqliteStatement next = catalog.Prepare("SELECT coalesce(max(id), 0) + 1, (SELECT coalesce(max(number), 0) + 1 FROM plan_amendments WHERE campaign_id = ?1) FROM plan_amendments");
        next.Bind(1, stored.Id).Read();
        (long id, long number) = (next.Integer(0), next.Integer(1));
        next.Reset();
        using SqliteStatement insert = catalog.Prepare("INSERT INTO plan_amendments (id, campaign_id, number, reason, named_by, made_at, program_version) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7)");
        insert.Bind(1, id).Bind(2, stored.Id).Bind(3, number).Bind(4, reason).Bind(5, catalog.Actor.Name).Bind(6, catalog.Now).Bind(7, ProgramVersion.Current).Run();
        return id;
    }

    private long AmendmentNumber(long id)
    {
        using SqliteStatement select = catalog.Prepare("SELECT number FROM plan_amendments WHERE id = ?1");
        select.Bind(1, id).Read();
        return select.Integer(0);
    }

    /// <summary>Writes experiments and what changed in them; a change stands in the catalog before the experiment follows it, as the catalog's own rule demands.</summary>
    private sealed class Writer : IDisposable
    {
        private readonly long _amendmentId;
        private readonly List<LedgerChange> _told;
        private readonly GroupSets _sets;
        private readonly ExperimentWriter _experiments;
        private readonly SqliteStatement _change;
        private readonly SqliteStatement _groupSet;

        public Writer(Catalog catalog, long campaignId, long amendmentId, List<LedgerChange> told)
        {
            _amendmentId = amendmentId;
            _told = told;
            _sets = new GroupSets(catalog, campaignId);
            _experiments = new ExperimentWriter(catalog, campaignId);
            _change = catalog.Prepare("INSERT INTO plan_amendment_changes (amendment_id, experiment_id, field, before, after) VALUES (?1, ?2, ?3, ?4, ?5)");
            _groupSet = catalog.Prepare("SELECT group_set_id FROM experiments WHERE id = ?1");
        }

        public void Change(long id, PlannedExperiment before, PlannedExperiment after)
        {
            foreach ((string field, string? was, string? now) in PlanFields.Differences(before, after))
            {
                _change.Bind(1, _amendmentId).Bind(2, id).Bind(3, field).Bind(4, was).Bind(5, now).Run();
                _told.Add(new LedgerChange($"{after.Code}: {field}", was, now));
            }

            bool isPlanned = after.Groups.Count > 0;
            _experiments.Replace(id, after, isPlanned ? _sets.IdOf(after.Groups) : before.Groups.Count > 0 ? null : SetOf(id), isPlanned, _amendmentId);
        }

        public void Add(PlannedExperiment experiment)
        {
            long? set = experiment.Groups.Count > 0 ? _sets.IdOf(experiment.Groups) : null;
            long id = _experiments.Insert(experiment, set, groupsArePlanned: set is not null, amendmentId: _amendmentId);
            _change.Bind(1, _amendmentId).Bind(2, id).Bind(3, PlanAmendmentChange.Added).Bind(4, (string?)null).Bind(5, experiment.Code).Run();
            _told.Add(new LedgerChange($"{experiment.Code}: {PlanAmendmentChange.Added}", null, "added"));
        }

        public void Dispose()
        {
            _groupSet.Dispose();
            _change.Dispose();
            _experiments.Dispose();
            _sets.Dispose();
        }

        /// <summary>The groups that came with the data of an experiment whose plan names none.</summary>
        private long? SetOf(long id)
        {
            _groupSet.Bind(1, id).Read();
            long? set = _groupSet.NullableInteger(0);
            _groupSet.Reset();
            return set;
        }
    }
}
