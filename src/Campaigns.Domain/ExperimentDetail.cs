using Campaigns.Statistics.GroupTests;

namespace Campaigns.Domain;

/// <summary>One experiment in full: its values by group, the group table, the table of variation, its effects, checks and comparisons.</summary>
/// <param name="Result">How the experiment stands.</param>
/// <param name="Groups">The groups in the plan's order, those without a value included.</param>
/// <param name="Confidence">Confidence of the intervals in the group table, in (0, 1).</param>
/// <param name="Variation">The table of variation; null where there is none.</param>
/// <param name="MissingCount">Values reported missing in the loaded files.</param>
public sealed record ExperimentDetail(
    ExperimentResult Result,
    IReadOnlyList<GroupDetail> Groups,
    double Confidence,
    VariationTable? Variation,
    int MissingCount)
{
    /// <summary>Units, checks and comparisons.</summary>
    public ExperimentAnalysis Analysis { get; init; } = new();

    /// <summary>The comparisons as the campaign judges them.</summary>
    public IReadOnlyList<ExperimentComparison> Comparisons { get; init; } = [];

    /// <summary>What the comparisons of this campaign hold, in a sentence.</summary>
    public string ComparisonGuarantee { get; init; } = "";

    /// <summary>Every decision about leaving out an observation, oldest first.</summary>
    public IReadOnlyList<ExcludedObservation> Exclusions { get; init; } = [];

    /// <summary>The planned test on the values at hand; null where there are none. It equals the result where the experiment was tested.</summary>
    public TestOutcome? Outcome { get; init; }

    /// <summary>The planned test with the excluded values among the others; null where none is excluded.</summary>
    public TestOutcome? OutcomeWithExcluded { get; init; }
}

/// <summary>One group of an experiment with its values.</summary>
/// <param name="Label">The group's name.</param>
/// <param name="IsControl">Whether it is the control.</param>
/// <param name="Values">Its values as the nearest doubles, in the order in which they were loaded; excluded ones left out.</param>
/// <param name="Summary">Its figures, of the means of specimens where readings of one were averaged.</param>
public sealed record GroupDetail(string Label, bool IsControl, IReadOnlyList<double> Values, GroupSummary Summary);
