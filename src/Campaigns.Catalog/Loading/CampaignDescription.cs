using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Loading;

/// <summary>What a campaign's own file says of it, with the defaults put in.</summary>
public sealed record CampaignDescription
{
    /// <summary>The short name: 1 to 60 ASCII letters, digits, hyphens, underscores and points, of which the first is a letter or a digit.</summary>
    public required string Code { get; init; }

    /// <summary>One line for people.</summary>
    public string Title { get; init; } = "";

    /// <summary>Why the campaign is run.</summary>
    public string Purpose { get; init; } = "";

    /// <summary>Familywise or false discovery; false discovery where the file says nothing.</summary>
    public required ErrorRate ErrorRate { get; init; }

    /// <summary>Alpha or q; 0.05 where the file says nothing.</summary>
    public required SignificanceLevel Level { get; init; }

    /// <summary>Key of the correction; holm or bh, by the error rate, where the file says nothing.</summary>
    public required string Correction { get; init; }

    /// <summary>Settings of an online procedure; null where the file says nothing of them.</summary>
    public OnlineOptions? Online { get; init; }

    /// <summary>Key of the test for experiments whose plan names none; f where the file says nothing.</summary>
    public required string Test { get; init; }

    /// <summary>Key of the follow-up for experiments whose plan names none; none where the file says nothing.</summary>
    public required string FollowUp { get; init; }
}
