namespace Campaigns.Statistics.GroupTests;

/// <summary>Every omnibus test that the program offers, in the order in which people see them.</summary>
public static class GroupTestRegistry
{
    /// <summary>The tests.</summary>
    public static IReadOnlyList<GroupTest> All { get; } =
    [
        new FTest(),
        new WelchTest(),
        new BrownForsytheTest(),
        new KruskalWallisTest(),
        new PermutationTest(),
        new BlockFTest(),
    ];

    /// <summary>The test with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static GroupTest? Find(string key) => All.FirstOrDefault(t => t.Key == key);
}
