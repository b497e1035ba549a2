using Campaigns.Statistics.GroupTests;

namespace Campaigns.Domain;

/// <summary>One experiment in full: its values by group, the group table and the table of variation.</summary>
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
    int MissingCount);

/// <summary>One group of an experiment with its values.</summary>
/// <param name="Label">The group's name.</param>
/// <param name="IsControl">Whether it is the control.</param>
/// <param name="Values">Its values as the nearest doubles, in the order in which they were loaded.</param>
/// <param name="Summary">Its figures.</param>
public sealed record GroupDetail(string Label, bool IsControl, IReadOnlyList<double> Values, GroupSummary Summary);
