using Campaigns.Statistics.Checks;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Domain;

/// <summary>Everything that is asked of one experiment beyond its test: its units, its checks, and the test that is shown beside the planned one where spreads differ.</summary>
public sealed record ExperimentAnalysis
{
    /// <summary>How specimens and their readings vary; null where no specimen has several readings.</summary>
    public SpecimenVariation? Specimens { get; init; }

    /// <summary>What was taken as one observation, where that is worth a word: a sentence with a full stop; null elsewhere.</summary>
    public string? UnitsNote { get; init; }

    /// <summary>The checks, in the order of their registry.</summary>
    public IReadOnlyList<CheckLine> Checks { get; init; } = [];

    /// <summary>Welch's F, shown beside an F test where a check of the spreads warns; null elsewhere. It replaces nothing.</summary>
    public TestOutcome? Beside { get; init; }

    /// <summary>Comparisons inside the experiment, before the campaign judges them.</summary>
    public IReadOnlyList<GroupComparison> Comparisons { get; init; } = [];

    /// <summary>For each group the letters that it shares with the groups from which it is not told apart; null where the follow-up does not compare all pairs.</summary>
    public IReadOnlyList<string>? Letters { get; init; }

    /// <summary>Analyses one experiment in depth.</summary>
    /// <param name="plan">What was planned.</param>
    /// <param name="labels">Label of each group.</param>
    /// <param name="readings">Its values.</param>
    /// <param name="level">The campaign's level.</param>
    /// <param name="hasResult">Whether its test gave a result; without one nothing is compared.</param>
    /// <remarks>Cost: sorting, O(N log N), and a few 0.1 ms for the tails of the comparisons.</remarks>
    public static ExperimentAnalysis Of(PlannedExperiment plan, IReadOnlyList<string> labels, GroupedSample readings, SignificanceLevel level, bool hasResult)
    {
        ArgumentNullException.ThrowIfNull(plan);
        ArgumentNullException.ThrowIfNull(labels);
        GroupedSample units = SpecimenMeans.Of(readings) is { } means ? means.Sample : readings;
        bool withinBlocks = GroupTestRegistry.Find(plan.Test)?.UsesBlocks == true;
        IReadOnlyList<CheckLine> checks = readings.Count == 0 ? [] : CheckReport.Of(new CheckSubject
        {
            Units = units,
            Fit = withinBlocks ? FittedLayout.InBlocks(units) : FittedLayout.OneWay(units),
            Labels = labels,
        });
        bool spreadsDiffer = checks.Any(c => c.Key is "equal-spread" or "spread-ratio" && c.Finding.Verdict == CheckVerdict.Warns);
        IReadOnlyList<GroupComparison> comparisons = hasResult ? PlannedFollowUp.Compare(plan, labels, readings, level) : [];
        var specimens = SpecimenVariation.Of(readings);
        return new ExperimentAnalysis
        {
            Specimens = specimens,
            UnitsNote = UnitsNoteOf(plan, readings, specimens),
            Checks = checks,
            Beside = spreadsDiffer && plan.Test == "f" ? new WelchTest().Test(units) : null,
            Comparisons = comparisons,
        };
    }

    private static string? UnitsNoteOf(PlannedExperiment plan, GroupedSample readings, SpecimenVariation? specimens)
    {
        if (specimens is { } s)
        {
            string unmarked = s.UnmarkedCount > 0 ? FormattableString.Invariant($" {s.UnmarkedCount} reading(s) without a specimen were taken as one each.") : "";
            return FormattableString.Invariant($"Readings of one specimen are not independent, so the analysis runs on the means of {s.SpecimenCount} specimens ({s.ReadingCount} readings, {s.FewestReadings} to {s.MostReadings} a specimen).{unmarked}");
        }

        if (!readings.Specimens.IsEmpty || plan.Replicates is not { } replicates)
        {
            return null;
        }

        Span<int> counts = readings.GroupCount <= 64 ? stackalloc int[readings.GroupCount] : new int[readings.GroupCount];
        foreach (ushort group in readings.Groups)
        {
            counts[group]++;
        }

        return RepeatedReadings.AreLikely(counts, replicates)
            ? FormattableString.Invariant($"Warning: {readings.Count} values where {replicates} in each group were planned look like repeated readings of one specimen, which are not independent and make p too small. Record the specimen of every value in a column 'specimen'.")
            : null;
    }
}
