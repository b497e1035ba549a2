namespace Campaigns.Domain;

/// <summary>Why an experiment survives in one review and not in another.</summary>
public enum ReviewReason
{
    /// <summary>It was first tested after the earlier review.</summary>
    FirstTested,

    /// <summary>Its own p-value changed, and with the earlier one the later review would have decided as the earlier one did.</summary>
    OwnP,

    /// <summary>More hypotheses are counted, or fewer: the earlier p-values in a family of the later size decide as the later review did.</summary>
    FamilySize,

    /// <summary>P-values of other experiments moved the threshold: with its own earlier p-value in a family of the earlier size, they decide as the later review did.</summary>
    OtherP,

    /// <summary>Several of these at once; none suffices alone.</summary>
    Together,

    /// <summary>The gate of its family opened.</summary>
    FamilyOpened,

    /// <summary>The gate of its family closed.</summary>
    FamilyClosed,

    /// <summary>In one of the reviews its values had been changed after its test and awaited a new one.</summary>
    AwaitsTest,

    /// <summary>In one of the reviews its latest test gave no p-value.</summary>
    NoResult,

    /// <summary>It was withdrawn, or taken in again.</summary>
    Withdrawn,
}

/// <summary>What was done to an experiment between two reviews.</summary>
/// <param name="Cause">What.</param>
/// <param name="Reason">The reason given for it; null where none is asked for.</param>
public sealed record ReviewEvent(ReviewCause Cause, string? Reason)
{
    /// <summary>Code of the experiment; empty where it does not matter which.</summary>
    public string Experiment { get; init; } = "";

    /// <summary>Name of its family; empty for the one family of a campaign that names none.</summary>
    public string Family { get; init; } = "";

    /// <summary>Whether its family counts another number of hypotheses for it: it was amended in, or withdrawn without data, or came back so.</summary>
    public bool ChangesFamily { get; init; }
}

/// <summary>What can be done to an experiment between two reviews.</summary>
public enum ReviewCause
{
    /// <summary>Values were added.</summary>
    AddedValues,

    /// <summary>A value was left out.</summary>
    Exclusion,

    /// <summary>A value was taken in again.</summary>
    ExclusionTakenBack,

    /// <summary>Its plan was amended after the seal.</summary>
    PlanAmendment,

    /// <summary>An amendment of the plan added it.</summary>
    AmendedIn,

    /// <summary>It was withdrawn.</summary>
    Withdrawal,

    /// <summary>It was taken in again after a withdrawal.</summary>
    WithdrawalTakenBack,
}

/// <summary>The words of reasons and causes in files; frozen.</summary>
public static class ReviewReasonWords
{
    /// <summary>The word of a reason.</summary>
    public static string Word(this ReviewReason reason) => reason switch
    {
        ReviewReason.FirstTested => "first-tested",
        ReviewReason.OwnP => "own-p",
        ReviewReason.FamilySize => "family-size",
        ReviewReason.OtherP => "other-p",
        ReviewReason.Together => "together",
        ReviewReason.FamilyOpened => "family-opened",
        ReviewReason.FamilyClosed => "family-closed",
        ReviewReason.AwaitsTest => "awaits-test",
        ReviewReason.NoResult => "no-result",
        ReviewReason.Withdrawn => "withdrawn",
        _ => throw new ArgumentOutOfRangeException(nameof(reason), reason, "A reason without a word."),
    };

    /// <summary>The word of a cause.</summary>
    public static string Word(this ReviewCause cause) => cause switch
    {
        ReviewCause.AddedValues => "added-values",
        ReviewCause.Exclusion => "exclusion",
        ReviewCause.ExclusionTakenBack => "exclusion-taken-back",
        ReviewCause.PlanAmendment => "plan-amendment",
        ReviewCause.AmendedIn => "amended-in",
        ReviewCause.Withdrawal => "withdrawal",
        ReviewCause.WithdrawalTakenBack => "withdrawal-taken-back",
        _ => throw new ArgumentOutOfRangeException(nameof(cause), cause, "A cause without a word."),
    };
}
