namespace Campaigns.Statistics.Corrections;

/// <summary>Every batch correction that the program offers, in the order in which people see them.</summary>
public static class CorrectionRegistry
{
    /// <summary>The corrections, from none to the strictest demand on dependence.</summary>
    public static IReadOnlyList<Correction> All { get; } = [];

    /// <summary>The correction with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static Correction? Find(string key) => All.FirstOrDefault(c => c.Key == key);
}
