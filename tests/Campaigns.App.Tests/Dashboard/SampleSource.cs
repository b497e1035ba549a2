using Campaigns.App.Dashboard;
using Campaigns.Catalog.Ledger;
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

    public (IReadOnlyList<LedgerEntry> Entries, LedgerHead Head) Ledger(LedgerFilter filter) =>
        (Entries, Entries.Count == 0 ? LedgerHead.Empty : new LedgerHead(Entries[^1].Sequence, Entries[^1].Hash));
}
