using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>One experiment as it stands: its plan, its test and what the campaign's correction makes of it.</summary>
public sealed record ExperimentResult
{
    private PValue? _adjustedP;
    private bool? _survives;
    private FamilyStanding? _family;

    /// <summary>What was planned.</summary>
    public required PlannedExperiment Plan { get; init; }

    /// <summary>Place in the plan, from 1.</summary>
    public required int Position { get; init; }

    /// <summary>Where the experiment stands.</summary>
    public required ExperimentStatus Status { get; init; }

    /// <summary>Whether it was withdrawn before any data, so that its family does not count it.</summary>
    public bool LeftFamily { get; init; }

    /// <summary>Groups with at least one value.</summary>
    public int GroupCount { get; init; }

    /// <summary>Values at hand, missing ones left out.</summary>
    public int ObservationCount { get; init; }

    /// <summary>The test statistic; null without a result.</summary>
    public double? Statistic { get; init; }

    /// <summary>First degrees of freedom; null without a result or where the test has none.</summary>
    public double? Df1 { get; init; }

    /// <summary>Second degrees of freedom; null without a result or where the test has none.</summary>
    public double? Df2 { get; init; }

    /// <summary>The test's p-value; null without a result (in the family it then counts as 1).</summary>
    public PValue? P { get; init; }

    /// <summary>The p-value adjusted over the family; null without a result.</summary>
    public PValue? AdjustedP
    {
        get => _adjustedP;
        init => _adjustedP = value;
    }

    /// <summary>Whether the adjusted p-value is at most the level; null without a result. In an online campaign, the standing decision.</summary>
    public bool? Survives
    {
        get => _survives;
        init => _survives = value;
    }

    /// <summary>The family in which it is corrected, in figures; null where it was read without its campaign.</summary>
    public FamilyStanding? Family
    {
        get => _family;
        init => _family = value;
    }

    /// <summary>Its place in a stream; null for a batch correction, and before it was registered.</summary>
    public StreamEntry? Entry { get; init; }

    /// <summary>The level that an online procedure gave it before its p-value was seen; null for a batch correction, and before it was registered.</summary>
    public double? GivenLevel { get; init; }

    /// <summary>In an online campaign, the p-value adjusted over the family by the batch view, which may change as experiments arrive; else null.</summary>
    public PValue? BatchAdjustedP { get; init; }

    /// <summary>In an online campaign, whether it survives in the batch view; else null.</summary>
    public bool? BatchSurvives { get; init; }

    /// <summary>Eta squared of the sample; null without a result.</summary>
    public double? EtaSquared { get; init; }

    /// <summary>Omega squared, possibly negative; null without a result.</summary>
    public double? OmegaSquared { get; init; }

    /// <summary>Specimens that were tested, readings of one averaged; null where none is recorded.</summary>
    public int? SpecimenCount { get; init; }

    /// <summary>The arrangements behind a permutation p-value; null for other tests.</summary>
    public Resampling? Resampling { get; init; }

    /// <summary>What came of it as the confirmation of an earlier experiment; null where it confirms none, or was read without its campaign.</summary>
    public Confirmation? Confirmation { get; init; }

    /// <summary>Deviations from the plan: reasons of the amendments by which values came in after the test, values left out, decisions to withdraw it, changes of its sealed plan, and a test short of the planned values; empty where there are none.</summary>
    public IReadOnlyList<string> Amendments { get; init; } = [];

    /// <summary>Puts the verdict in, where nobody else has seen the experiment yet: a copy of each would be half the memory of a large campaign.</summary>
    internal void Judge(PValue? adjusted, bool? survives, FamilyStanding family) => (_adjustedP, _survives, _family) = (adjusted, survives, family);
}
