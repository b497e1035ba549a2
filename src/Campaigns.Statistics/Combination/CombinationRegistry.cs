namespace Campaigns.Statistics.Combination;

/// <summary>Every test of the global null that the program offers, in the order in which people see them.</summary>
public static class CombinationRegistry
{
    /// <summary>The tests, those that hold under wider conditions first.</summary>
    public static IReadOnlyList<CombinationTest> All { get; } =
    [
        new SimesAnyCombination(),
        new SimesCombination(),
        new CauchyCombination(),
        new FisherCombination(),
        new StoufferCombination(),
    ];

    /// <summary>The test with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static CombinationTest? Find(string key) => All.FirstOrDefault(t => t.Key == key);
}
