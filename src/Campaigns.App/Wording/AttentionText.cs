using Campaigns.App.Commands;
using Campaigns.App.Dashboard;
using Campaigns.App.Dashboard.Model;
using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>What needs attention in a campaign and in the programme, in words.</summary>
internal static class AttentionText
{
    private const int MostNamed = 20;

    /// <summary>A sentence for everything that waits in a campaign; empty where nothing does.</summary>
    /// <param name="of">What waits.</param>
    /// <param name="steps">How what helps is named.</param>
    public static IEnumerable<string> Needs(CampaignAttention of, StepNames steps)
    {
        ArgumentNullException.ThrowIfNull(of);
        ArgumentNullException.ThrowIfNull(steps);
        string code = of.Overview.Campaign.Code;
        if (of.IsPlanOpen)
        {
            yield return $"The plan is still open, so that nothing can be tested; 'campaigns seal {code}' fixes it.";
        }

        if (of.NeverTested > 0)
        {
            string enough = of.Waiting.AsManyAsPlanned == 0
                ? $"none holds as many values as planned, so that {steps.TestIncomplete.Step} leaves them alone {steps.TestIncomplete.Unless}"
                : FormattableString.Invariant($"{of.Waiting.AsManyAsPlanned} of them with at least as many values as planned; {steps.Test(code)} tests those that are complete");
            yield return FormattableString.Invariant($"Data not tested: {Counted.Of(of.NeverTested, "experiment")} with data and no test, {enough}.");
        }

        if (of.AwaitingNewTest > 0 && of.Overview.LastReview is null)
        {
            yield return FormattableString.Invariant($"New test awaited by {Counted.Of(of.AwaitingNewTest, "experiment")}, because values were changed after the last one or because of being taken in again; {steps.Test(code)} runs it.");
        }

        if (of.LacksReview || of.IsReviewBehind)
        {
            yield return CampaignText.ReviewLine(of.Overview, steps);
        }

        foreach (FamilyStanding family in of.Overview.Families.Where(f => !f.IsOpen))
        {
            yield return FamilyText.Line(of.Overview.Campaign, family);
        }
    }

    /// <summary>That nothing waits in a campaign.</summary>
    public static string Nothing(CampaignOverview overview)
    {
        ArgumentNullException.ThrowIfNull(overview);
        return overview.LastReview is null ? "Nothing waits: there is nothing yet to test or to review." : "Nothing waits: what has data is tested, and the latest review holds it.";
    }

    /// <summary>What should be known of a campaign though nothing waits for it: deviations, no plan before the data.</summary>
    /// <param name="overview">The campaign in figures.</param>
    /// <param name="steps">How what tells more is named.</param>
    public static IEnumerable<string> ToKnow(CampaignOverview overview, StepNames steps)
    {
        ArgumentNullException.ThrowIfNull(overview);
        return
        [
            .. overview.Campaign.IsExploratory ? [CampaignText.Exploratory] : Array.Empty<string>(),
            .. CampaignText.Deviations(overview, steps),
        ];
    }

    /// <summary>What needs attention over all campaigns, in one sentence.</summary>
    /// <param name="all">The campaigns.</param>
    /// <param name="campaign">Code of the campaign whose survivors were checked.</param>
    /// <param name="checks">What was found there; null where no checks were made.</param>
    public static string Total(IReadOnlyList<CampaignAttention> all, string campaign, SurvivorChecks? checks)
    {
        ArgumentNullException.ThrowIfNull(all);
        int needing = all.Count(a => a.Count > 0);
        string[] parts =
        [
            .. In("data not tested", a => a.NeverTested, counts: true),
            .. In("new test awaited", a => a.AwaitingNewTest, counts: true),
            .. In("review out of date", a => a.IsReviewBehind ? 1 : 0, counts: false),
            .. In("no review yet", a => a.LacksReview ? 1 : 0, counts: false),
            .. In("plan still open", a => a.IsPlanOpen ? 1 : 0, counts: false),
            .. In("gates closed", a => a.ClosedFamilies > 0 ? 1 : 0, counts: false),
        ];
        string head = needing == 0
            ? FormattableString.Invariant($"Nothing waits in {Counted.Of(all.Count, "campaign")}")
            : FormattableString.Invariant($"{needing} of {Counted.Of(all.Count, "campaign")} {Counted.Word(needing, "needs", "need")} attention: {string.Join(", ", parts)}");
        int withdrawn = all.Sum(a => a.Overview.Withdrawn.All);
        int amended = all.Sum(a => a.Overview.AmendedPlan.Amendments);
        string known = string.Join(", ", (string[])
        [
            .. withdrawn > 0 ? [FormattableString.Invariant($"{withdrawn} withdrawn")] : Array.Empty<string>(),
            .. amended > 0 ? [Counted.Of(amended, "plan amendment")] : Array.Empty<string>(),
            .. checks is { Warning.Count: > 0 } ? [FormattableString.Invariant($"checks warn in {checks.Warning.Count} of {Counted.Of(checks.Checked, "survivor")} of {campaign}")] : Array.Empty<string>(),
        ]);
        return known.Length == 0 ? head + "." : $"{head}. To know: {known}.";

        IEnumerable<string> In(string what, Func<CampaignAttention, int> count, bool counts)
        {
            int campaigns = all.Count(a => count(a) > 0);
            if (campaigns > 0)
            {
                string experiments = counts ? $" ({Counted.Of(all.Sum(count), "experiment")})" : "";
                yield return FormattableString.Invariant($"{what} in {campaigns}{experiments}");
            }
        }
    }

    /// <summary>What the checks of survivors saw, a sentence and a line an experiment; or how they can be made.</summary>
    /// <param name="campaign">Code of the campaign.</param>
    /// <param name="survivors">Its survivors.</param>
    /// <param name="checks">What was found; null before.</param>
    public static IEnumerable<string> Checks(string campaign, int survivors, SurvivorChecks? checks)
    {
        if (survivors == 0)
        {
            return ["No experiment survives, so that no checks are made here."];
        }

        if (checks is null)
        {
            return [FormattableString.Invariant($"Checks were not made here: they read every value. Key c makes them for the {Counted.Of(survivors, "survivor")} of {campaign}.")];
        }

        string made = FormattableString.Invariant($"Checks made for the {Counted.Of(checks.Checked, "survivor")} of {campaign} and for no other experiment: ");
        return checks.Warning.Count == 0
            ? [made + "none warns."]
            :
            [
                made + FormattableString.Invariant($"in {checks.Warning.Count} of them something warns. {Sentence.Start(ExperimentWording.ChecksAreAdvice)}."),
                .. checks.Warning.Take(MostNamed).Select(w => $"{w.Experiment}: {string.Join(" ", w.Warnings.Select(c => c.Finding.Saw))}"),
                .. checks.Warning.Count > MostNamed ? [FormattableString.Invariant($"and {checks.Warning.Count - MostNamed} more")] : Array.Empty<string>(),
            ];
    }
}
