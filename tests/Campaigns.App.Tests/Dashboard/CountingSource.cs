using Campaigns.App.Dashboard;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Counts how often the campaigns are read.</summary>
internal sealed class CountingSource(IDashboardSource source, Action onCampaigns) : IDashboardSource
{
    public LedgerHead Head() => source.Head();

    public IReadOnlyList<CampaignOverview> Campaigns()
    {
        onCampaigns();
        return source.Campaigns();
    }

    public IReadOnlyDictionary<string, WaitingData> Waiting() => source.Waiting();

    public CampaignStanding Standing(string campaign) => source.Standing(campaign);

    public ExperimentDetail Detail(CampaignStanding standing, string experiment) => source.Detail(standing, experiment);

    public IReadOnlyList<RiskPoint> RiskCurve(CampaignStanding standing) => source.RiskCurve(standing);

    public IReadOnlyList<ReviewRecord> Reviews(string campaign) => source.Reviews(campaign);

    public ReviewHistory History(string campaign) => source.History(campaign);

    public (ReviewComparison Comparison, IReadOnlyDictionary<long, string> Codes) Compare(string campaign, int earlier, int later) => source.Compare(campaign, earlier, later);

    public (IReadOnlyList<LedgerEntry> Entries, LedgerHead Head) Ledger(LedgerFilter filter) => source.Ledger(filter);

    public SurvivorChecks Checks(CampaignStanding standing, Action<WorkProgress> progress, CancellationToken stop) => source.Checks(standing, progress, stop);

    public LedgerProof Verify(Action<WorkProgress> progress, CancellationToken stop) => source.Verify(progress, stop);
}
