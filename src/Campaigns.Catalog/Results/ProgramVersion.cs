namespace Campaigns.Catalog.Results;

/// <summary>The version that is written beside every result.</summary>
public static class ProgramVersion
{
    /// <summary>For example "0.1.0".</summary>
    public static string Current { get; } = typeof(ProgramVersion).Assembly.GetName().Version?.ToString(3) ?? "unknown";
}
