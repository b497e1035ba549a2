namespace Campaigns.Statistics.Online;

/// <summary>Every online procedure that the program offers, in the order in which people see them.</summary>
public static class OnlineRegistry
{
    /// <summary>The procedures: familywise error, then false discovery.</summary>
    public static IReadOnlyList<OnlineProcedure> All { get; } =
    [
        new AlphaSpending(),
        new OnlineFallback(),
        new AddisSpending(),
        new Lond(),
        new LondAny(),
        new Lord(),
        new Saffron(),
        new Addis(),
    ];

    /// <summary>The procedure with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static OnlineProcedure? Find(string key) => All.FirstOrDefault(p => p.Key == key);
}
