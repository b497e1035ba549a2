using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Wording;

/// <summary>Confirmations of earlier experiments, in words.</summary>
internal static class ConfirmationText
{
    private const int MostNamed = 8;

    /// <summary>What stands under a table with confirmations: how they were judged, over which family, and what they do not say; nothing where there are none.</summary>
    public static IEnumerable<string> Footnotes(Campaign campaign, IEnumerable<ExperimentResult> experiments)
    {
        ExperimentResult[] confirming = [.. experiments.Where(e => e.Confirmation is not null)];
        if (confirming.Length == 0)
        {
            yield break;
        }

        Confirmation any = confirming[0].Confirmation!;
        yield return FormattableString.Invariant($"Replicated: the effect is there in both experiments. p is the larger of both (partial conjunction of two studies, Benjamini and Heller 2008), corrected by {CorrectionRegistry.Find(any.Correction)?.Name} at {campaign.Level} over {any.FamilySize}. It says that groups differ in both, not that the same ones do in the same direction: hold the comparisons side by side.");
        string[] looked = [.. confirming.Where(e => e.Confirmation!.First.WasTestedBefore).Select(e => e.Plan.Code)];
        yield return looked.Length == 0
            ? FormattableString.Invariant($"Every confirmation was sealed before the first experiment was tested, so that its family is the {any.FamilySize} planned confirmations.")
            : $"Sealed after the first experiment had been tested, which may so have been chosen by its result: {Names(looked)}. The family therefore counts every experiment of the first one's family, those that are not followed as p = 1 (Bogomolov and Heller 2013).";
        string[] open = [.. confirming.Where(e => e.Confirmation!.P is null).Select(e => e.Plan.Code)];
        if (open.Length > 0)
        {
            yield return $"Without a p of replicability, because one side has no result yet: {Names(open)}; it counts as p = 1.";
        }
    }

    /// <summary>What came of one confirmation.</summary>
    public static string Sentence(ExperimentResult experiment)
    {
        Confirmation c = experiment.Confirmation!;
        string first = $"Confirms {experiment.Plan.Confirms}";
        return c is { P: { } p, AdjustedP: { } adjusted }
            ? $"{first}: the larger of both p is {NumberText.P(p)}, adjusted {NumberText.P(adjusted)}; {(c.IsReplicated == true ? "replicated" : "not replicated, which is not the same as refuted")}."
            : $"{first}: {(experiment.P is null && c.First.P is null ? "neither has a result" : experiment.P is null ? "it has no result itself" : "the first experiment has no result")}, so nothing can be said yet.";
    }

    private static string Names(string[] codes) => codes.Length <= MostNamed
        ? string.Join(", ", codes)
        : FormattableString.Invariant($"{string.Join(", ", codes.Take(MostNamed))} and {codes.Length - MostNamed} more");
}
