using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Units;

/// <summary>Which readings belong to which specimen; a reading without one is a specimen of its own.</summary>
internal sealed class SpecimenIndex
{
    private SpecimenIndex(int[] specimens, int[] counts, int unmarked)
    {
        Specimens = specimens;
        Counts = counts;
        UnmarkedCount = unmarked;
    }

    /// <summary>For each reading its specimen, numbered in the order in which their first readings come.</summary>
    public int[] Specimens { get; }

    /// <summary>Readings of each specimen; positive.</summary>
    public int[] Counts { get; }

    /// <summary>Readings for which no specimen is recorded.</summary>
    public int UnmarkedCount { get; }

    /// <summary>Whether no specimen has more than one reading.</summary>
    public bool IsTrivial => Counts.Length == Specimens.Length;

    /// <summary>Numbers the specimens of an experiment.</summary>
    /// <param name="readings">All its values.</param>
    /// <returns>Null where the experiment records no specimens.</returns>
    public static SpecimenIndex? Of(GroupedSample readings)
    {
        if (readings.Specimens.IsEmpty)
        {
            return null;
        }

        var specimens = new int[readings.Count];
        var numberOfSpecimen = new Dictionary<int, int>();
        var counts = new List<int>();
        int unmarked = 0;
        for (int i = 0; i < specimens.Length; i++)
        {
            int recorded = readings.Specimens[i];
            unmarked += recorded < 0 ? 1 : 0;
            if (recorded < 0 || !numberOfSpecimen.TryGetValue(recorded, out specimens[i]))
            {
                specimens[i] = counts.Count;
                counts.Add(0);
                if (recorded >= 0)
                {
                    numberOfSpecimen.Add(recorded, specimens[i]);
                }
            }

            counts[specimens[i]]++;
        }

        return new SpecimenIndex(specimens, [.. counts], unmarked);
    }
}
