using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard;

/// <summary>Shows what stands in a catalog.</summary>
/// <param name="catalog">The open catalog; nobody else uses it meanwhile.</param>
public sealed class CatalogSource(Catalog.Catalog catalog) : IDashboardSource
{
    private readonly OverviewReader _overviews = new(catalog);
    private readonly StandingReader _standings = new(catalog);
    private readonly DetailReader _details = new(catalog);
    private readonly ReviewReader _reviews = new(catalog);

    /// <inheritdoc/>
    public IReadOnlyList<CampaignOverview> Campaigns() => catalog.Snapshot(() => (CampaignOverview[])[.. new CampaignStore(catalog).All().Select(_overviews.Read)]);

    /// <inheritdoc/>
    public IReadOnlyDictionary<string, WaitingData> Waiting() => new WaitingDataReader(catalog).Read();

    /// <inheritdoc/>
    public CampaignStanding Standing(string campaign) => _standings.Read(campaign);

    /// <inheritdoc/>
    public ExperimentDetail Detail(CampaignStanding standing, string experiment) => _details.Read(standing, experiment);

    /// <inheritdoc/>
    public IReadOnlyList<RiskPoint> RiskCurve(CampaignStanding standing) => ReadRiskCurve(standing)();

    /// <inheritdoc/>
    public Func<IReadOnlyList<RiskPoint>> ReadRiskCurve(CampaignStanding standing)
    {
        ArgumentNullException.ThrowIfNull(standing);
        IReadOnlyDictionary<string, long> runs = new TestOrderReader(catalog).LatestRuns(standing.Campaign.Code);
        return () => Domain.RiskCurve.Of(standing, runs);
    }

    /// <inheritdoc/>
    public IReadOnlyList<ReviewRecord> Reviews(string campaign) => _reviews.Records(campaign);

    /// <inheritdoc/>
    public ReviewHistory History(string campaign) => _reviews.History(campaign);

    /// <inheritdoc/>
    public (ReviewComparison Comparison, IReadOnlyDictionary<long, string> Codes) Compare(string campaign, int earlier, int later) => new ReviewComparer(catalog).Compare(campaign, earlier, later);

    /// <inheritdoc/>
    public LedgerHead Head() => new LedgerReader(catalog).Head;

    /// <inheritdoc/>
    public (IReadOnlyList<LedgerEntry> Entries, LedgerHead Head) Ledger(LedgerFilter filter) => catalog.Snapshot(() =>
    {
        var reader = new LedgerReader(catalog);
        return ((IReadOnlyList<LedgerEntry>)[.. reader.Entries(filter)], reader.Head);
    });

    /// <inheritdoc/>
    public SurvivorChecks Checks(CampaignStanding standing, Action<WorkProgress> progress, CancellationToken stop)
    {
        // Two threads must not share a connection.
        using var own = Catalog.Catalog.Open(catalog.Path, catalog.Clock);
        own.StopOn(stop);
        return SurvivorChecks.Of(standing, new DetailReader(own).Read, progress, stop);
    }

    /// <inheritdoc/>
    public LedgerProof Verify(Action<WorkProgress> progress, CancellationToken stop)
    {
        using var own = Catalog.Catalog.OpenForProof(catalog.Path, catalog.Clock, isReadOnly: false);
        own.StopOn(stop);
        return new LedgerVerifier(own).Verify(known: null, progress);
    }
}
