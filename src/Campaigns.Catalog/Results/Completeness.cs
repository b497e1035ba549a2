using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Results;

/// <summary>Whether experiments have the values that their plans ask for.</summary>
internal sealed class Completeness
{
    private readonly HashSet<int> _seen = [];
    private int[] _counts = new int[16];

    /// <summary>With a planned number: every group holds at least that many replicates (all groups of the plan, or all that came with the data where the plan names none, and at least two). Without: there is a value.</summary>
    /// <remarks>A replicate is a specimen where specimens are recorded, a value elsewhere: further readings of a specimen add none.</remarks>
    /// <param name="values">The experiment's values.</param>
    /// <param name="groupCount">Groups of the experiment.</param>
    /// <param name="groupsArePlanned">Whether the plan named them.</param>
    /// <param name="replicates">Planned replicates in each group; null where the plan gives no number.</param>
    public bool IsComplete(ObservationColumns values, int groupCount, bool groupsArePlanned, int? replicates)
    {
        if (replicates is not { } needed)
        {
            return values.Count > 0;
        }

        Count(values, groupCount);
        int full = 0;
        for (int group = 0; group < groupCount; group++)
        {
            full += _counts[group] >= needed ? 1 : 0;
        }

        return full == groupCount && (groupsArePlanned || groupCount >= 2);
    }

    /// <summary>How many of the planned replicates are there; more than planned in one group do not make up for another.</summary>
    /// <param name="values">The experiment's values.</param>
    /// <param name="groupCount">Groups of the experiment.</param>
    /// <param name="replicates">Planned replicates in each group.</param>
    public int Present(ObservationColumns values, int groupCount, int replicates)
    {
        Count(values, groupCount);
        int present = 0;
        for (int group = 0; group < groupCount; group++)
        {
            present += Math.Min(_counts[group], replicates);
        }

        return present;
    }

    private void Count(ObservationColumns values, int groupCount)
    {
        if (_counts.Length < groupCount)
        {
            _counts = new int[groupCount];
        }

        Array.Clear(_counts);
        _seen.Clear();
        ReadOnlySpan<ushort> groups = values.Groups;
        ReadOnlySpan<int> specimens = values.SpecimenNames.Count > 0 ? values.Specimens : default;
        for (int i = 0; i < groups.Length; i++)
        {
            if (groups[i] >= groupCount)
            {
                throw PackReader.Damaged();
            }

            if (specimens.IsEmpty || specimens[i] < 0 || _seen.Add(specimens[i]))
            {
                _counts[groups[i]]++;
            }
        }
    }
}
