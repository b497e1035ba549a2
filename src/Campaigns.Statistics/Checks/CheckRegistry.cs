namespace Campaigns.Statistics.Checks;

/// <summary>Every check that the program makes, in the order in which people see them.</summary>
public static class CheckRegistry
{
    /// <summary>The checks.</summary>
    public static IReadOnlyList<ExperimentCheck> All { get; } =
    [
        new EqualSpread(),
        new Levene(),
        new Bartlett(),
        new SpreadRatio(),
        new Balance(),
        new Normality(),
        new Outliers(),
        new RunOrder(),
    ];

    /// <summary>The check with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static ExperimentCheck? Find(string key) => All.FirstOrDefault(c => c.Key == key);
}
