namespace Campaigns.Domain;

/// <summary>One decision about one observation: it is left out of the analysis, or taken in again. The value itself is kept for ever.</summary>
/// <param name="Experiment">The experiment.</param>
/// <param name="File">File that brought the observation.</param>
/// <param name="Line">Its line there, from 1.</param>
/// <param name="Group">Label of its group.</param>
/// <param name="Value">The value as typed.</param>
/// <param name="IsExcluded">Whether it is left out from then on; false where it was taken in again.</param>
/// <param name="Reason">Why.</param>
/// <param name="NamedBy">Who said so.</param>
/// <param name="At">When.</param>
public sealed record ExcludedObservation(
    string Experiment,
    string File,
    long Line,
    string Group,
    string Value,
    bool IsExcluded,
    string Reason,
    string NamedBy,
    DateTimeOffset At)
{
    /// <summary>The decision in plain words, without a full stop.</summary>
    public string Sentence => FormattableString.Invariant(
        $"{(IsExcluded ? "excluded" : "taken in again after an exclusion")}: value {Value} of group {Group} (line {Line} of {File}), by {NamedBy}: {Reason}");
}
