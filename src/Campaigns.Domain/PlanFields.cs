using System.Globalization;

namespace Campaigns.Domain;

/// <summary>A field of an experiment's plan as text, named as the column of a plan file.</summary>
/// <param name="Name">The column.</param>
/// <param name="Text">What the field says, as a plan file would; null where it says nothing.</param>
/// <param name="With">The plan with another text in the field.</param>
public sealed record PlanField(string Name, Func<PlannedExperiment, string?> Text, Func<PlannedExperiment, string?, PlannedExperiment> With);

/// <summary>What differs between two plans of one experiment, field by field.</summary>
public static class PlanFields
{
    /// <summary>Every field but the code, in the order of the columns.</summary>
    public static IReadOnlyList<PlanField> All { get; } =
    [
        new("title", e => OrNull(e.Title), (e, t) => e with { Title = t ?? "" }),
        new("response", e => OrNull(e.Response), (e, t) => e with { Response = t ?? "" }),
        new("unit", e => OrNull(e.Unit), (e, t) => e with { Unit = t ?? "" }),
        new("groups", e => e.Groups.Count == 0 ? null : string.Join('|', e.Groups), (e, t) => e with { Groups = t is null ? [] : t.Split('|') }),
        new("control", e => e.Control, (e, t) => e with { Control = t }),
        new("test", e => e.Test, (e, t) => e with { Test = t ?? "" }),
        new("follow_up", e => e.FollowUp, (e, t) => e with { FollowUp = t ?? "" }),
        new("replicates", e => e.Replicates?.ToString(CultureInfo.InvariantCulture), (e, t) => e with { Replicates = t is null ? null : int.Parse(t, CultureInfo.InvariantCulture) }),
        new("smallest_effect", e => Number(e.SmallestEffect), (e, t) => e with { SmallestEffect = Number(t) }),
        new("assumed_sd", e => Number(e.AssumedStandardDeviation), (e, t) => e with { AssumedStandardDeviation = Number(t) }),
        new("weight", e => Number(e.Weight), (e, t) => e with { Weight = Number(t) }),
        new("family", e => e.Family, (e, t) => e with { Family = t }),
        new("confirms", e => e.Confirms, (e, t) => e with { Confirms = t }),
        new("shared_control", e => e.SharedControl, (e, t) => e with { SharedControl = t }),
    ];

    /// <summary>The fields in which two plans differ, with both texts.</summary>
    /// <param name="before">One plan.</param>
    /// <param name="after">The other.</param>
    public static IEnumerable<(string Name, string? Before, string? After)> Differences(PlannedExperiment before, PlannedExperiment after) =>
        All.Select(f => (f.Name, f.Text(before), f.Text(after))).Where(f => f.Item2 != f.Item3);

    private static string? OrNull(string text) => text.Length == 0 ? null : text;

    private static double? Number(string? text) => text is null ? null : double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture);

    private static string? Number(double? value) => value?.ToString("R", CultureInfo.InvariantCulture);
}
