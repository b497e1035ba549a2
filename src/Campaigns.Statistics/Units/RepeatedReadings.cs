namespace Campaigns.Statistics.Units;

/// <summary>Whether values that name no specimen look like several readings of each.</summary>
public static class RepeatedReadings
{
    /// <summary>How many values for one planned replicate make repeated readings likely.</summary>
    private const int Suspicious = 2;

    /// <summary>Whether repeated readings are likely: every group that holds values holds at least twice as many as replicates were planned.</summary>
    /// <param name="valuesPerGroup">Values of each group that name no specimen; 0 where a group has none.</param>
    /// <param name="plannedReplicates">Replicates that the plan names for a group.</param>
    /// <returns>False where nothing is planned (0 or less) or no group holds values.</returns>
    /// <remarks>
    /// A rule of the bench, not a test: one group with twice its replicates was probably run again, which is no reason for doubt; all of them with twice as many were probably read twice.
    /// Readings of one specimen that pass for independent make F too large by about their number.
    /// </remarks>
    public static bool AreLikely(ReadOnlySpan<int> valuesPerGroup, int plannedReplicates)
    {
        bool any = false;
        foreach (int n in valuesPerGroup)
        {
            if (n > 0 && n < (long)Suspicious * plannedReplicates)
            {
                return false;
            }

            any |= n > 0;
        }

        return any && plannedReplicates > 0;
    }
}
