using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>What a decision about experiments or observations would change in the campaign; whether anything survives by it is left unsaid, since nobody should decide by that.</summary>
internal static class DecisionPreview
{
    /// <summary>Puts it into words.</summary>
    /// <param name="before">The campaign as it stands.</param>
    /// <param name="after">The campaign as it would stand.</param>
    /// <param name="afterResults">Whether results of the campaign had been seen.</param>
    public static IEnumerable<string> Of(CampaignOverview before, CampaignOverview after, bool afterResults)
    {
        yield return after.FamilySize == before.FamilySize
            ? FormattableString.Invariant($"The family stays at {before.FamilySize} {Hypotheses(before.FamilySize)}.")
            : FormattableString.Invariant($"The family has {before.FamilySize} {Hypotheses(before.FamilySize)} now, and will have {after.FamilySize}.");
        if (after.Withdrawn.CountAsOne != before.Withdrawn.CountAsOne)
        {
            yield return FormattableString.Invariant($"Experiments withdrawn with data, which stay in the family and count with p = 1: {before.Withdrawn.CountAsOne} now, {after.Withdrawn.CountAsOne} then.");
        }

        if (after.AwaitingNewTest > before.AwaitingNewTest)
        {
            int again = after.AwaitingNewTest - before.AwaitingNewTest;
            yield return FormattableString.Invariant($"{(before.TestedCount > after.TestedCount ? again == 1 ? "1 result falls: its experiment counts" : $"{again} results fall: their experiments count" : $"{Counted.Of(again, "experiment")} {Counted.Word(again, "awaits a new test and counts", "await a new test and count")}")} as not tested, with p = 1, until the test is run again.");
        }

        if (before.LastReview is { } review)
        {
            yield return FormattableString.Invariant($"Review {review.Number} is kept as it is, and is out of date from then on.");
        }

        yield return afterResults
            ? "Results of this campaign had been seen before: the record shows that this decision came after them, and whoever reads it will ask whether it was made because of them."
            : "No result of this campaign had been seen before, and the record shows that.";
    }

    private static string Hypotheses(int count) => count == 1 ? "hypothesis" : "hypotheses";
}
