using Campaigns.Domain;
using Campaigns.Statistics.ClosedTesting;

namespace Campaigns.App.Wording;

/// <summary>What is said about the bound of a set of experiments, the same on paper and on screen.</summary>
internal static class BoundWording
{
    /// <summary>What the bound is not.</summary>
    public const string NoEstimate = "It is an upper confidence bound on how many are false, no estimate of it; 'at least 0 real' does not mean that nothing is real.";

    /// <summary>For example "marked 7: at least 4 real, at most 3 false (95 % confidence)".</summary>
    /// <param name="bound">The bound.</param>
    /// <param name="confidence">In (0, 1).</param>
    public static string Line(MarkedBound bound, double confidence) =>
        FormattableString.Invariant($"marked {bound.Marked}: at least {bound.RealAtLeast} real, at most {bound.FalseAtMost} false ({ConfidenceText(confidence)} confidence)");

    /// <summary>For example "Of the 14 survivors at most 6 are false (95 % confidence)", without a full stop.</summary>
    /// <param name="survivors">Survivors, at least one.</param>
    /// <param name="falseAtMost">How many of them are false at most.</param>
    /// <param name="confidence">In (0, 1).</param>
    public static string OfSurvivors(int survivors, int falseAtMost, double confidence)
    {
        string clause = (survivors, falseAtMost) switch
        {
            (1, 0) => "The one survivor is not false",
            (1, _) => "The one survivor may be false: the bound does not exclude it",
            (_, 0) => FormattableString.Invariant($"Of the {survivors} survivors none is false"),
            _ => FormattableString.Invariant($"Of the {survivors} survivors at most {falseAtMost} {Counted.Word(falseAtMost, "is", "are")} false"),
        };
        return $"{clause} ({ConfidenceText(confidence)} confidence)";
    }

    /// <summary>The same where a few cells are lacking, and the marked stand below: "of 7 at least 4 real, at most 3 false (95 % confidence)".</summary>
    /// <param name="bound">The bound.</param>
    /// <param name="confidence">In (0, 1).</param>
    public static string ShortLine(MarkedBound bound, double confidence) =>
        FormattableString.Invariant($"of {bound.Marked} at least {bound.RealAtLeast} real, at most {bound.FalseAtMost} false ({ConfidenceText(confidence)} confidence)");

    /// <summary>For example "95 %".</summary>
    /// <param name="confidence">In (0, 1).</param>
    public static string ConfidenceText(double confidence) => confidence < 0.99999999
        ? FormattableString.Invariant($"{100 * confidence:0.######} %")
        : "more than 99.999999 %";

    /// <summary>What the bound rests on where no choice is offered.</summary>
    public const string SimesAlone = "The bound holds if Simes' inequality holds for the true nulls, as it does for independent and for positively dependent experiments (Goeman and Solari 2011).";

    /// <summary>How the bounds come about and why the set may be chosen freely, in short.</summary>
    /// <param name="bounds">The bounds of a campaign.</param>
    public static string Brief(CampaignBounds bounds) =>
        FormattableString.Invariant($"Closed testing with Simes' tests over all {bounds.Testing.FamilySize} planned experiments, with {ConfidenceText(bounds.Confidence)} confidence for all sets together: mark after looking. Of all at most {bounds.Testing.LargestUnrejected} are false.");

    /// <summary>What the dependence has to be, and who proved it.</summary>
    /// <param name="testing">The closed testing.</param>
    public static string Assumption(SimesClosedTesting testing) => testing.AnyDependence
        ? "Holds whatever the dependence between experiments: closed testing with Simes' tests at the level over 1 + 1/2 + ... + 1/m (Hommel 1983; Goeman and Solari 2011)."
        : "Holds if Simes' inequality holds for the true nulls, as it does for independent and for positively dependent experiments: closed testing with Simes' tests (Goeman and Solari 2011; Goeman, Meijer, Krebs and Solari 2019). '--dependence any' holds under any.";

    /// <summary>What the confidence is of, and why the set may be chosen freely.</summary>
    /// <param name="bounds">The bounds of a campaign.</param>
    public static string Simultaneous(CampaignBounds bounds) =>
        FormattableString.Invariant($"With {ConfidenceText(bounds.Confidence)} confidence the bounds of all sets of experiments hold together, so a set may be chosen after looking at everything. They are computed once over all {bounds.Testing.FamilySize} planned experiments of the campaign, never over the set alone: at most {bounds.Testing.LargestUnrejected} of the {bounds.Testing.FamilySize} are false.");
}
