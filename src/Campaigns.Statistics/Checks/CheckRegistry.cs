namespace Campaigns.Statistics.Checks;

/// <summary>Every check that the program makes, in the order in which people see them.</summary>
public static class CheckRegistry
{
    /// <summary>The checks.</summary>
    public static IReadOnlyList<ExperimentCheck> All { get; } = [];
}
