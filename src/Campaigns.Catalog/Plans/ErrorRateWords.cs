using Campaigns.Statistics.Corrections;

namespace Campaigns.Catalog.Plans;

/// <summary>The frozen words by which a campaign's error rate is typed and stored.</summary>
public static class ErrorRateWords
{
    /// <summary>Every word that can be typed.</summary>
    public static IReadOnlyList<string> All { get; } = ["familywise", "false-discovery"];

    /// <summary>The word of an error rate.</summary>
    /// <exception cref="ArgumentOutOfRangeException">A campaign is not judged by this rate.</exception>
    public static string Word(this ErrorRate rate) => rate switch
    {
        ErrorRate.Familywise => "familywise",
        ErrorRate.FalseDiscovery => "false-discovery",
        _ => throw new ArgumentOutOfRangeException(nameof(rate), rate, "A campaign is judged by its familywise or its false discovery rate."),
    };

    /// <summary>The error rate of a word; null where it is none.</summary>
    public static ErrorRate? Parse(string word) => word switch
    {
        "familywise" => ErrorRate.Familywise,
        "false-discovery" => ErrorRate.FalseDiscovery,
        _ => null,
    };
}
