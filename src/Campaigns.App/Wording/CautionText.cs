using Campaigns.App.Commands;
using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>What the reader of a campaign's results has to be careful about, in sentences.</summary>
internal static class CautionText
{
    private const int MostNamed = 8;

    /// <summary>What is said where there is nothing else to be careful about.</summary>
    public const string Nothing = "The record holds no deviation from the plan, no warning of a check on a survivor and no experiment without a result. The assumptions of the tests remain assumptions.";

    /// <summary>All of it, what bears most on the result first; empty where there is nothing.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="overview">The campaign in figures.</param>
    /// <param name="excluded">Experiments of which observations are left out, each with how many.</param>
    /// <param name="looked">Survivors whose checks were looked at.</param>
    /// <param name="warned">Those of them on which a check warns, with the names of these checks.</param>
    public static IEnumerable<string> Of(
        CampaignStanding standing, CampaignOverview overview, IReadOnlyCollection<(string Experiment, int Count)> excluded, int looked, IReadOnlyCollection<(string Experiment, IReadOnlyList<string> Checks)> warned) =>
    [
        .. Plan(overview),
        .. IsUpToDate(overview) ? [] : (string[])[CampaignText.ReviewLine(overview)],
        .. Untested(overview),
        .. FamilyText.Warnings(overview),
        .. Checks(looked, warned),
        .. Excluded(excluded),
        .. CampaignText.Deviations(overview),
        .. Closed(overview),
        .. Arriving(standing),
        .. UnitNotes.Of(standing.Experiments),
        .. AdaptiveText.Cautions([FamilyVerdict.ProcedureOf(overview.Campaign)], overview.TestedCount),
    ];

    /// <summary>Names, the first of them where they are many.</summary>
    public static string Names(IReadOnlyCollection<string> names) => names.Count <= MostNamed
        ? string.Join(", ", names)
        : FormattableString.Invariant($"{string.Join(", ", names.Take(MostNamed))} and {names.Count - MostNamed} more");

    private static IEnumerable<string> Plan(CampaignOverview overview)
    {
        if (!overview.Campaign.IsSealed)
        {
            yield return overview.Campaign.IsExploratory
                ? "Level and correction are not sealed yet: nothing is tested before they are, and both may still change."
                : "The plan is not sealed yet: nothing is tested before it is, and all of it may still change.";
        }

        if (overview.Campaign.IsExploratory)
        {
            yield return CampaignText.Exploratory;
        }

        if (!CampaignText.Holds(overview.Campaign))
        {
            yield return $"The goal is not held: {CampaignText.Goal(overview.Campaign)}.";
        }
    }

    private static IEnumerable<string> Untested(CampaignOverview overview)
    {
        int untested = overview.FamilySize - overview.TestedCount;
        if (untested > 0)
        {
            yield return FormattableString.Invariant($"Without a result: {untested} of {overview.FamilySize} experiments. {(overview.Campaign.Streams.Count > 0 ? "They are not decided yet, or their data gave no p-value." : "Each counts as p = 1, and the others' adjusted p may change once one of them has a result.")}");
        }
    }

    private static IEnumerable<string> Checks(int looked, IReadOnlyCollection<(string Experiment, IReadOnlyList<string> Checks)> warned)
    {
        if (warned.Count > 0)
        {
            yield return FormattableString.Invariant($"Checks of the assumptions warn on {warned.Count} of {looked} {(looked == 1 ? "survivor" : "survivors")}: {Names([.. warned.Select(w => $"{w.Experiment} ({string.Join(", ", w.Checks)})")])}. They are advice; none changes the test.");
        }
    }

    private static IEnumerable<string> Excluded(IReadOnlyCollection<(string Experiment, int Count)> excluded)
    {
        if (excluded.Count > 0)
        {
            yield return FormattableString.Invariant($"Left out of the analysis, each with a reason and a name: {Counted.Of(excluded.Sum(e => e.Count), "observation")}, of {Names([.. excluded.Select(e => e.Experiment)])}.");
        }
    }

    private static IEnumerable<string> Closed(CampaignOverview overview) =>
        overview.Families.Where(f => !f.IsOpen).Select(f => $"The family {f.Name} is closed ({f.Waits}): none of its experiments survives before it opens, whatever its p.");

    private static IEnumerable<string> Arriving(CampaignStanding standing) =>
    [
        .. OnlineText.WithoutLevel(standing.Experiments.Select(e => e.Entry).OfType<StreamEntry>()) is { } late ? [late] : (string[])[],
        .. OnlineText.OnOtherData(standing.Experiments),
    ];

    /// <summary>Whether the latest review holds what is shown.</summary>
    private static bool IsUpToDate(CampaignOverview overview) =>
        overview is { LastReview: { IsInterim: false }, AwaitingNewTest: 0, DecisionsSinceReview: 0, ResultsSinceReview: 0 };
}
