using Campaigns.App.Output;
using Campaigns.App.Wording;

namespace Campaigns.App.Commands;

/// <summary>Notices that several commands give.</summary>
internal static class Notices
{
    public static void IgnoredColumns(Host host, string path, IReadOnlyList<string> columns)
    {
        if (LoadWording.IgnoredColumns(path, columns) is { } ignored)
        {
            host.Notice(ignored);
        }
    }
}
