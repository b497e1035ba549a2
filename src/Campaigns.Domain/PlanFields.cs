using System.Globalization;

namespace Campaigns.Domain;

/// <summary>A field of an experiment's plan as text, named as the column of a plan file.</summary>
/// <param name="Name">The column.</param>
/// <param name="Text">What the field says, as a plan file would; null where it says nothing.</param>
public sealed record PlanField(string Name, Func<PlannedExperiment, string?> Text);

/// <summary>What differs between two plans of one experiment, field by field.</summary>
public static class PlanFields
{
    /// <summary>Every field but the code, in the order of the columns.</summary>
    public static IReadOnlyList<PlanField> All { get; } =
    [
        new("title", e => OrNull(e.Title)),
        new("response", e => OrNull(e.Response)),
        new("unit", e => OrNull(e.Unit)),
        new("groups", e => e.Groups.Count == 0 ? null : string.Join('|', e.Groups)),
        new("control", e => e.Control),
        new("test", e => e.Test),
        new("follow_up", e => e.FollowUp),
        new("replicates", e => e.Replicates?.ToString(CultureInfo.InvariantCulture)),
        new("smallest_effect", e => Number(e.SmallestEffect)),
        new("assumed_sd", e => Number(e.AssumedStandardDeviation)),
        new("weight", e => Number(e.Weight)),
        new("family", e => e.Family),
        new("confirms", e => e.Confirms),
        new("shared_control", e => e.SharedControl),
    ];

    /// <summary>The fields in which two plans differ, with both texts.</summary>
    /// <param name="before">One plan.</param>
    /// <param name="after">The other.</param>
    public static IEnumerable<(string Name, string? Before, string? After)> Differences(PlannedExperiment before, PlannedExperiment after) =>
        All.Select(f => (f.Name, f.Text(before), f.Text(after))).Where(f => f.Item2 != f.Item3);

    private static string? OrNull(string text) => text.Length == 0 ? null : text;

    private static string? Number(double? value) => value?.ToString("R", CultureInfo.InvariantCulture);
}
