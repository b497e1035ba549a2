using System.Globalization;

namespace Campaigns.App.Commands;

/// <summary>Small texts that several commands share.</summary>
internal static class Words
{
    /// <summary>An instant in UTC to the second, ISO 8601.</summary>
    public static string Instant(DateTimeOffset at) => at.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", CultureInfo.InvariantCulture);

    /// <summary>An instant in UTC to the microsecond, as it is stored.</summary>
    public static string ExactInstant(DateTimeOffset at) => at.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss.ffffff'Z'", CultureInfo.InvariantCulture);

    /// <summary>A probability in per cent for people: "64.2 %", and never a rounded 0 % or 100 % for what is neither.</summary>
    public static string Percent(double probability) => probability switch
    {
        0 => "0 %",
        1 => "100 %",
        < 0.001 => FormattableString.Invariant($"{100 * probability:0.0e-0} %"),
        > 0.999 => "more than 99.9 %",
        _ => FormattableString.Invariant($"{100 * probability:0.0} %"),
    };
}
