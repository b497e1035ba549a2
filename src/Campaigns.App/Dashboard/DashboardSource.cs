using Campaigns.Domain;

namespace Campaigns.App.Dashboard;

/// <summary>Where the dashboard gets what it shows. All three are used from one thread; what they throw ends the dashboard and reaches its caller, the terminal given back before.</summary>
/// <param name="Standing">The campaign as it stands at the start.</param>
/// <param name="Detail">One experiment in full, by its code.</param>
/// <param name="Reload">The campaign as it stands now.</param>
public sealed record DashboardSource(
    CampaignStanding Standing,
    Func<string, ExperimentDetail> Detail,
    Func<CampaignStanding> Reload);
