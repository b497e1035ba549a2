using System.Globalization;

namespace Campaigns.Catalog;

/// <summary>Instants as they are stored: whole microseconds since 1970 UTC.</summary>
internal static class Instants
{
    private static readonly long Earliest = ToMicroseconds(DateTimeOffset.MinValue), Latest = ToMicroseconds(DateTimeOffset.MaxValue);

    public static long ToMicroseconds(DateTimeOffset instant) => (instant.UtcTicks - DateTimeOffset.UnixEpoch.Ticks) / TimeSpan.TicksPerMicrosecond;

    public static DateTimeOffset FromMicroseconds(long microseconds) => DateTimeOffset.UnixEpoch.AddTicks(microseconds * TimeSpan.TicksPerMicrosecond);

    /// <summary>Whether a stored number is an instant at all; one that was tampered with may be none.</summary>
    public static bool IsInstant(long microseconds) => microseconds >= Earliest && microseconds <= Latest;

    /// <summary>A stored instant to the microsecond, ISO 8601; for one that is none, the number.</summary>
    public static string Text(long microseconds) => IsInstant(microseconds)
        ? FromMicroseconds(microseconds).UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss.ffffff'Z'", CultureInfo.InvariantCulture)
        : FormattableString.Invariant($"no instant ({microseconds})");
}
