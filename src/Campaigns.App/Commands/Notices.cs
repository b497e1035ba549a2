using Campaigns.App.Output;

namespace Campaigns.App.Commands;

/// <summary>Notices that several commands give.</summary>
internal static class Notices
{
    public static void IgnoredColumns(Host host, string path, IReadOnlyList<string> columns)
    {
        if (columns.Count > 0)
        {
            host.Notice($"Note: columns of '{path}' that are not used: {string.Join(", ", columns)}.");
        }
    }
}
