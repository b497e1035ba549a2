using Campaigns.App.Dashboard;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Gives invented campaigns; what a test does not set is empty.</summary>
/// <param name="standings">How the first campaign stands each time that it is asked for, the last one from then on.</param>
internal sealed class SampleSource(params CampaignStanding[] standings) : IDashboardSource
{
    private int _asked;

    /// <summary>Campaigns beside the first.</summary>
    public IReadOnlyList<CampaignStanding> Others { get; init; } = [];

    /// <summary>Called with the code of every experiment that is read in full.</summary>
    public Action<string>? OnDetail { get; init; }

    public IReadOnlyList<RiskPoint> Risk { get; init; } = [];

    public IReadOnlyList<ReviewRecord> Records { get; init; } = [];

    public ReviewHistory Past { get; init; } = new([], []);

    public Func<int, int, (ReviewComparison Comparison, IReadOnlyDictionary<long, string> Codes)>? Between { get; init; }

    public IReadOnlyList<LedgerEntry> Entries { get; init; } = [];

    /// <summary>Data that wait, by campaign; of others nothing waits.</summary>
    public IReadOnlyDictionary<string, WaitingData> Unseen { get; init; } = new Dictionary<string, WaitingData>();

    /// <summary>Makes the proof of the record, on the thread on which it is asked for.</summary>
    public Func<Action<WorkProgress>, CancellationToken, LedgerProof>? Proving { get; init; }

    /// <summary>Called on the other thread before checks are made.</summary>
    public Action<Action<WorkProgress>, CancellationToken>? OnChecks { get; init; }

    /// <summary>How often entries were asked for.</summary>
    public int LedgerReads { get; private set; }

    public IReadOnlyDictionary<string, WaitingData> Waiting() =>
        ((IEnumerable<CampaignStanding>)[standings[^1], .. Others]).ToDictionary(s => s.Campaign.Code, s => Unseen.GetValueOrDefault(s.Campaign.Code, new WaitingData(s.Experiments.Count, 0, 0)));

    public SurvivorChecks Checks(CampaignStanding standing, Action<WorkProgress> progress, CancellationToken stop)
    {
        OnChecks?.Invoke(progress, stop);
        return SurvivorChecks.Of(standing, (s, code) => SampleCampaign.Detail(s.Experiments.First(e => e.Plan.Code == code)), progress, stop);
    }

    public LedgerProof Verify(Action<WorkProgress> progress, CancellationToken stop) =>
        Proving?.Invoke(progress, stop) ?? throw new CatalogException("This sample proves nothing.");

    public IReadOnlyList<CampaignOverview> Campaigns() => [standings[^1].Overview, .. Others.Select(o => o.Overview)];

    public CampaignStanding Standing(string campaign)
    {
        if (Others.FirstOrDefault(o => o.Campaign.Code == campaign) is { } other)
        {
            return other;
        }

        CampaignStanding standing = standings[Math.Min(_asked++, standings.Length - 1)];
        return standing.Campaign.Code == campaign ? standing : throw new RefusedException($"There is no campaign '{campaign}'.");
    }

    public ExperimentDetail Detail(CampaignStanding standing, string experiment)
    {
        OnDetail?.Invoke(experiment);
        return SampleCampaign.Detail(standing.Experiments.First(e => e.Plan.Code == experiment));
    }

    public IReadOnlyList<RiskPoint> RiskCurve(CampaignStanding standing) => Risk;

    public IReadOnlyList<ReviewRecord> Reviews(string campaign) => Records;

    public ReviewHistory History(string campaign) => Past;

    public (ReviewComparison Comparison, IReadOnlyDictionary<long, string> Codes) Compare(string campaign, int earlier, int later) =>
        Between?.Invoke(earlier, later) ?? throw new RefusedException("This sample compares no reviews.");

    /// <summary>Of an experiment, the entries whose subject names it.</summary>
    public LedgerHead Head() => Entries.Count == 0 ? LedgerHead.Empty : new LedgerHead(Entries[^1].Sequence, Entries[^1].Hash);

    public (IReadOnlyList<LedgerEntry> Entries, LedgerHead Head) Ledger(LedgerFilter filter)
    {
        LedgerReads++;
        return (
            filter.Experiment is { } experiment ? [.. Entries.Where(e => e.Campaign == filter.Campaign && e.Subject == experiment)] : Entries,
            Entries.Count == 0 ? LedgerHead.Empty : new LedgerHead(Entries[^1].Sequence, Entries[^1].Hash));
    }
}
