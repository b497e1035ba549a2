using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Commands;

/// <summary>A campaign in words.</summary>
internal static class CampaignText
{
    public const string Caution =
        "Survival is evidence, under stated assumptions, that group means differ. It is no release, safety or compliance decision: those belong to the laboratory's quality system, its regulator, and a qualified statistician's review.";

    /// <summary>What a campaign without a plan is.</summary>
    public const string Exploratory = "Exploratory: the experiments were taken from the data, not from a plan made before it.";

    /// <summary>For example "false discovery rate".</summary>
    public static string RateWords(ErrorRate rate) => rate switch
    {
        ErrorRate.Familywise => "familywise error rate",
        ErrorRate.FalseDiscovery => "false discovery rate",
        _ => "error rate of each test alone",
    };

    /// <summary>For example "false discovery rate at 0.05 by Benjamini-Hochberg".</summary>
    public static string Goal(Campaign campaign) => Holds(campaign)
        ? $"{RateWords(campaign.ErrorRate)} at {campaign.Level} by {FamilyText.Procedures(campaign)}"
        : $"goal: {RateWords(campaign.ErrorRate)} at {campaign.Level}, which {FamilyText.Procedures(campaign)} {(campaign.JudgedFamilies.Count > 1 ? "do" : "does")} not hold";

    /// <summary>Whether every procedure of a campaign holds the error rate that is its goal; one that holds the familywise rate holds the false discovery rate too.</summary>
    public static bool Holds(Campaign campaign)
    {
        IEnumerable<ErrorProcedure> procedures = campaign.JudgedFamilies.Count == 0
            ? [FamilyVerdict.ProcedureOf(campaign)]
            : campaign.JudgedFamilies.Select(f => FamilyVerdict.ProcedureOf(campaign, f));
        return procedures.All(p => FamilyPlan.Holds(p, campaign.ErrorRate));
    }

    /// <summary>The lines under every table of results: what was assumed, which procedure, what it promises.</summary>
    /// <param name="standing">The campaign in figures.</param>
    /// <param name="tests">Keys of the tests behind the rows shown.</param>
    public static IReadOnlyList<string> Footnotes(CampaignOverview standing, IEnumerable<string> tests)
    {
        Campaign campaign = standing.Campaign;
        List<string> lines =
        [
            .. Procedure(standing),
            .. TestsOf(tests).Select(test => $"{test.Name}, assumes: {char.ToLowerInvariant(test.Assumes[0])}{test.Assumes[1..]}"),
        ];
        if (campaign.IsExploratory)
        {
            lines.Add(Exploratory);
        }

        lines.AddRange(Deviations(standing));
        lines.Add(ReviewLine(standing));
        return lines;
    }

    /// <summary>Which procedure decides, over what, and what it promises.</summary>
    public static IEnumerable<string> Procedure(CampaignOverview standing) => FamilyVerdict.ProcedureOf(standing.Campaign) is OnlineProcedure online
        ? [.. OnlineText.Lines(standing, online), .. FamilyText.Warnings(standing)]
        : FamilyText.Lines(standing);

    /// <summary>Lines on experiments that were withdrawn or deviate from their plan; empty where none does.</summary>
    /// <param name="standing">The campaign in figures.</param>
    /// <param name="steps">How what tells more is named; null for commands.</param>
    public static IEnumerable<string> Deviations(CampaignOverview standing, StepNames? steps = null)
    {
        steps ??= StepNames.Commands;
        foreach (string line in WithdrawalText.Lines(standing.Withdrawn, standing.FamilySize))
        {
            yield return line;
        }

        if (standing.AmendedPlan is { Amendments: > 0 } plan)
        {
            yield return FormattableString.Invariant($"The sealed plan was amended {(plan.Amendments == 1 ? "once" : Counted.Of(plan.Amendments, "time"))}: {Counted.Of(plan.Added, "experiment")} added, {plan.Changed} changed; {steps.PlanChanges(standing.Campaign.Code)} tells what, who, when and why.");
        }

        if (standing.AmendedCount > 0)
        {
            yield return FormattableString.Invariant($"Deviations: {Counted.Of(standing.AmendedCount, "experiment")}. {Counted.Word(standing.AmendedCount, "It", "Each")} received values after it had been tested, had values left out, was withdrawn at some time, was added or changed by an amendment of the sealed plan, or was tested short of its plan; {steps.Deviation(standing.Campaign.Code)} gives the reason.");
        }
    }

    private static IEnumerable<GroupTest> TestsOf(IEnumerable<string> keys)
    {
        string[] used = [.. keys.Distinct()];
        return GroupTestRegistry.All.Where(t => used.Contains(t.Key));
    }

    /// <summary>Whether the latest review is up to date.</summary>
    /// <param name="standing">The campaign in figures.</param>
    /// <param name="steps">How what helps is named; null for commands.</param>
    public static string ReviewLine(CampaignOverview standing, StepNames? steps = null)
    {
        steps ??= StepNames.Commands;
        string review = steps.Review(standing.Campaign.Code);
        if (standing.LastReview is not { } last)
        {
            return $"No review was taken yet; {ReviewWording.HowToTakeTheFirst(standing, steps)}.";
        }

        string which = FormattableString.Invariant($"Review {last.Number} of {last.At:yyyy-MM-dd HH:mm} UTC{(last.IsInterim ? " (interim: tested experiments only)" : "")}");
        return standing.AwaitingNewTest > 0
                ? FormattableString.Invariant($"{which} is out of date: {Counted.Of(standing.AwaitingNewTest, "experiment")} {Counted.Word(standing.AwaitingNewTest, "awaits", "await")} a new test, because values were changed after the last one or because of being taken in again; {steps.Test(standing.Campaign.Code)} and {review} take this in.")
            : standing.DecisionsSinceReview > 0
                ? FormattableString.Invariant($"{which} is out of date: {Counted.Of(standing.DecisionsSinceReview, "decision")} to withdraw experiments, to take them in again or to amend the plan came after it; {review} takes a new one.")
            : standing.ResultsSinceReview > 0
                ? FormattableString.Invariant($"{which} is out of date: {Counted.Of(standing.ResultsSinceReview, "result")} came after it; {review} takes a new one.")
            : last.IsInterim && last.FamilySize != standing.FamilySize
                ? FormattableString.Invariant($"{which} counted {last.FamilySize} of {standing.FamilySize} hypotheses, these results count all of them; {review} takes a review that does.")
            : $"{which} holds these results.";
    }

    /// <summary>A campaign as one row for scripts.</summary>
    public static RowTable Row(Campaign campaign) => new(
        [
            new Column("campaign", "campaign"), new Column("title", "title"), new Column("error_rate", "error rate"),
            new Column("level", "level", true), new Column("correction", "correction"), new Column("sealed", "sealed"), new Column("exploratory", "exploratory"),
        ],
        [
            [
                Cell.Text(campaign.Code), Cell.Text(campaign.Title), Cell.Text(campaign.ErrorRate.Word()), Cell.Setting(campaign.Level.Value),
                Cell.Text(campaign.Correction), Cell.Truth(campaign.IsSealed), Cell.Truth(campaign.IsExploratory),
            ],
        ]);
}
