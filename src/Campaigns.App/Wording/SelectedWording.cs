using Campaigns.App.Commands;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.FollowUps;

namespace Campaigns.App.Wording;

/// <summary>Why an interval that accounts for the selection of its experiment is not there: an empty cell says nothing by itself.</summary>
internal static class SelectedWording
{
    /// <summary>Survivors whose widest gap has no such interval, each with the reason; empty where all have one.</summary>
    /// <param name="survivors">The survivors with their gaps and comparisons.</param>
    public static IEnumerable<string> WithoutGapInterval(SurvivorData survivors) => Sentences(
        "No selected interval of the gap",
        survivors.Listed.Select(e => (e.Plan.Code, Why: WhyNot(e, survivors.Gaps.GetValueOrDefault(e.Plan.Code), [.. survivors.Comparisons[e.Plan.Code]]))));

    /// <summary>Survivors whose eta squared has no such interval.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="survivors">Its survivors.</param>
    public static IEnumerable<string> WithoutEffectInterval(CampaignStanding standing, IEnumerable<ExperimentResult> survivors)
    {
        var verdict = new ComparisonVerdict(standing.Campaign, standing.Families);
        return Sentences(
            "No interval of eta squared",
            survivors.Select(e => (e.Plan.Code, Why: EffectSection.SelectedEtaSquared(e, verdict.SelectedRisk(e) ?? 0) is not null ? null
                : e.EtaSquared is null ? "its values give no eta squared"
                : verdict.SelectedRisk(e) is > 0 ? "nothing varies inside its groups, so that the F law has nothing to measure by"
                : "its level lies below the range of numbers")));
    }

    /// <summary>Comparisons inside survivors that have no such interval, by experiment.</summary>
    /// <param name="comparisons">The comparisons shown.</param>
    public static IEnumerable<string> WithoutInterval(IEnumerable<ExperimentComparison> comparisons) => Sentences(
        "No selected interval of a comparison",
        comparisons.Where(c => c.Experiment.Survives == true && c.SelectedInterval is null).Select(c => (c.Experiment.Plan.Code, Why: (string?)Obstacle(c))).Distinct());

    private static string? WhyNot(ExperimentResult survivor, WidestGap? gap, ExperimentComparison[] comparisons)
    {
        if (gap is not null && SurvivorData.OfGap(gap, comparisons) is not null)
        {
            return null;
        }

        if (gap is null)
        {
            return "its means show no gap";
        }

        if (survivor.Plan.FollowUp == FollowUpRegistry.None)
        {
            return "no follow-up was planned";
        }

        ExperimentComparison? pair = comparisons.FirstOrDefault(c => (c.GroupA, c.GroupB) == (gap.Lowest, gap.Highest) || (c.GroupB, c.GroupA) == (gap.Lowest, gap.Highest));
        return pair is null ? $"{NameOf(survivor)} does not compare these two groups"
            : pair.SelectedInterval is null ? Obstacle(pair)
            : $"{NameOf(survivor)} estimates this difference within blocks, not from the plain means";
    }

    private static string Obstacle(ExperimentComparison comparison) => comparison.Comparison.Obstacle
        ?? (comparison.Comparison.Lower is null ? $"{NameOf(comparison.Experiment)} gives p-values alone"
            : "the level left after selection lies below the range of numbers");

    private static string NameOf(ExperimentResult experiment) => FollowUpRegistry.Find(experiment.Plan.FollowUp)?.Name ?? experiment.Plan.FollowUp;

    /// <summary>A sentence for each reason, in the order in which it comes up first.</summary>
    private static IEnumerable<string> Sentences(string what, IEnumerable<(string Code, string? Why)> experiments) => experiments
        .Where(e => e.Why is not null)
        .GroupBy(e => e.Why!, StringComparer.Ordinal)
        .Select(g => $"{what}: {CautionText.Names([.. g.Select(e => e.Code)])} ({g.Key}).");
}
