namespace Campaigns.Domain;

/// <summary>One decision about one experiment: it is withdrawn, or taken in again. Its plan, its values and its results are kept for ever.</summary>
/// <param name="Experiment">The experiment.</param>
/// <param name="IsWithdrawn">Whether it is out from then on; false where it was taken in again.</param>
/// <param name="HadData">Whether it had data at that moment: then it stays in its family and counts with p = 1.</param>
/// <param name="AfterResults">Whether results of its campaign had been seen at that moment.</param>
/// <param name="Reason">Why.</param>
/// <param name="NamedBy">Who said so.</param>
/// <param name="At">When.</param>
public sealed record Withdrawal(string Experiment, bool IsWithdrawn, bool HadData, bool AfterResults, string Reason, string NamedBy, DateTimeOffset At)
{
    /// <summary>Whether it takes its experiment out of the family: it is withdrawn, and no data had come.</summary>
    public bool LeavesFamily => IsWithdrawn && !HadData;

    /// <summary>The decision in plain words, without a full stop.</summary>
    public string Sentence =>
        $"{(!IsWithdrawn ? "taken in again after it was withdrawn" : HadData ? "withdrawn after its data came, so that it counts with p = 1" : "withdrawn before any data, so that it left the family")}, by {NamedBy}: {Reason}";
}

/// <summary>How many experiments of a campaign are withdrawn as things stand.</summary>
/// <param name="CountAsOne">Withdrawn after their data came: they stay in the family and count with p = 1.</param>
/// <param name="Left">Withdrawn before any data: they left the family.</param>
/// <param name="LeftAfterResults">Those of them that left it when results of other experiments of the campaign had been seen.</param>
public readonly record struct WithdrawnCounts(int CountAsOne, int Left, int LeftAfterResults)
{
    /// <summary>All of them.</summary>
    public int All => CountAsOne + Left;
}
