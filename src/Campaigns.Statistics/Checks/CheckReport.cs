namespace Campaigns.Statistics.Checks;

/// <summary>All checks of one experiment.</summary>
public static class CheckReport
{
    /// <summary>Makes every check of the registry.</summary>
    /// <param name="subject">The experiment's independent values and the layout fitted to them.</param>
    /// <returns>A line a check, in the order of <see cref="CheckRegistry"/>.</returns>
    /// <remarks>Cost: sorting, so N ln N; 0.1 s for 100,000 values in a group.</remarks>
    public static IReadOnlyList<CheckLine> Of(CheckSubject subject)
    {
        var lines = new CheckLine[CheckRegistry.All.Count];
        for (int i = 0; i < lines.Length; i++)
        {
            ExperimentCheck check = CheckRegistry.All[i];
            lines[i] = new CheckLine(check.Key, check.Name, check.Look(subject));
        }

        return lines;
    }
}
