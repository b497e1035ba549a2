using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Wording;

/// <summary>The sentences around the tables of one experiment in full.</summary>
internal static class ExperimentNotes
{
    /// <summary>What comes before the tables: the response, how the experiment stands, deviations from its plan, its decision, what it confirms, its units.</summary>
    public static IReadOnlyList<string> Opening(ExperimentDetail detail)
    {
        ExperimentResult result = detail.Result;
        string unit = result.Plan.Unit.Length > 0 ? $" [{result.Plan.Unit}]" : "";
        return
        [
            $"Response: {(result.Plan.Response.Length > 0 ? result.Plan.Response : "not named")}{unit}. Status: {result.Status.Sentence()}.{Missing(detail)}",
            .. result.Amendments.Select(ExperimentWording.Deviation),
            .. OnlineText.Decision(result.Entry) is { } decision ? [decision] : (string[])[],
            .. result.Confirmation is null ? (string[])[] : [ConfirmationText.Sentence(result)],
            .. detail.Analysis.UnitsNote is { } note ? [note] : (string[])[],
        ];
    }

    /// <summary>What goes below the group table.</summary>
    public static IEnumerable<string> Groups(ExperimentDetail detail) =>
    [
        .. ExperimentWording.MeanIntervals(detail) is { } intervals ? [intervals] : (string[])[],
        .. detail.Analysis.Letters is not null ? [ExperimentWording.Letters] : (string[])[],
    ];

    /// <summary>What goes below the table of specimens.</summary>
    public static IEnumerable<string> Specimens(ExperimentDetail detail) => detail.Analysis.Specimens is { RawComponent: < 0 }
        ? ["The variance between specimens was estimated below 0, as happens where specimens differ less than their readings, and is shown as 0."]
        : [];

    /// <summary>What goes below the tests: p and its adjustment, the verdict, what the test assumes, how arrangements were drawn.</summary>
    public static IEnumerable<string> Tests(CampaignStanding standing, ExperimentDetail detail)
    {
        ExperimentResult result = detail.Result;
        if (result.P is not { } p)
        {
            yield return ExperimentWording.WithoutResult(result);
        }
        else
        {
            yield return $"p = {NumberText.P(p)}, adjusted p = {NumberText.P(result.AdjustedP!.Value)}. {ExperimentWording.Verdict(result)}";
        }

        if (GroupTestRegistry.Find(result.Plan.Test) is { } test)
        {
            yield return ExperimentWording.Assumptions(test);
        }

        if (result.Resampling is { } resampling)
        {
            yield return ResamplingText.Sentence(resampling);
            if (ResamplingText.TooCoarse(resampling, standing.FamilyOf(result), result.GivenLevel) is { } warning)
            {
                yield return warning;
            }
        }

        if (detail.Analysis.Beside is not null)
        {
            yield return ExperimentWording.Beside;
        }
    }

    /// <summary>A sentence or more for each check: its verdict, what it saw, what it cannot see, and where it warns what to do.</summary>
    /// <param name="detail">The experiment.</param>
    /// <param name="isBrief">Whether what a quiet check cannot see is said elsewhere.</param>
    public static IEnumerable<string> Checks(ExperimentDetail detail, bool isBrief = false) => detail.Analysis.Checks.Select(line =>
    {
        ExperimentCheck check = CheckRegistry.Find(line.Key)!;
        string word = line.Finding.Verdict == CheckVerdict.Warns ? "WARNS" : ExperimentWording.Word(line.Finding.Verdict);
        string rest = line.Finding.Verdict == CheckVerdict.NotPossible || (isBrief && line.Finding.Verdict == CheckVerdict.Quiet) ? "" : $" {check.CannotSee}{(line.Finding.Verdict == CheckVerdict.Warns ? $" {check.Advice}" : "")}";
        return $"{line.Name} ({word}): {line.Finding.Saw}{rest}";
    });

    private static string Missing(ExperimentDetail detail) =>
        detail.MissingCount > 0 ? FormattableString.Invariant($" Marked as missing and left out: {detail.MissingCount}.") : "";
}
