using Campaigns.Catalog.Results;

namespace Campaigns.App.Wording;

/// <summary>Test runs in words.</summary>
internal static class TestWording
{
    private const int MostNamed = 10;

    /// <summary>What a run did, in a sentence or two.</summary>
    public static string Summary(string code, TestRunSummary summary)
    {
        string none = summary.NotTestable > 0 ? FormattableString.Invariant($", {summary.NotTestable} whose data cannot give a result (they count as p = 1 and stay visible)") : "";
        string left = summary.Incomplete > 0 ? FormattableString.Invariant($"; {summary.Incomplete} left alone because planned values are missing") : "";
        return summary.Ran
            ? FormattableString.Invariant($"Tested {summary.Tested} experiment{(summary.Tested == 1 ? "" : "s")} of {code}{none}{left}.") + OnlineText.Decided(summary.Decided, summary.DecidedSurvivors)
            : $"Nothing new to test in {code}{left}.";
    }

    /// <summary>What a run would take up, without any result.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="outlook">What it would take up.</param>
    /// <param name="includeIncomplete">Whether experiments short of their planned values are taken, too.</param>
    public static IEnumerable<string> Outlook(string code, TestOutlook outlook, bool includeIncomplete)
    {
        yield return outlook.ToTest.Count == 0
            ? $"Nothing new to test in {code}."
            : FormattableString.Invariant($"{outlook.ToTest.Count} experiment{(outlook.ToTest.Count == 1 ? "" : "s")} of {code} will be tested: {Named(outlook.ToTest)}. Each is closed to more data from then on.");
        if (outlook.Lacking.Count > 0)
        {
            yield return FormattableString.Invariant($"Short of planned values: {outlook.Lacking.Count} ({Named(outlook.Lacking)}); ")
                + (includeIncomplete ? "tested all the same, and recorded as tested incomplete." : "left alone, and open to more data.");
        }

        if (outlook.ToTest.Count > 0)
        {
            yield return "No result is shown before: whoever tests has decided to test.";
        }
    }

    /// <summary>What comes after a run that tested something, in a sentence.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="steps">How the step is named.</param>
    public static string Next(string code, StepNames steps) =>
        $"Results and survivors count this from now on; {steps.Review(code)} takes it into a review.";

    /// <summary>The first few codes, and how many more.</summary>
    /// <param name="codes">The codes, or phrases that begin with them.</param>
    /// <param name="between">What stands between two.</param>
    public static string Named(IReadOnlyList<string> codes, string between = ", ") =>
        string.Join(between, codes.Take(MostNamed)) + (codes.Count > MostNamed ? FormattableString.Invariant($" and {codes.Count - MostNamed} more") : "");
}
