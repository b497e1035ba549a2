namespace Campaigns.Statistics.FollowUps;

/// <summary>Every follow-up procedure that the program offers, in the order in which people see them.</summary>
public static class FollowUpRegistry
{
    /// <summary>The word by which a plan asks for no comparisons.</summary>
    public const string None = "none";

    /// <summary>The procedures.</summary>
    public static IReadOnlyList<FollowUp> All { get; } = [new TukeyKramer(), new GamesHowell(), new Dunnett(), new Scheffe(), new HolmPairs()];

    /// <summary>The procedure with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static FollowUp? Find(string key) => All.FirstOrDefault(f => f.Key == key);
}
