using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>Withdrawn experiments in words.</summary>
internal static class WithdrawalText
{
    /// <summary>What an experiment that left its family counts as.</summary>
    public const string NotCounted = "No result: the experiment was withdrawn before any data and is not in its family any more.";

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
