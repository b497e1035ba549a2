using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.GroupTests;

/// <summary>What an omnibus test of one experiment gave: a statistic with its p-value, or the reason why there is none.</summary>
/// <param name="GroupCount">Groups that hold at least one value.</param>
/// <param name="ObservationCount">Values used, missing ones left out.</param>
public abstract record TestOutcome(int GroupCount, int ObservationCount)
{
    /// <summary>Specimens that were tested, readings of one averaged; null where none is recorded.</summary>
    public int? SpecimenCount { get; init; }

    /// <summary>How the values inside groups vary between specimens and within them; null where no specimen has several readings, or one stands in several groups.</summary>
    public SpecimenVariation? Specimens { get; init; }
}

/// <summary>A test that could be computed.</summary>
/// <param name="GroupCount">Groups that hold at least one value.</param>
/// <param name="ObservationCount">Values used.</param>
/// <param name="Statistic">The test statistic (F for the F test); finite.</param>
/// <param name="Df1">First degrees of freedom; null where the test has none.</param>
/// <param name="Df2">Second degrees of freedom; null where the test has none.</param>
/// <param name="P">The upper-tail p-value with its logarithm.</param>
/// <param name="Variation">The table of variation of the layout that was tested; null where the values inside every group are all the same.</param>
public sealed record Tested(
    int GroupCount,
    int ObservationCount,
    double Statistic,
    double? Df1,
    double? Df2,
    PValue P,
    VariationTable? Variation) : TestOutcome(GroupCount, ObservationCount)
{
    /// <summary>The arrangements behind the p-value; null where it comes from a distribution.</summary>
    public Resampling? Resampling { get; init; }
}

/// <summary>A test that has no result; the hypothesis stays in its family and counts there as p = 1.</summary>
/// <param name="GroupCount">Groups that hold at least one value.</param>
/// <param name="ObservationCount">Values at hand.</param>
/// <param name="Reason">Why there is no result.</param>
public sealed record NotTestable(int GroupCount, int ObservationCount, NotTestableReason Reason) : TestOutcome(GroupCount, ObservationCount);

/// <summary>Why an experiment's data cannot give a test result.</summary>
public enum NotTestableReason
{
    /// <summary>Fewer than two groups hold values.</summary>
    TooFewGroups,

    /// <summary>No group holds more than one value, so nothing tells the variation within groups; within blocks: no residual degree of freedom is left.</summary>
    NoReplication,

    /// <summary>All values of the experiment are the same; for a test within blocks, all values of every block.</summary>
    ConstantResponse,

    /// <summary>The values inside every group are all the same while the groups differ (within blocks: groups and blocks together account for every value exactly): the measurement is too coarse to show its own variation.</summary>
    ZeroWithinVariation,

    /// <summary>A group holds a single value, and the test needs the variance of every group.</summary>
    GroupOfOne,

    /// <summary>The values of one group are all the same, and the test weights by the variance of every group.</summary>
    ConstantGroup,

    /// <summary>The test compares within blocks, and a value has no block recorded.</summary>
    BlockNotRecorded,

    /// <summary>Some groups never share a block with the others, not even by way of a third: nothing compares them within blocks.</summary>
    DisconnectedBlocks,

    /// <summary>The test compares within blocks, and readings of one specimen stand in several blocks.</summary>
    SpecimenInSeveralBlocks,

    /// <summary>Readings of one specimen stand in several groups, while an experimental unit belongs to one.</summary>
    SpecimenInSeveralGroups,
}
