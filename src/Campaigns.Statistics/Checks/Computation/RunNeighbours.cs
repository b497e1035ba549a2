namespace Campaigns.Statistics.Checks.Computation;

/// <summary>Counts that the moments of successive differences are made of.</summary>
internal static class RunNeighbours
{
    /// <summary>Neighbours of a place in a run of so many values.</summary>
    public static int Degree(int i, int count) => i == 0 || i == count - 1 ? 1 : 2;

    /// <summary>Values of each level of a factor.</summary>
    public static long[] Counts(ReadOnlySpan<int> levels)
    {
        int highest = -1;
        foreach (int level in levels)
        {
            highest = Math.Max(highest, level);
        }

        var counts = new long[highest + 1];
        foreach (int level in levels)
        {
            counts[level]++;
        }

        return counts;
    }
}
