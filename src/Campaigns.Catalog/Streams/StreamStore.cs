using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Streams;

/// <summary>The streams of campaigns that are judged as experiments arrive: started, joined, never changed.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class StreamStore(Catalog catalog)
{
    private const string Columns = "number, procedure, level, horizon, shape, initial_wealth, lambda, tau, reason, started_at";

    /// <summary>An experiment's code with its place in a stream.</summary>
    /// <param name="Experiment">The code.</param>
    /// <param name="Entry">Its place.</param>
    public sealed record Line(string Experiment, StreamEntry Entry);

    /// <summary>The experiments that were given a level, stream by stream in the order of starting.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign, or it has a batch correction.</exception>
    public IReadOnlyList<Line> Decisions(string code) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = Online(code);
        Dictionary<long, string> codes = new PlanStore(catalog).Codes(stored.Id);
        return (IReadOnlyList<Line>)[.. StreamEntries.Lines(catalog, stored.Id).Select(l => new Line(codes[l.ExperimentId], l.Entry))];
    });

    /// <summary>Gives experiments their levels when they start, before their p-values are seen; all of them or none.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="experiments">Codes, in the order in which they start.</param>
    /// <exception cref="RefusedException">Not sealed; or an experiment is unknown, named twice, registered or tested already.</exception>
    public IReadOnlyList<Line> Register(string code, IReadOnlyList<string> experiments)
    {
        ArgumentNullException.ThrowIfNull(experiments);
        return catalog.Change(() =>
        {
            StoredCampaign stored = Sealed(code);
            Dictionary<string, long> ids = new PlanStore(catalog).Codes(stored.Id).ToDictionary(c => c.Value, c => c.Key, StringComparer.Ordinal);
            using var keeper = new StreamKeeper(catalog, stored);
            var withdrawals = new StandingWithdrawals(catalog, stored.Id);
            foreach (string experiment in experiments)
            {
                if (!ids.TryGetValue(experiment, out long id))
                {
                    string near = Nearest.Of(experiment, ids.Keys) is { } nearest ? $"'{nearest}' may be meant" : $"'campaigns results {code}' lists those it has";
                    throw new RefusedException($"The campaign '{code}' has no experiment '{experiment}'; {near}. Nothing was registered.");
                }

                if (keeper.IsRegistered(id))
                {
                    throw new RefusedException($"The experiment '{experiment}' of '{code}' {(experiments.Count(e => e == experiment) > 1 ? "is named twice" : "was given its level already")}; nothing was registered. 'campaigns decisions {code}' shows those that have one.");
                }

                if (withdrawals.IsWithdrawn(id))
                {
                    throw new RefusedException($"The experiment '{experiment}' of '{code}' is withdrawn, so it cannot start; nothing was registered. 'campaigns withdraw {code} {experiment} --take-back --reason TEXT' takes it in again.");
                }

                keeper.Register(id);
            }

            Dictionary<long, StreamEntry> entries = StreamEntries.Read(catalog, stored.Id);
            catalog.Record(new LedgerAct(LedgerAction.Register, code)
            {
                Subject = experiments.Count == 1 ? experiments[0] : FormattableString.Invariant($"{experiments.Count} experiments"),
                Changes = [.. experiments.Select(e => new LedgerChange($"{e}: level", null, FormattableString.Invariant($"{entries[ids[e]].Level:R}")))],
                Evidence = keeper.Evidence,
            });
            return (IReadOnlyList<Line>)[.. experiments.Select(e => new Line(e, entries[ids[e]]))];
        });
    }

    /// <summary>Starts a new stream for the experiments that have no level yet; what was decided stands.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="procedure">The procedure of the new stream.</param>
    /// <param name="options">Its settings; without a horizon, the experiments that are left.</param>
    /// <param name="reason">Why; stored and shown.</param>
    /// <exception cref="RefusedException">Not sealed, not judged as experiments arrive, or settings that do not fit.</exception>
    public StreamHead Restart(string code, OnlineProcedure procedure, OnlineOptions? options, string reason)
    {
        ArgumentException.ThrowIfNullOrWhiteSpace(reason);
        return catalog.Change(() =>
        {
            StoredCampaign stored = Sealed(code);
            var withdrawals = new StandingWithdrawals(catalog, stored.Id);
            int left = new FamilyReader(catalog).FamilySize(stored.Id) - StreamEntries.Stored(catalog, stored.Id).Count(e => !withdrawals.LeavesFamily(e.ExperimentId));
            OnlineSettings settings = OnlineVerdict.Settings(procedure, stored.Campaign.Level, options, left);
            long id = Start(stored, procedure, settings, reason);
            StreamHead before = stored.Campaign.Streams[^1];
            StreamHead stream = Read(stored.Id)[^1];
            catalog.Record(new LedgerAct(LedgerAction.Restream, code)
            {
                Subject = FormattableString.Invariant($"stream {stream.Number}"),
                Reason = reason,
                Changes = [new LedgerChange("procedure", before.Procedure.Key, procedure.Key), new LedgerChange("horizon", FormattableString.Invariant($"{before.Settings.Horizon}"), FormattableString.Invariant($"{settings.Horizon}"))],
                Evidence = [EvidenceRegistry.Stream.Of(id)],
            });
            return stream;
        });
    }

    /// <summary>Starts the first stream of a campaign that is being sealed; inside its transaction.</summary>
    /// <param name="stored">The campaign.</param>
    /// <param name="procedure">Its procedure.</param>
    /// <returns>Key of the stream.</returns>
    internal long StartFirst(StoredCampaign stored, OnlineProcedure procedure) =>
        Start(stored, procedure, OnlineVerdict.Settings(procedure, stored.Campaign.Level, stored.Campaign.Online, new FamilyReader(catalog).FamilySize(stored.Id)), null);

    /// <summary>The streams of a campaign, oldest first.</summary>
    /// <param name="campaignId">The campaign.</param>
    internal IReadOnlyList<StreamHead> Read(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM streams WHERE campaign_id = ?1 ORDER BY number");
        select.Bind(1, campaignId);
        var streams = new List<StreamHead>();
        while (select.Read())
        {
            OnlineProcedure procedure = OnlineRegistry.Find(select.Text(1))
                ?? throw new RefusedException($"A stream in the catalog names the procedure '{select.Text(1)}', which this version of the program does not have.");
            var settings = OnlineSettings.For(
                procedure, new SignificanceLevel(select.Real(2)), (int?)select.NullableInteger(3), select.Text(4), select.NullableReal(5), select.NullableReal(6), select.NullableReal(7));
            streams.Add(new StreamHead((int)select.Integer(0), procedure, settings, select.NullableText(8), Instants.FromMicroseconds(select.Integer(9))));
        }

        return streams;
    }

    private long Start(StoredCampaign stored, OnlineProcedure procedure, OnlineSettings settings, string? reason)
    {
        using SqliteStatement next = catalog.Prepare("SELECT coalesce(max(id), 0) + 1, coalesce(max(number) FILTER (WHERE campaign_id = ?1), 0) + 1 FROM streams");
        next.Bind(1, stored.Id).Read();
        (long id, long number) = (next.Integer(0), next.Integer(1));
        next.Reset();
        using SqliteStatement insert = catalog.Prepare($"INSERT INTO streams (id, campaign_id, {Columns}, program_version) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13)");
        insert.Bind(1, id).Bind(2, stored.Id).Bind(3, number).Bind(4, procedure.Key).Bind(5, settings.Level.Value).Bind(6, (long?)settings.Horizon).Bind(7, settings.Shape)
            .Bind(8, settings.InitialWealth).Bind(9, settings.Lambda).Bind(10, settings.Tau).Bind(11, reason).Bind(12, catalog.Now).Bind(13, ProgramVersion.Current).Run();
        return id;
    }

    private StoredCampaign Sealed(string code)
    {
        StoredCampaign stored = Online(code);
        return stored.Campaign.IsSealed
            ? stored
            : throw new RefusedException($"The campaign '{code}' is not sealed: its procedure and settings must be fixed before an experiment gets its level; run 'campaigns seal {code}'.");
    }

    private StoredCampaign Online(string code)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        return OnlineVerdict.ProcedureOf(stored.Campaign) is not null
            ? stored
            : throw new RefusedException($"The campaign '{code}' is judged by the correction '{stored.Campaign.Correction}' over its whole family, not as experiments arrive: it has no stream.");
    }
}
