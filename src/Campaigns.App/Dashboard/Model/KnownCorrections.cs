using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Dashboard.Model;

/// <summary>Whether this program has the procedures that a campaign was sealed with; one of a newer program may not be here.</summary>
public static class KnownCorrections
{
    /// <summary>Whether it has the campaign's and those of all its families.</summary>
    /// <param name="campaign">The campaign.</param>
    public static bool Are(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return IsOne(campaign.Correction) && campaign.JudgedFamilies.All(f => f.Correction is null || IsOne(f.Correction));
    }

    private static bool IsOne(string key) => CorrectionRegistry.Find(key) is not null || OnlineRegistry.Find(key) is not null;
}
