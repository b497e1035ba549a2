using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Plans;

/// <summary>An experiment that another one names as the one it confirms.</summary>
/// <param name="Id">Key of the experiment.</param>
/// <param name="CampaignId">Key of its campaign.</param>
/// <param name="Campaign">Code of its campaign.</param>
/// <param name="Code">Its code.</param>
/// <param name="Confirms">What it confirms itself; null for nothing.</param>
internal sealed record ConfirmedExperiment(long Id, long CampaignId, string Campaign, string Code, string? Confirms);

/// <summary>Finds the experiments that plans name as confirmed: a code of the same campaign, else CAMPAIGN/EXPERIMENT.</summary>
internal sealed class ConfirmedExperiments : IDisposable
{
    private readonly SqliteStatement _find;
    private readonly SqliteStatement _campaign;

    public ConfirmedExperiments(Catalog catalog)
    {
        _find = catalog.Prepare("SELECT e.id, c.id, c.code, e.code, e.confirms FROM experiments e JOIN campaigns c ON c.id = e.campaign_id WHERE e.campaign_id = ?1 AND e.code = ?2");
        _campaign = catalog.Prepare("SELECT id FROM campaigns WHERE code = ?1");
    }

    /// <summary>The experiment named; null where there is none.</summary>
    /// <param name="campaignId">The campaign in whose plan it is named.</param>
    /// <param name="reference">As the plan names it.</param>
    public ConfirmedExperiment? Find(long campaignId, string reference)
    {
        if (FindIn(campaignId, reference) is { } near)
        {
            return near;
        }

        return Split(reference) is { } parts && CampaignId(parts.Campaign) is { } other ? FindIn(other, parts.Experiment) : null;
    }

    /// <summary>Whether there is a campaign with a code.</summary>
    public bool HasCampaign(string code) => CampaignId(code) is not null;

    /// <summary>Campaign and experiment of a name with a slash; codes of campaigns have none.</summary>
    public static (string Campaign, string Experiment)? Split(string reference) =>
        reference.IndexOf('/', StringComparison.Ordinal) is > 0 and int slash ? (reference[..slash], reference[(slash + 1)..]) : null;

    public void Dispose()
    {
        _find.Dispose();
        _campaign.Dispose();
    }

    private long? CampaignId(string code)
    {
        long? id = _campaign.Bind(1, code).Read() ? _campaign.Integer(0) : null;
        _campaign.Reset();
        return id;
    }

    private ConfirmedExperiment? FindIn(long campaignId, string code)
    {
        ConfirmedExperiment? found = _find.Bind(1, campaignId).Bind(2, code).Read()
            ? new ConfirmedExperiment(_find.Integer(0), _find.Integer(1), _find.Text(2), _find.Text(3), _find.NullableText(4))
            : null;
        _find.Reset();
        return found;
    }
}
