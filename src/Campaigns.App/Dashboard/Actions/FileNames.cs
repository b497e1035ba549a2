namespace Campaigns.App.Dashboard.Actions;

/// <summary>Completes the path of a file as it is typed.</summary>
internal static class FileNames
{
    private const int Most = 1000;
    private const string Home = "~/";

    /// <summary>The files and folders whose path begins with a text; folders end with a slash. Hidden ones only where their dot was typed.</summary>
    /// <param name="typed">What was typed so far.</param>
    public static IReadOnlyList<Suggestion> That(string typed)
    {
        int slash = typed.LastIndexOf('/');
        (string folder, string start) = (typed[..(slash + 1)], typed[(slash + 1)..]);
        try
        {
            var place = new DirectoryInfo(folder.Length == 0 ? "." : Whole(folder));
            return
            [
                .. place.EnumerateFileSystemInfos().Where(f => f.Name.StartsWith(start, StringComparison.Ordinal) && (start.Length > 0 || f.Name[0] != '.'))
                    .Take(Most).OrderBy(f => f.Name, StringComparer.Ordinal)
                    .Select(f => f is DirectoryInfo ? f.Name + "/" : f.Name).Select(name => new Suggestion(folder + name, name)),
            ];
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException or System.Security.SecurityException)
        {
            return [];
        }
    }

    /// <summary>A path as the system knows it: <c>~/</c> stands for the user's own folder.</summary>
    /// <param name="typed">What was typed.</param>
    public static string Whole(string typed) => typed.StartsWith(Home, StringComparison.Ordinal)
        ? Path.Combine(Environment.GetFolderPath(Environment.SpecialFolder.UserProfile), typed[Home.Length..])
        : typed;

    /// <summary>The longest start that texts have in common.</summary>
    /// <param name="texts">One or more texts.</param>
    public static string CommonStart(IReadOnlyList<string> texts)
    {
        string common = texts[0];
        foreach (string text in texts.Skip(1))
        {
            int same = common.AsSpan().CommonPrefixLength(text);
            common = common[..(same > 0 && same < common.Length && char.IsLowSurrogate(common[same]) ? same - 1 : same)];
        }

        return common;
    }
}
