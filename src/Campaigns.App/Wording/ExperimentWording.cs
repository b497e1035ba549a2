using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Wording;

/// <summary>What is said about the parts of one experiment, the same on paper and on screen.</summary>
internal static class ExperimentWording
{
    /// <summary>What the letters beside groups mean.</summary>
    public const string Letters = "Letters: groups that share one are not told apart by the follow-up inside this experiment alone, which is not the same as alike; what is claimed stands with the comparisons.";

    /// <summary>Why another F stands beside the planned test.</summary>
    public const string Beside = "Welch's F does not assume equal spreads; it is shown, not chosen: the plan names the test. Ranks do not cure unequal spreads.";

    /// <summary>What an experiment without a result counts as.</summary>
    private const string NoResult = "No result: the experiment counts as p = 1 in its family.";

    /// <summary>What an experiment without a result counts as, or that it does not count.</summary>
    public static string WithoutResult(ExperimentResult result) => result.LeftFamily ? WithdrawalText.NotCounted : NoResult;

    /// <summary>What checks are for.</summary>
    public const string ChecksAreAdvice = "advice; none changes the test";

    /// <summary>A deviation from the plan.</summary>
    /// <param name="clause">What was done and why, in a clause without a full stop.</param>
    public static string Deviation(string clause) => $"Deviation from the plan: {clause}.";

    /// <summary>What a verdict means, in a sentence: each test has its own hypothesis, and ranks and permutations say nothing of means alone.</summary>
    /// <param name="result">A result with a p-value.</param>
    public static string Verdict(ExperimentResult result) => result.Family is { IsOpen: false } closed ? $"Its family {closed.Name} is closed ({closed.Waits}): it does not survive before, whatever its p."
        : OnlineText.IsOnOtherData(result) ? $"It {(result.Survives == true ? "survives" : "does not survive")} by a decision that {OnlineText.MadeOn(result)} and stands. Its values were changed since: the p-value here is another one, and the decision says nothing of it."
        : result.Survives == true
        ? $"It survives: evidence against the hypothesis \"{GroupTestRegistry.Find(result.Plan.Test)?.Hypothesis}\""
        : "It does not survive: no difference shown, which is not the same as no difference.";

    /// <summary>What the intervals of the group table hold, and which groups have none and why; null where there is neither.</summary>
    public static string? MeanIntervals(ExperimentDetail detail)
    {
        string held = detail.Groups.Any(g => g.Summary.Lower is not null)
            ? FormattableString.Invariant($"Intervals: {100 * detail.Confidence:0.#} % for each mean alone, from the group's own standard deviation and Student's t.")
            : "";
        string[] without =
        [
            .. WithoutInterval(detail, g => g.Count == 1, "a single value, which tells nothing of spread"),
            .. WithoutInterval(detail, g => g is { Count: > 1, Lower: null }, "all values alike, which gives Student's t no spread to measure by"),
        ];
        string sentences = string.Join(" ", without.Prepend(held)).Trim();
        return sentences.Length > 0 ? sentences : null;
    }

    private static IEnumerable<string> WithoutInterval(ExperimentDetail detail, Func<GroupSummary, bool> isSuch, string why)
    {
        string[] groups = [.. detail.Groups.Where(g => isSuch(g.Summary)).Select(g => g.Label)];
        if (groups.Length > 0)
        {
            yield return $"No interval for {CautionText.Names(groups)}: {why}.";
        }
    }

    /// <summary>A test, what it assumes, and where it comes from.</summary>
    public static string Assumptions(GroupTest test) => $"{test.Name}, assumes: {AsClause(test.Assumes)} Source: {test.Source}";

    /// <summary>The verdict of a check in a word.</summary>
    public static string Word(CheckVerdict verdict) => verdict switch
    {
        CheckVerdict.Warns => "warns",
        CheckVerdict.Quiet => "quiet",
        _ => "not possible",
    };

    /// <summary>What the effect sizes mean.</summary>
    public static IEnumerable<string> Effects(CampaignStanding standing, ExperimentDetail detail)
    {
        if (detail.Variation is { } v)
        {
            yield return $"Residual standard deviation {NumberText.Screen(v.ResidualStandardDeviation, 5)} {detail.Result.Plan.Unit}".TrimEnd() + ".";
        }

        if (detail.Analysis.Effects is { } e)
        {
            string partial = detail.Variation?.Blocks is not null ? " Within blocks all of them are partial: the blocks are left out." : "";
            yield return FormattableString.Invariant($"Intervals: {100 * e.Confidence:0.###} %, from the noncentral F law; they leave out 0 exactly where the F test alone would call the groups different at {standing.Campaign.Level}. Omega and epsilon squared are negative where F is below 1.{partial}");
        }

        if (detail.Analysis.Effects is not null && detail.Result.Plan.Test is not ("f" or "block-f"))
        {
            yield return "Effect sizes and their intervals come from the one-way table and assume equal spreads, whatever the planned test assumes.";
        }

        if (detail.Analysis.DetectableAtStrictest is not null)
        {
            yield return FormattableString.Invariant($"Smallest detectable difference: between any two group means, with these group sizes and this residual standard deviation, found by the F test with a power of 0.8, at level {standing.Campaign.Level} alone and at the strictest threshold {FamilyText.Level(standing.FamilyOf(detail.Result).Level)}/{standing.FamilyOf(detail.Result).Size}. A smaller difference may well be there and not be shown.");
        }
    }

    /// <summary>How many comparisons are not claimed, and why: a narrow table has no room for the reasons beside the rows.</summary>
    public static IEnumerable<string> NotClaimed(IEnumerable<ExperimentComparison> comparisons)
    {
        string[] reasons = [.. comparisons.Where(c => c.NotClaimedBecause is not null).GroupBy(c => c.NotClaimedBecause!)
            .OrderByDescending(g => g.Count()).ThenBy(g => g.Key, StringComparer.Ordinal).Select(g => FormattableString.Invariant($"{g.Count()} ({g.Key})"))];
        if (reasons.Length > 0)
        {
            yield return $"Not claimed: {string.Join("; ", reasons)}.";
        }
    }

    /// <summary>What comparisons hold, and under which assumptions.</summary>
    /// <param name="standing">The campaign in figures.</param>
    /// <param name="followUps">Keys of the follow-ups behind the comparisons shown.</param>
    public static IEnumerable<string> Comparisons(CampaignOverview standing, IEnumerable<string> followUps)
    {
        string[] used = [.. followUps.Distinct().Order(StringComparer.Ordinal)];
        foreach (FollowUp followUp in FollowUpRegistry.All.Where(f => used.Contains(f.Key)))
        {
            yield return $"{followUp.Name}: {followUp.Holds} Assumes: {AsClause(followUp.Assumes)}";
        }

        if (used.Any(f => f != FollowUpRegistry.None))
        {
            var verdict = new ComparisonVerdict(standing.Campaign, standing.Families);
            yield return verdict.Guarantee;
            yield return FormattableString.Invariant($"Intervals (lower, upper) hold together inside one experiment at {100 * (1 - standing.Campaign.Level.Value):0.###} %; they are not widened for the selection of the experiment.");
            if (verdict.SelectedGuarantee is { Length: > 0 } selected)
            {
                yield return selected;
            }
        }
    }

    private static string AsClause(string sentence) => char.ToLowerInvariant(sentence[0]) + sentence[1..];
}
