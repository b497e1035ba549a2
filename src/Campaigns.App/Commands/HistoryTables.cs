using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>Which experiment survived in which review: a column a review for people, a row each for scripts.</summary>
internal static class HistoryTables
{
    /// <summary>A row an experiment, a column a review; where there is no room, the oldest reviews give way first.</summary>
    public static RowTable ForPeople(string code, ReviewHistory history, IReadOnlyList<ExperimentHistory> shown)
    {
        int reviews = history.Reviews.Count;
        return new RowTable(
            [new("experiment", "experiment"), .. history.Reviews.Select((r, i) => new Column(ReviewWording.Number(r), $"review {ReviewWording.Number(r)}", false, reviews - i))],
            shown.Select(e => (Cell[])[Cell.Text(e.Code), .. e.Lines.Select(l => Cell.Text(l is not { } line ? "-" : line.Survives ? "survives" : "no"))]))
        {
            Above = [FormattableString.Invariant($"{code}: {shown.Count} of {history.Experiments.Count} experiments in {Counted.Of(reviews, "review")}")],
            Below =
            [
                "survives, no: what the review found on its day; -: no line in that review, since the experiment had no result that counted then (not tested, awaiting a new test, or withdrawn).",
                .. history.Reviews.Select(r => $"{ReviewWording.Line(r)}."),
            ],
            WhenEmpty = "No experiment survives in one review and not in another.",
        };
    }

    /// <summary>A row a line of each review.</summary>
    public static RowTable ForScripts(ReviewHistory history, IReadOnlyList<ExperimentHistory> shown)
    {
        string[] taken = [.. history.Reviews.Select(r => Words.Instant(r.At))];
        return new RowTable(
            [new("experiment", null), new("review", null, true), new("taken_at", null), new("p", null, true), new("adjusted_p", null, true), new("survives", null)],
            shown.SelectMany(e => e.Lines.Select((l, i) => (Cell[])
            [
                Cell.Text(e.Code), Cell.Whole(history.Reviews[i].Number), Cell.Text(taken[i]), Cell.P(l?.P), Cell.P(l?.AdjustedP), Cell.Truth(l?.Survives),
            ])));
    }
}
