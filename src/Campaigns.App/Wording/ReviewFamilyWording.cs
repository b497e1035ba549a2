using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>What lies between two reviews in their families, in words.</summary>
internal static class ReviewFamilyWording
{
    private const int Named = 3;

    /// <summary>The families that count another number of hypotheses, for example "family a from 5 to 4 (1 withdrawn), family b from 2 to 3".</summary>
    public static string Sizes(ReviewComparison comparison)
    {
        IEnumerable<string> sizes = comparison.Before.Members.Families.Zip(comparison.After.Members.Families)
            .Where(f => f.First.Size != f.Second.Size)
            .Select(f => FormattableString.Invariant($"{Name(f.First.Family.Name)} from {f.First.Size} to {f.Second.Size}"));
        string interim = comparison.Before.Head.IsInterim != comparison.After.Head.IsInterim
            ? $" (the {(comparison.Before.Head.IsInterim ? "earlier" : "later")} review is interim and counts tested experiments alone)"
            : comparison.After.Head.IsInterim ? " (interim reviews count tested experiments alone)" : "";
        return string.Join(", ", sizes) + interim;
    }

    /// <summary>Who was amended in, withdrawn or taken in again between the two, family by family; null where nobody was.</summary>
    public static string? Decisions(ReviewComparison comparison)
    {
        string[] families = [.. comparison.FamilyChanges.Where(f => f.AmendedIn + f.Withdrawn + f.TakenBack > 0).Select(Decisions)];
        if (families.Length == 0)
        {
            return null;
        }

        string rule = comparison.FamilyChanges.Any(f => f.Withdrawn + f.TakenBack > 0)
            ? " Without data a withdrawn experiment leaves its family or comes back to it, with data it stays and counts with p = 1 meanwhile."
            : "";
        return $"Decided between the two: {string.Join("; ", families)}.{rule}";
    }

    /// <summary>What was done in the families behind a gained or lost experiment, as the rest of a sentence; empty where nothing was.</summary>
    public static string Behind(ReviewDifference difference)
    {
        string[] clauses = [.. difference.FamilyEvents.Take(Named).Select(Clause)];
        string rest = difference.FamilyEvents.Count > Named ? FormattableString.Invariant($" and {difference.FamilyEvents.Count - Named} more") : "";
        string[] results = difference.GateResults == 0 ? [] : [FormattableString.Invariant($"{difference.GateResults} {(difference.GateResults == 1 ? "result" : "results")} new, changed or gone")];
        return results.Length + clauses.Length == 0 ? ""
            : difference.Gate is { } gate ? $": in family {gate} {string.Join(", ", results.Concat(clauses))}{rest}"
            : $" ({string.Join(", ", clauses)}{rest})";
    }

    private static string Decisions(ReviewFamilyChange change)
    {
        (int Count, string What)[] parts = [(change.AmendedIn, "amended in"), (change.Withdrawn, "withdrawn"), (change.TakenBack, "taken in again")];
        string said = string.Join(", ", parts.Where(p => p.Count > 0).Select(p => FormattableString.Invariant($"{p.Count} {p.What}")));
        return $"{said} in {Name(change.Family)}";
    }

    private static string Clause(ReviewEvent e)
    {
        string reason = e.Reason is { Length: > 0 } given ? $" ({given})" : "";
        string what = e.Cause == ReviewCause.PlanAmendment ? "amended" : ReviewWording.Clause(e.Cause);
        return $"{e.Experiment} {what}{reason}";
    }

    private static string Name(string family) => family.Length > 0 ? $"family {family}" : "the family";
}
