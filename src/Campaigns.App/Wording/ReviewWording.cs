using System.Globalization;
using Campaigns.App.Output;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Wording;

/// <summary>Reviews, and what lies between two of them, in words.</summary>
internal static class ReviewWording
{
    /// <summary>What brings a campaign without a review to its first one, in a clause: nothing is reviewed before it is tested.</summary>
    /// <param name="standing">The campaign in figures.</param>
    /// <param name="steps">How what helps is named; sealing is done in the shell alone.</param>
    public static string HowToTakeTheFirst(CampaignOverview standing, StepNames steps)
    {
        string code = standing.Campaign.Code;
        return standing.TestedCount > 0 ? $"{steps.Review(code)} takes one"
            : standing.Campaign.IsSealed ? $"nothing has a result yet: {steps.Test(code)} tests the experiments that are complete"
            : $"the plan is not sealed yet: 'campaigns seal {code}' seals it, and {steps.Test(code)} then tests the experiments that are complete";
    }

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
        $"Review {review.Number} of {code} will hold: {review.SurvivorCount} of {review.TestedCount} tested experiments survive under {ProcedureName(review.Correction)} at level {review.Level}, in a family of {review.FamilySize}.{(review.IsInterim ? " Interim: only tested experiments are counted." : "")}");

    /// <summary>Which corrections at which levels the lines of a review belong to, with its number and its date.</summary>
    /// <param name="review">The review.</param>
    /// <param name="families">The families of its lines.</param>
    public static IEnumerable<string> Applied(ReviewHead review, IEnumerable<FamilyStanding> families)
    {
        string which = FormattableString.Invariant($"Review {review.Number} of {review.At:yyyy-MM-dd HH:mm} UTC");
        FamilyStanding[] applied = [.. families.DistinctBy(f => f.Name)];
        return applied.Length == 0
            ? [$"{which}: {ProcedureName(review.Correction)} at {review.Level}."]
            : applied.Select(f => FormattableString.Invariant($"{which}{(f.Name.Length > 0 ? $", family {f.Name}" : "")}: {ProcedureName(f.Correction)} at {FamilyText.Level(f.Level)} over {Counted.Of(f.Size, "hypothesis", "hypotheses")}."));
    }

    /// <summary>What a family was on the day of a review.</summary>
    public static string Family(ReviewHead review, FamilyStanding family) => FormattableString.Invariant(
        $"Review {review.Number}, family {family.Name}: {ProcedureName(family.Correction)} at {FamilyText.Level(family.Level)}, {family.Size} counted, {family.Tested} tested, {family.Survivors} {(family.Survivors == 1 ? "survives" : "survive")}{(family.IsOpen ? "" : "; closed")}.");

    /// <summary>What changed between two reviews, in a sentence.</summary>
    public static string Summary(ReviewComparison comparison)
    {
        int gained = comparison.Differences.Count(d => d.IsGained);
        return comparison.NothingChanged && comparison.PlanBefore != comparison.PlanAfter
            ? FormattableString.Invariant($"Between review {comparison.Before.Head.Number} and review {comparison.After.Head.Number} the plan was amended, from {Plan(comparison.PlanBefore)} to {Plan(comparison.PlanAfter)}; that changed no line: the same experiments with the same p-values, in families of the same size.")
            : comparison.NothingChanged
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

        if (comparison.PlanBefore != comparison.PlanAfter)
        {
            yield return $"The plan was amended between the two: {Plan(comparison.PlanBefore)} at the earlier review, {Plan(comparison.PlanAfter)} at the later one.";
        }

        if (!comparison.SizesBefore.SequenceEqual(comparison.SizesAfter))
        {
            yield return $"Hypotheses counted: {ReviewFamilyWording.Sizes(comparison)}.";
        }

        if (ReviewFamilyWording.Decisions(comparison) is { } decisions)
        {
            yield return decisions;
        }

        yield return FormattableString.Invariant(
            $"Lines in the later review alone: {comparison.Added}, in the earlier one alone: {comparison.Gone}; with another p-value: {comparison.OtherP}; with the same verdict and another adjusted p-value: {comparison.OtherAdjusted}.");
    }

    /// <summary>What stands below such a table.</summary>
    public static string Sealed(ReviewComparison comparison) =>
        $"Level and correction are those of the sealed plan in both: {ProcedureName(comparison.After.Head.Correction)} at {comparison.After.Head.Level}. A reason is found by judging one review again with one thing as it was in the other.";

    /// <summary>Why an experiment was gained or lost, in a sentence.</summary>
    public static string Why(ReviewDifference difference)
    {
        string events = Events(difference);
        return difference.Reason switch
        {
            ReviewReason.FirstTested => difference.Events.Any(e => e.Cause == ReviewCause.AmendedIn) ? $"amended into the plan and first tested since the earlier review{events}" : $"first tested since the earlier review{events}",
            ReviewReason.OwnP => $"its own p went from {P(difference.Before)} to {P(difference.After)}{events}",
            ReviewReason.FamilySize => FormattableString.Invariant($"its family {(difference.SizeAfter > difference.SizeBefore ? "grew" : "shrank")} from {difference.SizeBefore} to {difference.SizeAfter} hypotheses{ReviewFamilyWording.Behind(difference)}"),
            ReviewReason.OtherP => "p-values of other experiments moved the threshold",
            ReviewReason.FamilyOpened => $"the gate of its family opened{ReviewFamilyWording.Behind(difference)}",
            ReviewReason.FamilyClosed => $"the gate of its family closed{ReviewFamilyWording.Behind(difference)}",
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
            ? FormattableString.Invariant($"Review {review.Number}: the same to the byte, {Counted.Of(review.TestedCount, "line")}{versions}.")
            : FormattableString.Invariant($"Review {review.Number} does not come out of its record{versions}: {Counted.Of(outcome.Lines.Count, "line")} {Counted.Word(outcome.Lines.Count, "differs", "differ")}{string.Concat(outcome.Figures.Select(f => $"; {f}"))}. 'campaigns ledger verify' says whether stored rows were changed since.");
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
            parts.Add(FormattableString.Invariant($"its family went from {d.SizeBefore} to {d.SizeAfter} hypotheses{ReviewFamilyWording.Behind(d)}"));
        }

        parts.Add("p-values of others changed");
        return $"only together: {string.Join(", ", parts)}{events}";
    }

    private static string Events(ReviewDifference difference)
    {
        IEnumerable<string> clauses = difference.Events.Select(e => e.Reason is { Length: > 0 } reason ? $"{Clause(e.Cause)} ({reason})" : Clause(e.Cause));
        return difference.Events.Count == 0 ? "" : $": {string.Join(", ", clauses)}";
    }

    /// <summary>What was done, in a clause that follows the name of an experiment.</summary>
    internal static string Clause(ReviewCause cause) => cause switch
    {
        ReviewCause.AddedValues => "values added after its test",
        ReviewCause.Exclusion => "a value left out",
        ReviewCause.ExclusionTakenBack => "a value taken in again",
        ReviewCause.PlanAmendment => "its plan amended",
        ReviewCause.AmendedIn => "added by an amendment of the plan",
        ReviewCause.Withdrawal => "withdrawn",
        _ => "taken in again",
    };

    /// <summary>A version of the plan in the middle of a sentence.</summary>
    private static string Plan(int version) => version == 0 ? "plan version 0, as it was sealed," : FormattableString.Invariant($"plan version {version}");

    public static string ProcedureName(string key) => CorrectionRegistry.Find(key)?.Name ?? OnlineRegistry.Find(key)?.Name ?? key;

    private static string P(ReviewLine? line) => line is { } given ? NumberText.P(given.P) : "none";

    /// <summary>A review's number as a heading.</summary>
    public static string Number(ReviewHead review) => review.Number.ToString(CultureInfo.InvariantCulture);
}
