using System.Globalization;
using Campaigns.App.Output;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>Reviews, and what lies between two of them, in words.</summary>
internal static class ReviewWording
{
    /// <summary>For example "Review 2 of 2026-12-01 09:30 UTC: 3 of 10 tested experiments survive, in a family of 12".</summary>
    public static string Line(ReviewHead review) => FormattableString.Invariant(
        $"Review {review.Number} of {review.At:yyyy-MM-dd HH:mm} UTC: {review.SurvivorCount} of {review.TestedCount} tested experiments survive, in a family of {review.FamilySize}{(review.IsInterim ? " (interim: tested experiments only)" : "")}");

    /// <summary>What taking a review did, in a sentence.</summary>
    public static string Taken(string code, ReviewTaken taken)
    {
        ReviewHead review = taken.Review;
        string interim = review.IsInterim ? " Interim: only tested experiments were counted." : "";
        return taken.IsNew
            ? FormattableString.Invariant($"Review {review.Number} of {code}: {review.SurvivorCount} of {review.TestedCount} tested experiments survive, in a family of {review.FamilySize}.{interim}")
            : FormattableString.Invariant($"Nothing changed since review {review.Number} of {code}, which stands: {review.SurvivorCount} survivors in a family of {review.FamilySize}.{interim}");
    }

    /// <summary>What a review would hold, in a sentence.</summary>
    public static string Foreseen(string code, ReviewHead review) => FormattableString.Invariant(
        $"Review {review.Number} of {code} will hold: {review.SurvivorCount} of {review.TestedCount} tested experiments survive {review.Correction} at level {review.Level}, in a family of {review.FamilySize}.{(review.IsInterim ? " Interim: only tested experiments are counted." : "")}");

    /// <summary>What a family was on the day of a review.</summary>
    public static string Family(ReviewHead review, FamilyStanding family) => FormattableString.Invariant(
        $"Review {review.Number}, family {family.Name}: {family.Correction} at {FamilyText.Level(family.Level)}, {family.Size} counted, {family.Tested} tested, {family.Survivors} {(family.Survivors == 1 ? "survives" : "survive")}{(family.IsOpen ? "" : "; closed")}.");

    /// <summary>What changed between two reviews, in a sentence.</summary>
    public static string Summary(ReviewComparison comparison)
    {
        int gained = comparison.Differences.Count(d => d.IsGained);
        return comparison.NothingChanged
            ? FormattableString.Invariant($"Nothing changed between review {comparison.Before.Head.Number} and review {comparison.After.Head.Number}: the same experiments with the same p-values, in families of the same size.")
            : FormattableString.Invariant($"Between review {comparison.Before.Head.Number} and review {comparison.After.Head.Number}: {gained} gained, {comparison.Differences.Count - gained} lost, {comparison.Kept} survive in both.");
    }

    /// <summary>What stands behind the differences: sizes, experiments that came and went, those whose adjusted p-value moved without consequence.</summary>
    public static IEnumerable<string> Counts(ReviewComparison comparison)
    {
        if (comparison.NothingChanged)
        {
            yield break;
        }

        if (!comparison.SizesBefore.SequenceEqual(comparison.SizesAfter))
        {
            IEnumerable<string> sizes = comparison.Before.Members.Families.Zip(comparison.After.Members.Families)
                .Where(f => f.First.Size != f.Second.Size)
                .Select(f => FormattableString.Invariant($"{(f.First.Family.Name.Length > 0 ? $"family {f.First.Family.Name}" : "the family")} from {f.First.Size} to {f.Second.Size}"));
            yield return $"Hypotheses counted: {string.Join(", ", sizes)}{SizeCauses(comparison)}.";
        }

        yield return FormattableString.Invariant(
            $"{comparison.Added} experiment(s) have a line in the later review alone, {comparison.Gone} in the earlier one alone; {comparison.OtherP} have another p-value; {comparison.OtherAdjusted} kept their verdict with another adjusted p-value.");
    }

    /// <summary>What stands below such a table.</summary>
    public static string Sealed(ReviewComparison comparison) =>
        $"Level and correction are those of the sealed plan in both: {comparison.After.Head.Correction} at {comparison.After.Head.Level}. A reason is found by judging one review again with one thing as it was in the other.";

