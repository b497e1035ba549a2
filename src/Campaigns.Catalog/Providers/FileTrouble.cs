namespace Campaigns.Catalog.Providers;

/// <summary>Says in words why a file could not be read or written, without the names of drafts that people never asked for.</summary>
public static class FileTrouble
{
    private const int NoSpaceUnix = 28;
    private const int QuotaUnix = 122;
    private const int DiskFullWindows = 112;

    /// <summary>Whether the disk had no room.</summary>
    /// <param name="error">What was thrown.</param>
    public static bool IsDiskFull(Exception error)
    {
        ArgumentNullException.ThrowIfNull(error);
        int code = error.HResult & 0xffff;
        return error is IOException && (OperatingSystem.IsWindows() ? code == DiskFullWindows : code is NoSpaceUnix or QuotaUnix);
    }

    /// <summary>A clause that ends with a full stop.</summary>
    /// <param name="error">What was thrown.</param>
    /// <param name="draft">A name that the message may hold; null for none.</param>
    /// <param name="asked">The name that was asked for in its place.</param>
    public static string Reason(Exception error, string? draft = null, string? asked = null)
    {
        ArgumentNullException.ThrowIfNull(error);
        if (IsDiskFull(error))
        {
            return "the disk is full; make room and try again.";
        }

        if (error is UnauthorizedAccessException)
        {
            return "you may not use the file or its folder; check the permissions.";
        }

        string message = draft is null ? error.Message : error.Message.Replace(draft, asked, StringComparison.Ordinal);
        return message.TrimEnd('.') + ".";
    }
}
