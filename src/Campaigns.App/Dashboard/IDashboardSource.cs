using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard;

/// <summary>Where the dashboard gets what it shows. It is asked from one thread; what it throws ends the dashboard and reaches its caller, the terminal given back before.</summary>
/// <remarks>What takes a way to tell progress and a wish to stop may be asked from any other thread meanwhile.</remarks>
public interface IDashboardSource
{
    /// <summary>Every campaign of the catalog in figures, in the order in which they were opened.</summary>
    IReadOnlyList<CampaignOverview> Campaigns();

    /// <summary>Data that wait for their test, by the code of the campaign.</summary>
    IReadOnlyDictionary<string, WaitingData> Waiting();

    /// <summary>A campaign as it stands now.</summary>
    /// <param name="campaign">Its code.</param>
    CampaignStanding Standing(string campaign);

    /// <summary>One experiment in full.</summary>
    /// <param name="standing">Its campaign.</param>
    /// <param name="experiment">Its code.</param>
    ExperimentDetail Detail(CampaignStanding standing, string experiment);

    /// <summary>The cumulative risk of a campaign, test by test in the order of testing.</summary>
    /// <param name="standing">The campaign.</param>
    IReadOnlyList<RiskPoint> RiskCurve(CampaignStanding standing);

    /// <summary>The same in two steps, for large campaigns: what is read is read now, and what comes back reckons the points, on any thread.</summary>
    /// <param name="standing">The campaign.</param>
    Func<IReadOnlyList<RiskPoint>> ReadRiskCurve(CampaignStanding standing)
    {
        IReadOnlyList<RiskPoint> points = RiskCurve(standing);
        return () => points;
    }

    /// <summary>The reviews of a campaign with what stood behind each, oldest first.</summary>
    /// <param name="campaign">Its code.</param>
    IReadOnlyList<ReviewRecord> Reviews(string campaign);

    /// <summary>Which experiment survived in which review.</summary>
    /// <param name="campaign">The campaign's code.</param>
    ReviewHistory History(string campaign);

    /// <summary>What lies between two reviews, and the codes of the experiments by their keys.</summary>
    /// <param name="campaign">The campaign's code.</param>
    /// <param name="earlier">Number of the earlier review.</param>
    /// <param name="later">Number of the later one.</param>
    (ReviewComparison Comparison, IReadOnlyDictionary<long, string> Codes) Compare(string campaign, int earlier, int later);

    /// <summary>The end of the ledger as it stands now.</summary>
    LedgerHead Head();

    /// <summary>Entries of the ledger, oldest first, and its head at the same moment.</summary>
    /// <param name="filter">Which entries.</param>
    (IReadOnlyList<LedgerEntry> Entries, LedgerHead Head) Ledger(LedgerFilter filter);

    /// <summary>Makes the checks of the survivors of a campaign, on whatever thread asks.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="progress">Told how far it is.</param>
    /// <param name="stop">Ends it between two experiments, or inside one that reads.</param>
    /// <exception cref="OperationCanceledException">It was stopped.</exception>
    SurvivorChecks Checks(CampaignStanding standing, Action<WorkProgress> progress, CancellationToken stop);

    /// <summary>Proves the record whole, on whatever thread asks.</summary>
    /// <param name="progress">Told how far it is.</param>
    /// <param name="stop">Ends it.</param>
    /// <exception cref="OperationCanceledException">It was stopped.</exception>
    LedgerProof Verify(Action<WorkProgress> progress, CancellationToken stop);
}
