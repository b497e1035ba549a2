using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.App.Figures;

/// <summary>A kind of figure that can be asked for by name.</summary>
/// <param name="Key">Its key.</param>
/// <param name="What">What it shows, in a clause.</param>
/// <param name="IsOfExperiment">Whether it shows one experiment; else it shows the whole campaign.</param>
/// <param name="Make">Makes it.</param>
internal sealed record FigureKind(string Key, string What, bool IsOfExperiment, Func<FigureSource, Figure> Make);

/// <summary>Where a figure asked for by name gets what it shows: read when it is first asked for.</summary>
/// <param name="catalog">The open catalog.</param>
/// <param name="campaign">The campaign's code.</param>
/// <param name="experiment">The experiment's code; null for figures of the whole campaign.</param>
internal sealed class FigureSource(Catalog.Catalog catalog, string campaign, string? experiment)
{
    private CampaignStanding? _standing;

    /// <summary>The open catalog, for what only one kind of figure reads.</summary>
    public Catalog.Catalog Catalog { get; } = catalog;

    /// <summary>The campaign as it stands.</summary>
    public CampaignStanding Standing => _standing ??= new StandingReader(Catalog).Read(campaign);

    /// <summary>The experiment in full.</summary>
    public ExperimentDetail Detail() => new DetailReader(Catalog).Read(Standing, Experiment);

    /// <summary>Its observations, traced to their files.</summary>
    public IReadOnlyList<TracedObservation> Observations() => new ObservationReader(Catalog).Read(campaign, Experiment);

    /// <summary>The campaign's risk, test by test.</summary>
    public IReadOnlyList<RiskPoint> Risk() => RiskCurve.Of(Standing, new TestOrderReader(Catalog).LatestRuns(campaign));

    /// <summary>Its reviews, oldest first.</summary>
    public IReadOnlyList<ReviewHead> Reviews() => [.. new ReviewReader(Catalog).Records(campaign).Select(r => r.Head)];

    private string Experiment => experiment ?? throw new InvalidOperationException("This figure shows one experiment, and none is named.");
}
