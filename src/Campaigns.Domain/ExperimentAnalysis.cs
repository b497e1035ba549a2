using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Effects;
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

    /// <summary>Welch's F, shown beside the planned test where a check of the spreads warns; null elsewhere. It replaces nothing.</summary>
    public TestOutcome? Beside { get; init; }

    /// <summary>Comparisons inside the experiment, before the campaign judges them.</summary>
    public IReadOnlyList<GroupComparison> Comparisons { get; init; } = [];

    /// <summary>The follow-up behind the comparisons, which gives their intervals at other confidences too; null where there is none.</summary>
    public PlannedFollowUp? FollowUp { get; init; }

    /// <summary>For each group the letters that it shares with the groups from which it is not told apart; null where the follow-up does not compare all pairs.</summary>
    public IReadOnlyList<string>? Letters { get; init; }

    /// <summary>Effect sizes with intervals; null where nothing varies inside the groups, or the test has no result.</summary>
    public EffectSizes? Effects { get; init; }

    /// <summary>The smallest difference between two group means that the design would have found with a power of 0.8 at the campaign's level alone, in units of the response; null within blocks, and where nothing varies.</summary>
    public double? Detectable { get; init; }

    /// <summary>The same at the strictest threshold, the level of its family over the family's size.</summary>
    public double? DetectableAtStrictest { get; init; }

    /// <summary>Analyses one experiment in depth.</summary>
    /// <param name="plan">What was planned.</param>
    /// <param name="labels">Label of each group.</param>
    /// <param name="readings">Its values.</param>
    /// <param name="campaign">Names the level.</param>
    /// <param name="familySize">Experiments in its family.</param>
    /// <param name="tested">The result of the planned test; without one nothing is compared.</param>
    /// <param name="places">Where each value came from, in words; null where that is not known.</param>
    /// <param name="familyLevel">The level of its family; null for the campaign's.</param>
    /// <remarks>Cost: sorting, O(N log N), and some 0.1 ms for the tails of effects and comparisons.</remarks>
    public static ExperimentAnalysis Of(PlannedExperiment plan, IReadOnlyList<string> labels, GroupedSample readings, Campaign campaign, int familySize, Tested? tested, IReadOnlyList<string>? places = null, SignificanceLevel? familyLevel = null)
    {
        ArgumentNullException.ThrowIfNull(plan);
        ArgumentNullException.ThrowIfNull(labels);
        ArgumentNullException.ThrowIfNull(campaign);
        GroupedSample units = SpecimenMeans.Of(readings) is { } means ? means.Sample : readings;
        bool withinBlocks = GroupTestRegistry.Find(plan.Test)?.UsesBlocks == true;
        IReadOnlyList<CheckLine> checks = readings.Count == 0 ? [] : CheckReport.Of(new CheckSubject
        {
            Units = units,
            Fit = withinBlocks ? FittedLayout.InBlocks(units) : FittedLayout.OneWay(units),
            Labels = labels,
            Places = places is null || units.Count == readings.Count ? places : FirstReadings(readings, places),
        });
        bool spreadsDiffer = checks.Any(c => c.Key is "equal-spread" or "spread-ratio" && c.Finding.Verdict == CheckVerdict.Warns);
        SignificanceLevel level = campaign.Level;
        PlannedFollowUp? followUp = tested is null ? null : PlannedFollowUp.Of(plan, labels, readings, level);
        var specimens = SpecimenVariation.Of(readings);
        return new ExperimentAnalysis
        {
            Specimens = specimens,
            UnitsNote = UnitsNoteOf(plan, readings, specimens, tested is not null),
            Checks = checks,
            Beside = spreadsDiffer && tested is not null && plan.Test is not ("welch" or "block-f") ? new WelchTest().Test(units) : null,
            Comparisons = followUp?.Comparisons ?? [],
            FollowUp = followUp,
            Letters = followUp is { } f && f.Comparisons.Any(c => c.P is not null) ? CompactLetters.Of(f.Estimates, f.Comparisons, level) : null,
            Effects = tested?.Variation is { } table && level.Value < 0.5 ? EffectSizes.Of(table, level) : null,
            Detectable = DetectableOf(units, tested, level),
            DetectableAtStrictest = DetectableOf(units, tested, new SignificanceLevel((familyLevel ?? level).Value / familySize)),
        };
    }

    /// <summary>A specimen is named by its first reading; specimens stand in the order of these.</summary>
    private static List<string> FirstReadings(GroupedSample readings, IReadOnlyList<string> places)
    {
        var seen = new HashSet<int>();
        var first = new List<string>();
        for (int i = 0; i < readings.Count; i++)
        {
            if (readings.Specimens[i] < 0 || seen.Add(readings.Specimens[i]))
            {
                first.Add($"the specimen first read on {places[i]}");
            }
        }

        return first;
    }

    private static double? DetectableOf(GroupedSample units, Tested? tested, SignificanceLevel level)
    {
        const double Power = 0.8;
        if (tested?.Variation is not { Blocks: null, ResidualStandardDeviation: > 0 and < double.PositiveInfinity } table || level.Value >= Power)
        {
            return null;
        }

        var sizes = new int[units.GroupCount];
        foreach (ushort group in units.Groups)
        {
            sizes[group]++;
        }

        double smallest = DetectableDifference.Smallest(sizes, table.ResidualStandardDeviation, level, Power);
        return double.IsFinite(smallest) ? smallest : null;
    }

    private static string? UnitsNoteOf(PlannedExperiment plan, GroupedSample readings, SpecimenVariation? specimens, bool isTested)
    {
        if (specimens is { } s)
        {
            string unmarked = s.UnmarkedCount > 0 ? FormattableString.Invariant($" {s.UnmarkedCount} {(s.UnmarkedCount == 1 ? "reading without a specimen was taken as one" : "readings without a specimen were taken as one each")}.") : "";
            string each = s.FewestReadings == s.MostReadings ? FormattableString.Invariant($"{s.MostReadings}") : FormattableString.Invariant($"{s.FewestReadings} to {s.MostReadings}");
            return FormattableString.Invariant($"Readings of one specimen are not independent, so {(isTested ? "the analysis runs" : "an analysis would run")} on the means of {s.SpecimenCount} specimens ({s.ReadingCount} readings, {each} a specimen).{unmarked}");
        }

        return readings.Specimens.IsEmpty ? UnitNotes.Repeats(plan, readings.Groups, readings.GroupCount) : null;
    }
}
