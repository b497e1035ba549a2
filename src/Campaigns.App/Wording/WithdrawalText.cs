using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>Withdrawn experiments in words.</summary>
internal static class WithdrawalText
{
    /// <summary>What an experiment that left its family counts as.</summary>
    public const string NotCounted = "No result: the experiment was withdrawn before any data and is not in its family any more.";

    /// <summary>A decision that was recorded, in a sentence.</summary>
    public static string Recorded(Withdrawal decision) => $"Recorded: {decision.Experiment} {decision.Sentence}.";

    /// <summary>The same decision before it is made.</summary>
    public static string Foreseen(Withdrawal decision) => $"To be recorded: {decision.Experiment} {decision.Sentence}.";

    /// <summary>What puts decisions in force, in a sentence; null where nothing has to.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="decisions">What was decided, at least one.</param>
    /// <param name="steps">How what puts them in force is named; null for commands.</param>
    public static string? Next(Campaign campaign, IReadOnlyList<Withdrawal> decisions, StepNames? steps = null) => !campaign.IsSealed || !decisions.Any(d => d.HadData) ? null
        : decisions[0].IsWithdrawn
            ? $"Results and survivors count this from now on; {(steps ?? StepNames.Commands).Review(campaign.Code)} takes it into a review."
            : $"{Sentence.Start((steps ?? StepNames.Commands).Test(campaign.Code))} and {(steps ?? StepNames.Commands).Review(campaign.Code)} put this in force; until then an experiment that was taken in again counts as not tested.";

    /// <summary>How many experiments are withdrawn and how they count; empty where none is.</summary>
    /// <param name="counts">How many are.</param>
    /// <param name="familySize">Hypotheses that the correction counts.</param>
    public static IEnumerable<string> Lines(WithdrawnCounts counts, int familySize)
    {
        if (counts.CountAsOne > 0)
        {
            yield return FormattableString.Invariant($"Withdrawn after their data came: {Counted.Of(counts.CountAsOne, "experiment")}; {Counted.Word(counts.CountAsOne, "it stays in the family and counts", "they stay in the family and count")} with p = 1.");
        }

        if (counts.Left > 0)
        {
            string looked = counts.LeftAfterResults == 0 ? ""
                : FormattableString.Invariant($" For {counts.LeftAfterResults} of them results of other experiments had been seen by then, and a smaller family is easier to survive in: look at the reasons.");
            yield return FormattableString.Invariant($"Withdrawn before any data: {Counted.Of(counts.Left, "experiment")}; {Counted.Word(counts.Left, "it", "they")} left the family, which had {familySize + counts.Left} and has {familySize}.{looked}");
        }
    }
}
