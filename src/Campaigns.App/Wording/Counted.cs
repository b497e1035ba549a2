using System.Globalization;

namespace Campaigns.App.Wording;

/// <summary>A number with its noun, in the singular or the plural.</summary>
internal static class Counted
{
    /// <summary>For example "1 experiment", "3 experiments".</summary>
    /// <param name="count">How many.</param>
    /// <param name="one">The noun for one.</param>
    /// <param name="many">The noun for any other number; null adds an s.</param>
    public static string Of(long count, string one, string? many = null) =>
        string.Create(CultureInfo.InvariantCulture, $"{count} {(count == 1 ? one : many ?? one + "s")}");

    /// <summary>The word that goes with a number, for example a verb: "is" for 1, "are" for any other.</summary>
    public static string Word(long count, string one, string many) => count == 1 ? one : many;
}
