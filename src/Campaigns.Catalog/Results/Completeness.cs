namespace Campaigns.Catalog.Results;

/// <summary>Whether an experiment has the values that its plan asks for.</summary>
internal static class Completeness
{
    /// <summary>With a planned number: every group holds at least that many values (all groups of the plan, or all that came with the data where the plan names none, and at least two). Without: there is a value.</summary>
    /// <param name="groups">Group of each value.</param>
    /// <param name="groupCount">Groups of the experiment.</param>
    /// <param name="groupsArePlanned">Whether the plan named them.</param>
    /// <param name="replicates">Planned values in each group; null where the plan gives no number.</param>
    /// <param name="counts">Scratch, grown where needed.</param>
    public static bool IsComplete(ReadOnlySpan<ushort> groups, int groupCount, bool groupsArePlanned, int? replicates, ref int[] counts)
    {
        if (replicates is not { } needed)
        {
            return !groups.IsEmpty;
        }

        if (counts.Length < groupCount)
        {
            counts = new int[groupCount];
        }

        Array.Clear(counts);
        foreach (ushort group in groups)
        {
            if (group >= groupCount)
            {
                throw Measurements.PackReader.Damaged();
            }

            counts[group]++;
        }

        int full = 0;
        for (int group = 0; group < groupCount; group++)
        {
            full += counts[group] >= needed ? 1 : 0;
        }

        return full == groupCount && (groupsArePlanned || groupCount >= 2);
    }
}
