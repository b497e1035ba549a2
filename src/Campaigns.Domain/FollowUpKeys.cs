using Campaigns.Statistics.FollowUps;

namespace Campaigns.Domain;

/// <summary>The frozen words by which a plan names the comparisons that follow a test inside an experiment.</summary>
public static class FollowUpKeys
{
    /// <summary>Every word that a plan may use.</summary>
    public static IReadOnlyList<string> All { get; } = [FollowUpRegistry.None, .. FollowUpRegistry.All.Select(f => f.Key)];
}
