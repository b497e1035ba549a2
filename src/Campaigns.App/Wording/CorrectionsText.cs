using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Wording;

/// <summary>Corrections side by side in words, the same on paper and on screen.</summary>
internal static class CorrectionsText
{
    /// <summary>What the view is not for.</summary>
    public const string NeverToChoose = "The sealed correction alone decides what survives; choosing another after seeing this table would undo what a correction is for.";

    /// <summary>The same where there is little room.</summary>
    public const string NeverToChooseBriefly = "The sealed correction alone decides; choosing another after seeing this table undoes it.";

    /// <summary>What hangs on the choice, without its full stop.</summary>
    /// <param name="hanging">Experiments that survive under some corrections of the kind and not under others.</param>
    /// <param name="rate">The kind, in words.</param>
    public static string Hanging(int hanging, string rate) => $"Hanging on the choice among those that hold the {rate}: {Counted.Of(hanging, "experiment")}";

    /// <summary>The same without the independence that each of these conditions holds under, too.</summary>
    /// <param name="dependence">The condition.</param>
    public static string UnderBriefly(Dependence dependence) => dependence switch
    {
        Dependence.Sidak => "Sidak's inequality",
        Dependence.Simes => "Simes' inequality",
        Dependence.PositiveRegression => "positive dependence",
        _ => Under(dependence),
    };

    /// <summary>Under what dependence a procedure is proved, in a phrase.</summary>
    /// <param name="dependence">The condition.</param>
    public static string Under(Dependence dependence) => dependence switch
    {
        Dependence.Any => "any dependence",
        Dependence.Sidak => "independence, or Sidak's inequality",
        Dependence.Simes => "independence, or Simes' inequality",
        Dependence.PositiveRegression => "independence, or positive dependence",
        Dependence.Independent => "independence",
        Dependence.IndependentConservative => "independence, and nulls that are uniformly conservative",
        _ => throw new ArgumentOutOfRangeException(nameof(dependence), dependence, "No words for this dependence."),
    };
}
