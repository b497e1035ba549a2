namespace Campaigns.Catalog;

/// <summary>Instants as they are stored: whole microseconds since 1970 UTC.</summary>
internal static class Instants
{
    public static long ToMicroseconds(DateTimeOffset instant) => (instant.UtcTicks - DateTimeOffset.UnixEpoch.Ticks) / TimeSpan.TicksPerMicrosecond;

    public static DateTimeOffset FromMicroseconds(long microseconds) => DateTimeOffset.UnixEpoch.AddTicks(microseconds * TimeSpan.TicksPerMicrosecond);
}
