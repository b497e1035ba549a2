using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Withdrawing;

/// <summary>Takes experiments out of their campaign, with a reason and a name, and in again; plans, values and results stay in the catalog.</summary>
/// <remarks>
/// One that is withdrawn before any data leaves its family. One that is withdrawn after its data came stays in it and counts with p = 1 until it is taken back:
/// else an unfavourable experiment could be dropped, and the others would gain by it.
/// </remarks>
/// <param name="catalog">The open catalog.</param>
public sealed class WithdrawalStore(Catalog catalog)
{
    /// <summary>Withdraws experiments, or takes them in again; all of them or none. Both are recorded and neither is ever removed.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="experiments">Codes.</param>
    /// <param name="withdraw">Whether they are taken out; false takes them in again.</param>
    /// <param name="reason">Why.</param>
    /// <param name="name">Who says so.</param>
    /// <returns>The decisions, in the order of the codes.</returns>
    /// <exception cref="RefusedException">There is no such campaign or experiment, one is named twice, or is as asked for already; nothing was changed.</exception>
    public IReadOnlyList<Withdrawal> Decide(string code, IReadOnlyList<string> experiments, bool withdraw, string reason, string name)
    {
        ArgumentNullException.ThrowIfNull(experiments);
        ArgumentException.ThrowIfNullOrWhiteSpace(reason);
        ArgumentException.ThrowIfNullOrWhiteSpace(name);
        return catalog.Change(() =>
        {
            StoredCampaign stored = new CampaignStore(catalog).Get(code);
            Dictionary<string, long> ids = new PlanStore(catalog).Codes(stored.Id).ToDictionary(c => c.Value, c => c.Key, StringComparer.Ordinal);
            var standing = new StandingWithdrawals(catalog, stored.Id);
            bool afterResults = new FamilyReader(catalog).LastTestRun(stored.Id) is not null;
            var decisions = new List<(long Id, Withdrawal Decision)>();
            using var rows = new WithdrawalRows(catalog);
            foreach (string experiment in experiments)
            {
                long id = Look(code, experiment, experiments, ids, standing, withdraw);
                var decision = new Withdrawal(experiment, withdraw, rows.HasData(id), afterResults, reason, name, Instants.FromMicroseconds(catalog.Now));
                decisions.Add((rows.Insert(id, decision), decision));
            }

            catalog.Record(new LedgerAct(withdraw ? LedgerAction.Withdraw : LedgerAction.Restore, code)
            {
                Subject = experiments.Count == 1 ? experiments[0] : FormattableString.Invariant($"{experiments.Count} experiments"),
                Reason = reason,
                Changes = [.. decisions.Select(d => Change(d.Decision))],
                Evidence = [.. decisions.Select(d => EvidenceRegistry.Withdrawal.Of(d.Id))],
            });
            return (IReadOnlyList<Withdrawal>)[.. decisions.Select(d => d.Decision)];
        });
    }

    /// <summary>Every decision about experiments of a campaign, by experiment in the plan's order, oldest first.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public IReadOnlyList<Withdrawal> All(string code)
    {
        var standing = new StandingWithdrawals(catalog, new CampaignStore(catalog).Get(code).Id);
        return [.. standing.Ids.Order().SelectMany(standing.Decisions)];
    }

    private static long Look(string code, string experiment, IReadOnlyList<string> experiments, Dictionary<string, long> ids, StandingWithdrawals standing, bool withdraw)
    {
        if (!ids.TryGetValue(experiment, out long id))
        {
            string near = Nearest.Of(experiment, ids.Keys) is { } nearest ? $"'{nearest}' may be meant" : $"'campaigns results {code}' lists those it has";
            throw new RefusedException($"The campaign '{code}' has no experiment '{experiment}'; {near}. Nothing was changed.");
        }

        if (experiments.Count(e => e == experiment) > 1)
        {
            throw new RefusedException($"The experiment '{experiment}' is named twice; nothing was changed. Name it once.");
        }

        return standing.IsWithdrawn(id) != withdraw
            ? id
            : throw new RefusedException($"The experiment '{experiment}' of '{code}' {(withdraw ? "is withdrawn already" : "is not withdrawn, so there is nothing to take back")}; nothing was changed.");
    }

    private static LedgerChange Change(Withdrawal decision)
    {
        string counted = decision.HadData ? "counts with p = 1" : "not in the family";
        return new LedgerChange($"{decision.Experiment}: standing", decision.IsWithdrawn ? "counted" : "withdrawn", decision.IsWithdrawn ? $"withdrawn, {counted}" : "counted");
    }

    /// <summary>The statements of one decision about several experiments.</summary>
    private sealed class WithdrawalRows : IDisposable
    {
        private readonly SqliteStatement _hasData;
        private readonly SqliteStatement _insert;
        private readonly long _now;
        private long _lastId;

        public WithdrawalRows(Catalog catalog)
        {
            _now = catalog.Now;
            _hasData = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM measurements WHERE experiment_id = ?1)");
            _insert = catalog.Prepare("INSERT INTO withdrawals (id, experiment_id, is_withdrawn, had_data, reason, named_by, made_at, program_version) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8)");
            using SqliteStatement last = catalog.Prepare("SELECT coalesce(max(id), 0) FROM withdrawals");
            last.Read();
            _lastId = last.Integer(0);
        }

        public bool HasData(long experimentId)
        {
            _hasData.Bind(1, experimentId).Read();
            bool has = _hasData.Integer(0) != 0;
            _hasData.Reset();
            return has;
        }

        public long Insert(long experimentId, Withdrawal decision)
        {
            _insert.Bind(1, ++_lastId).Bind(2, experimentId).Bind(3, decision.IsWithdrawn ? 1L : 0L).Bind(4, decision.HadData ? 1L : 0L)
                .Bind(5, decision.Reason).Bind(6, decision.NamedBy).Bind(7, _now).Bind(8, ProgramVersion.Current).Run();
            return _lastId;
        }

        public void Dispose()
        {
            _hasData.Dispose();
            _insert.Dispose();
        }
    }
}
