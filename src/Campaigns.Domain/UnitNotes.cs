using Campaigns.Statistics.Units;

namespace Campaigns.Domain;

/// <summary>Sentences about what was taken as one observation.</summary>
public static class UnitNotes
{
    /// <summary>Experiments named in one sentence.</summary>
    private const int MostNamed = 8;

    /// <summary>A warning where values that name no specimen look like repeated readings; null where they do not.</summary>
    /// <param name="plan">Names the planned replicates.</param>
    /// <param name="groups">Group of each value.</param>
    /// <param name="groupCount">Groups of the experiment.</param>
    public static string? Repeats(PlannedExperiment plan, ReadOnlySpan<ushort> groups, int groupCount)
    {
        ArgumentNullException.ThrowIfNull(plan);
        if (plan.Replicates is not { } replicates)
        {
            return null;
        }

        var counts = new int[groupCount];
        foreach (ushort group in groups)
        {
            counts[group]++;
        }

        return RepeatedReadings.AreLikely(counts, replicates)
            ? FormattableString.Invariant($"Warning: {groups.Length} values where {replicates} in each group were planned look like repeated readings of one specimen, which are not independent and make p too small. Record the specimen of every value in a column 'specimen'.")
            : null;
    }

    /// <summary>What a list of results is to say about the units of its experiments; empty where there is nothing to say.</summary>
    /// <param name="experiments">The experiments listed.</param>
    public static IEnumerable<string> Of(IEnumerable<ExperimentResult> experiments)
    {
        ExperimentResult[] tested = [.. experiments.Where(e => e.Status.WasTested())];
        string[] averaged = [.. tested.Where(e => e.SpecimenCount < e.ObservationCount).Select(e => e.Plan.Code)];
        if (averaged.Length > 0)
        {
            yield return $"Readings of one specimen are not independent, so the test ran on the means of specimens in {Names(averaged)}.";
        }

        // Counts of the groups are not at hand here; twice the planned total is what the rule of single groups comes to.
        string[] repeated = [.. tested.Where(e => e.SpecimenCount is null && e.Plan.Replicates is { } planned && e.ObservationCount >= 2L * planned * e.GroupCount).Select(e => e.Plan.Code)];
        if (repeated.Length > 0)
        {
            yield return $"Warning: at least twice the planned values, with no specimen recorded, in {Names(repeated)}: repeated readings of one specimen are not independent and make p too small. Record the specimen of every value in a column 'specimen'.";
        }
    }

    private static string Names(string[] codes) => codes.Length <= MostNamed
        ? string.Join(", ", codes)
        : FormattableString.Invariant($"{string.Join(", ", codes.Take(MostNamed))} and {codes.Length - MostNamed} more");
}
