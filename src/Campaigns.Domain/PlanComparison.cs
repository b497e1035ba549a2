namespace Campaigns.Domain;

/// <summary>Tells two plans apart in words.</summary>
public static class PlanComparison
{
    private const int MostTold = 20;

    /// <summary>What differs between a plan and another, experiment by experiment; the first twenty, and how many more.</summary>
    /// <param name="plan">The plan that stands.</param>
    /// <param name="other">The plan held against it.</param>
    /// <returns>Sentences; empty where both say the same.</returns>
    public static IReadOnlyList<string> Differences(IReadOnlyList<PlannedExperiment> plan, IReadOnlyList<PlannedExperiment> other)
    {
        ArgumentNullException.ThrowIfNull(plan);
        ArgumentNullException.ThrowIfNull(other);
        Dictionary<string, PlannedExperiment> others = other.ToDictionary(e => e.Code, StringComparer.Ordinal);
        var told = new List<string>();
        foreach (PlannedExperiment experiment in plan)
        {
            if (!others.Remove(experiment.Code, out PlannedExperiment? found))
            {
                told.Add($"{experiment.Code}: is in the plan, and missing in the other");
            }
            else if (!IsSame(experiment, found))
            {
                told.Add($"{experiment.Code}: {string.Join(", ", Fields(experiment, found))}");
            }
        }

        told.AddRange(other.Where(e => others.ContainsKey(e.Code)).Select(e => $"{e.Code}: is not in the plan"));
        return told.Count <= MostTold ? told : [.. told.Take(MostTold), FormattableString.Invariant($"... and {told.Count - MostTold} more")];
    }

    /// <summary>Whether two plans of one experiment say the same; groups that came with the data are no part of a plan that names none.</summary>
    public static bool IsSame(PlannedExperiment plan, PlannedExperiment other) => !Fields(plan, other).Any();

    private static IEnumerable<string> Fields(PlannedExperiment a, PlannedExperiment b)
    {
        (string Name, object? A, object? B)[] fields =
        [
            ("title", a.Title, b.Title), ("response", a.Response, b.Response), ("unit", a.Unit, b.Unit), ("control", a.Control, b.Control),
            ("test", a.Test, b.Test), ("follow_up", a.FollowUp, b.FollowUp), ("replicates", a.Replicates, b.Replicates),
            ("smallest_effect", a.SmallestEffect, b.SmallestEffect), ("assumed_sd", a.AssumedStandardDeviation, b.AssumedStandardDeviation),
            ("weight", a.Weight, b.Weight), ("family", a.Family, b.Family), ("confirms", a.Confirms, b.Confirms), ("shared_control", a.SharedControl, b.SharedControl), ("groups", string.Join('|', a.Groups), string.Join('|', b.Groups)),
        ];
        return fields.Where(f => !Equals(f.A, f.B)).Select(f => FormattableString.Invariant($"{f.Name} '{f.A}' against '{f.B}'"));
    }
}
