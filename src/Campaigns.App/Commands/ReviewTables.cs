using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>Reviews, their lines and what lies between two of them, as rows.</summary>
internal static class ReviewTables
{
    /// <summary>A row a review.</summary>
    public static RowTable Of(string code, IReadOnlyList<ReviewRecord> records) => new(
        [
            new("review", "review", true), new("taken_at", "taken", true), new("plan_version", "plan", true, 1), new("files", "files", true, 3), new("rows", "rows", true, 3), new("correction", "correction", GivesWay: 2),
            new("level", "level", true, 2), new("family_size", "family", true), new("tested", "tested", true), new("survivors", "survivors", true), new("interim", "interim", GivesWay: 1),
            new("program_version", "program", true, 5), new("ledger_sequence", "ledger", true, 4),
        ],
        records.Select(r => (Cell[])
        [
            Cell.Whole(r.Head.Number), Cell.Text(Words.Instant(r.Head.At)), Cell.Whole(r.PlanVersion), Cell.Whole(r.Files), Cell.Whole(r.Rows), Cell.Text(r.Head.Correction),
            Cell.Setting(r.Head.Level.Value), Cell.Whole(r.Head.FamilySize), Cell.Whole(r.Head.TestedCount), Cell.Whole(r.Head.SurvivorCount), Cell.Truth(r.Head.IsInterim),
            Cell.Text(r.Head.ProgramVersion), Cell.Whole(r.LedgerSequence),
        ]))
    {
        Above = [FormattableString.Invariant($"{code}: {Counted.Of(records.Count, "review")}, each as it was on its day")],
        Below =
        [
            .. records.SelectMany(r => r.Families.Select(f => ReviewWording.Family(r.Head, f))),
            .. records.Count == 0 ? Array.Empty<string>() : ["plan: version of the plan, 0 as it was sealed, then the number of its latest amendment; files, rows: measurements loaded before the review; ledger: its entry there."],
        ],
        WhenEmpty = $"No review was taken yet; 'campaigns review {code}' takes one.",
    };

    /// <summary>A row a family of each review, for scripts.</summary>
    public static RowTable Families(string code, IReadOnlyList<ReviewRecord> records) => new(
        [
            new("review", "review", true), new("family", "family"), new("correction", "correction"), new("level", "level", true), new("planned", "planned", true), new("family_size", "counted", true),
            new("tested", "tested", true), new("survivors", "survivors", true), new("open", "open"),
        ],
        records.SelectMany(r => FamiliesOf(r).Select(f => (Cell[])
        [
            Cell.Whole(r.Head.Number), Cell.Text(f.Name), Cell.Text(f.Correction), Cell.Setting(f.Level.Value), Cell.Whole(r.Families.Count > 0 || !r.Head.IsInterim ? f.Planned : null), Cell.Whole(f.Size),
            Cell.Whole(f.Tested), Cell.Whole(f.Survivors), Cell.Truth(f.IsOpen),
        ])))
    {
        WhenEmpty = $"No review was taken yet; 'campaigns review {code}' takes one.",
    };

    /// <summary>A row a line of one review, as it was stored.</summary>
    public static RowTable Lines(ReviewHead head, IReadOnlyList<ReviewReader.NamedLine> lines) => new(
        [
            new("experiment", "experiment"), new("p", "p", true), new("adjusted_p", "adjusted p", true), new("survives", "survives"),
            new("family", lines.Any(l => l.Family.Name.Length > 0) ? "family" : null), new("level", null, true),
        ],
        lines.Select(l => (Cell[])
        [
            Cell.Text(l.Experiment), Cell.P(l.Line.P), Cell.P(l.Line.AdjustedP), Cell.Truth(l.Line.Survives), Cell.Text(l.Family.Name), Cell.Setting(l.Family.Level.Value),
        ]))
    {
        Above = [$"{ReviewWording.Line(head)}."],
        Below = [.. ReviewWording.Applied(head, lines.Select(l => l.Family)), "These are the lines that were stored on that day; experiments without a result then have none, and counted with p = 1."],
        WhenEmpty = "No experiment had a result.",
    };

    /// <summary>The families of a review; for a campaign of one family, that one.</summary>
    private static IReadOnlyList<FamilyStanding> FamiliesOf(ReviewRecord r) => r.Families.Count > 0
        ? r.Families
        : [new FamilyStanding("", r.Head.Correction, r.Head.Level, r.Head.FamilySize, r.Head.FamilySize, r.Head.TestedCount, r.Head.SurvivorCount)];

    /// <summary>A row an experiment that was gained or lost between two reviews.</summary>
    public static RowTable Compared(ReviewComparison comparison, IReadOnlyDictionary<long, string> codes)
    {
        bool hasFamilies = comparison.Differences.Any(d => d.Family.Length > 0);
        return new RowTable(
        [
            new("experiment", "experiment"), new("change", "change"), new("p_before", "p before", true, 1), new("p_after", "p after", true, 1), new("adjusted_p_before", "adjusted before", true),
            new("adjusted_p_after", "adjusted after", true), new("reason", null), new("events", null), new("family", hasFamilies ? "family" : null, GivesWay: 2),
            new("family_size_before", null, true), new("family_size_after", null, true), new("because", "because", CutLast: true, Wraps: true), new("family_events", null),
        ],
        comparison.Differences.Select(d => (Cell[])
        [
            Cell.Text(codes[d.Key]), Cell.Text(d.IsGained ? "gained" : "lost"), Cell.P(d.Before?.P), Cell.P(d.After?.P), Cell.P(d.Before?.AdjustedP), Cell.P(d.After?.AdjustedP),
            Cell.Text(d.Reason.Word()), Cell.Text(string.Join('|', d.Events.Select(e => e.Cause.Word()).Distinct())), Cell.Text(d.Family),
            Cell.Whole(d.SizeBefore), Cell.Whole(d.SizeAfter), Cell.Text(ReviewWording.Why(d)),
            Cell.Text(string.Join('|', d.FamilyEvents.Select(e => $"{e.Experiment} {e.Cause.Word()}"))),
        ]))
        {
            Above = [ReviewWording.Summary(comparison), .. ReviewWording.Counts(comparison)],
            Below = comparison.NothingChanged ? [] : [ReviewWording.Sealed(comparison)],
            WhenEmpty = "The survivors are the same.",
        };
    }

    /// <summary>A row an experiment whose line came out otherwise when its review was taken again.</summary>
    public static RowTable Again(IReadOnlyList<ReviewRerun.Outcome> outcomes) => new(
        [
            new("review", "review", true), new("experiment", "experiment"), new("stored_p", "stored p", true), new("recomputed_p", "recomputed p", true), new("stored_adjusted_p", "stored adjusted", true),
            new("recomputed_adjusted_p", "recomputed adjusted", true), new("stored_survives", null), new("recomputed_survives", null),
        ],
        outcomes.SelectMany(o => o.Lines.Select(l => (Cell[])
        [
            Cell.Whole(o.Review.Number), Cell.Text(l.Experiment), Cell.P(l.Stored?.P), Cell.P(l.Recomputed?.P), Cell.P(l.Stored?.AdjustedP), Cell.P(l.Recomputed?.AdjustedP),
            Cell.Truth(l.Stored?.Survives), Cell.Truth(l.Recomputed?.Survives),
        ])));
}