    /// <summary>Why an experiment was gained or lost, in a sentence.</summary>
    public static string Why(ReviewDifference difference)
    {
        string events = Events(difference);
        return difference.Reason switch
        {
            ReviewReason.FirstTested => difference.Events.Any(e => e.Cause == ReviewCause.AmendedIn) ? $"amended into the plan and first tested since the earlier review{events}" : $"first tested since the earlier review{events}",
            ReviewReason.OwnP => $"its own p went from {P(difference.Before)} to {P(difference.After)}{events}",
            ReviewReason.FamilySize => FormattableString.Invariant($"its family {(difference.SizeAfter > difference.SizeBefore ? "grew" : "shrank")} from {difference.SizeBefore} to {difference.SizeAfter} hypotheses"),
            ReviewReason.OtherP => "p-values of other experiments moved the threshold",
            ReviewReason.FamilyOpened => "the gate of its family opened",
            ReviewReason.FamilyClosed => "the gate of its family closed",
            ReviewReason.AwaitsTest => $"{(difference.IsGained ? "at the earlier review" : "at the later review")} its changed values awaited a new test{events}",
            ReviewReason.NoResult => $"{(difference.IsGained ? "at the earlier review" : "at the later review")} its data gave no p-value{events}",
            ReviewReason.Withdrawn => events.Length > 0 ? events[2..] : difference.IsGained ? "taken in again" : "withdrawn",
            _ => Together(difference, events),
        };
    }

    /// <summary>What taking a review again gave, in a sentence.</summary>
    public static string Again(ReviewRerun.Outcome outcome)
    {
        ReviewHead review = outcome.Review;
        string versions = review.ProgramVersion == ProgramVersion.Current ? "" : $" (taken by version {review.ProgramVersion} of the program, again by {ProgramVersion.Current})";
        return outcome.IsSame
            ? FormattableString.Invariant($"Review {review.Number}: the same to the byte, {review.TestedCount} line(s){versions}.")
            : FormattableString.Invariant($"Review {review.Number} does not come out of its record{versions}: {outcome.Lines.Count} line(s) differ{string.Concat(outcome.Figures.Select(f => $"; {f}"))}. 'campaigns ledger verify' says whether stored rows were changed since.");
    }

    private static string Together(ReviewDifference d, string events)
    {
        var parts = new List<string>();
        if (d.Before?.P != d.After?.P)
        {
            parts.Add($"its own p went from {P(d.Before)} to {P(d.After)}");
        }

        if (d.SizeBefore != d.SizeAfter)
        {
            parts.Add(FormattableString.Invariant($"its family went from {d.SizeBefore} to {d.SizeAfter} hypotheses"));
        }

        parts.Add("p-values of others changed");
        return $"only together: {string.Join(", ", parts)}{events}";
    }

    private static string SizeCauses(ReviewComparison comparison)
    {
        var causes = new List<string>();
        if (comparison.Before.Head.IsInterim != comparison.After.Head.IsInterim)
        {
            causes.Add($"the {(comparison.Before.Head.IsInterim ? "earlier" : "later")} review is interim and counts tested experiments alone");
        }
        else if (comparison.After.Head.IsInterim)
        {
            causes.Add("interim reviews count tested experiments alone");
        }

        if (comparison.AmendedIn > 0)
        {
            causes.Add(FormattableString.Invariant($"{comparison.AmendedIn} amended in"));
        }

        if (comparison.Withdrawn + comparison.TakenBack > 0)
        {
            causes.Add(FormattableString.Invariant($"{comparison.Withdrawn} withdrawn and {comparison.TakenBack} taken in again since: without data an experiment leaves its family or comes back to it, with data it stays and counts with p = 1 meanwhile"));
        }

        return causes.Count == 0 ? "" : $" ({string.Join("; ", causes)})";
    }

    private static string Events(ReviewDifference difference)
    {
        IEnumerable<string> clauses = difference.Events.Select(e => e.Reason is { Length: > 0 } reason ? $"{Clause(e.Cause)} ({reason})" : Clause(e.Cause));
        return difference.Events.Count == 0 ? "" : $": {string.Join(", ", clauses)}";
    }

    private static string Clause(ReviewCause cause) => cause switch
    {
        ReviewCause.AddedValues => "values added after its test",
        ReviewCause.Exclusion => "a value left out",
        ReviewCause.ExclusionTakenBack => "a value taken in again",
        ReviewCause.PlanAmendment => "its plan amended",
        ReviewCause.AmendedIn => "added by an amendment of the plan",
        ReviewCause.Withdrawal => "withdrawn",
        _ => "taken in again",
    };

    private static string P(ReviewLine? line) => line is { } given ? NumberText.P(given.P) : "none";

    /// <summary>A review's number as a heading.</summary>
    public static string Number(ReviewHead review) => review.Number.ToString(CultureInfo.InvariantCulture);
}
