using Campaigns.App.Output;
using Campaigns.Catalog.Ledger;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Commands;

/// <summary>One experiment in full as tables: people see them one below the other, scripts as the parts of one JSON object.</summary>
internal static class ExperimentSections
{
    /// <summary>The experiment itself, and the head of the ledger at which it was read: one row.</summary>
    public static RowTable Experiment(ExperimentDetail detail, LedgerHead head)
    {
        ExperimentResult r = detail.Result;
        VariationTable? v = detail.Variation;
        (string Name, Cell Value)[] facts =
        [
            ("experiment", Cell.Text(r.Plan.Code)), ("title", Cell.Text(r.Plan.Title)), ("response", Cell.Text(r.Plan.Response)), ("unit", Cell.Text(r.Plan.Unit)),
            ("status", Cell.Text(r.Status.Word())), ("test", Cell.Text(r.Plan.Test)), ("statistic", Cell.Number(r.Statistic)), ("df1", Cell.Degrees(r.Df1)), ("df2", Cell.Degrees(r.Df2)),
            ("p", Cell.P(r.P)), ("adjusted_p", Cell.P(r.AdjustedP)), ("survives", Cell.Truth(r.Survives)),
            ("between_sum_of_squares", Cell.Number(v?.Between.SumOfSquares)), ("within_sum_of_squares", Cell.Number(v?.Within.SumOfSquares)), ("total_sum_of_squares", Cell.Number(v?.Total.SumOfSquares)),
            ("between_mean_square", Cell.Number(v?.Between.MeanSquare)), ("within_mean_square", Cell.Number(v?.Within.MeanSquare)),
            ("eta_squared", Cell.Number(v?.EtaSquared)), ("omega_squared", Cell.Number(v?.OmegaSquared)), ("residual_standard_deviation", Cell.Number(v?.ResidualStandardDeviation)),
            ("missing", Cell.Whole(detail.MissingCount)), ("amendments", Cell.Text(string.Join("; ", r.Amendments))),
            ("observations", Cell.Whole(r.ObservationCount)), ("specimens", Cell.Whole(r.SpecimenCount)),
            ("arrangements", Cell.Whole(r.Resampling?.Arrangements)), ("as_extreme", Cell.Whole(r.Resampling?.AsExtreme)), ("seed", Seed(r)),
            ("follow_up", Cell.Text(r.Plan.FollowUp)), ("units_note", Cell.Text(detail.Analysis.UnitsNote)),
            ("confirms", Cell.Text(r.Plan.Confirms)), ("replicability_p", Cell.P(r.Confirmation?.P)), ("replicability_adjusted_p", Cell.P(r.Confirmation?.AdjustedP)), ("replicated", Cell.Truth(r.Confirmation?.IsReplicated)),
            ("ledger_sequence", Cell.Whole(head.Sequence)), ("ledger_head", Cell.Text(head.ToString())),
        ];
        return new RowTable([.. facts.Select(f => new Column(f.Name, null))], [[.. facts.Select(f => f.Value)]]);
    }

    /// <summary>A row a group.</summary>
    public static RowTable Groups(ExperimentDetail detail)
    {
        IReadOnlyList<string>? letters = detail.Analysis.Letters;
        return new RowTable(
            [
                new("group", "group"), new("control", "control", GivesWay: 2), new("n", "n", true), new("mean", "mean", true), new("standard_deviation", "sd", true),
                new("standard_error", "se", true, 1), new("lower", "lower", true), new("upper", "upper", true), new("letters", letters is null ? null : "letters"),
            ],
            detail.Groups.Select((g, i) => (Cell[])
            [
                Cell.Text(g.Label), g.IsControl ? Cell.Truth(true) : Cell.Empty, Cell.Whole(g.Summary.Count), Cell.Number(g.Summary.Mean),
                Cell.Number(g.Summary.StandardDeviation), Cell.Number(g.Summary.StandardError), Cell.Number(g.Summary.Lower), Cell.Number(g.Summary.Upper), Cell.Text(letters?[i]),
            ]))
        {
            WhenEmpty = "No group is known yet.",
        };
    }

    /// <summary>The table of variation; no rows where there is none.</summary>
    public static RowTable Variation(ExperimentDetail detail)
    {
        // The p beside F is the F test's own; where another test was planned, its p stands with its statistic.
        bool isF = detail.Result.Plan.Test is "f" or "block-f";
        IEnumerable<Cell[]> rows = detail.Variation is not { } v ? [] :
        [
            .. v.Blocks is { } blocks ? [[Cell.Text("between blocks"), .. Line(blocks), Cell.Empty, Cell.Empty]] : (Cell[][])[],
            [Cell.Text(v.Blocks is null ? "between groups" : "groups, adjusted for blocks"), .. Line(v.Between), Cell.Number(v.F), isF ? Cell.P(detail.Result.P) : Cell.Empty],
            [Cell.Text(v.Blocks is null ? "within groups" : "residual"), .. Line(v.Within), Cell.Empty, Cell.Empty],
            [Cell.Text("total"), Cell.Number(v.Total.SumOfSquares), Cell.Whole(v.Total.DegreesOfFreedom), Cell.Empty, Cell.Empty, Cell.Empty],
        ];
        return new RowTable(
            [new("source", "source"), new("sum_of_squares", "sum of squares", true), new("df", "df", true), new("mean_square", "mean square", true), new("f", "F", true), new("p", "p", true)],
            rows);
    }

    /// <summary>How specimens and their readings vary; no rows where none was averaged.</summary>
    public static RowTable Specimens(ExperimentDetail detail) => new(
        [
            new("source", "source"), new("sum_of_squares", "sum of squares", true), new("df", "df", true), new("mean_square", "mean square", true), new("variance", "variance", true),
        ],
        detail.Analysis.Specimens is not { } s ? [] :
        [
            [Cell.Text("between specimens of a group"), .. Line(s.BetweenSpecimens), Cell.Number(s.Component)],
            [Cell.Text("between readings of a specimen"), .. Line(s.WithinSpecimens), Cell.Number(s.ReadingComponent)],
        ]);

    /// <summary>The planned test, and beside it what else is worth seeing.</summary>
    public static RowTable Tests(ExperimentDetail detail) => new(
        [
            new("values", "values"), new("test", "test"), new("statistic", "statistic", true), new("df1", "df1", true), new("df2", "df2", true), new("p", "p", true), new("outcome", "note"),
        ],
        [
            .. detail.Outcome is { } outcome ? [Test(detail.OutcomeWithExcluded is null ? "all" : "without the excluded", detail.Result.Plan.Test, outcome, detail.Result.Status.WasTested() ? "the planned test" : detail.Result.Status == ExperimentStatus.Withdrawn ? "withdrawn: does not count" : "not in force before a new test")] : (Cell[][])[],
            .. detail.OutcomeWithExcluded is { } all ? [Test("with the excluded", detail.Result.Plan.Test, all, "for comparison")] : (Cell[][])[],
            .. detail.Analysis.Beside is { } beside ? [Test(detail.OutcomeWithExcluded is null ? "all" : "without the excluded", "welch", beside, "for comparison, because spreads differ")] : (Cell[][])[],
        ]);

    /// <summary>A row a check.</summary>
    public static RowTable Checks(ExperimentDetail detail) => new(
        [
            new("check", "check"), new("name", null), new("verdict", "says"), new("statistic", "statistic", true), new("p", "p", true), new("saw", "saw"), new("cannot_see", null), new("advice", null),
        ],
        detail.Analysis.Checks.Select(c =>
        {
            ExperimentCheck check = CheckRegistry.Find(c.Key)!;
            return (Cell[])
            [
                Cell.Text(c.Key), Cell.Text(c.Name), Cell.Text(VerdictWord(c.Finding.Verdict)), Cell.Number(c.Finding.Statistic), Cell.P(c.Finding.P),
                Cell.Text(c.Finding.Saw), Cell.Text(check.CannotSee), Cell.Text(check.Advice),
            ];
        }));

    /// <summary>A row a comparison; people know the experiment and its follow-up from the headings above.</summary>
    public static RowTable Comparisons(ExperimentDetail detail) => new(
        [.. ComparisonsVerb.Columns.Select(c => c.Name is "experiment" or "follow_up" or "unit" ? c with { Heading = null } : c)],
        detail.Comparisons.Select(ComparisonsVerb.Row));

    /// <summary>A row a decision about an observation.</summary>
    public static RowTable Exclusions(ExperimentDetail detail) => new(
        [
            new("file", "file"), new("line", "line", true), new("group", "group"), new("value", "value", true), new("excluded", "excluded"), new("reason", "reason"), new("by", "by"), new("at", "at"),
        ],
        detail.Exclusions.Select(x => (Cell[])
        [
            Cell.Text(x.File), Cell.Whole(x.Line), Cell.Text(x.Group), Cell.Text(x.Value), Cell.Truth(x.IsExcluded), Cell.Text(x.Reason), Cell.Text(x.NamedBy), Cell.Text(Words.Instant(x.At)),
        ]));

    /// <summary>The frozen word of a verdict.</summary>
    public static string VerdictWord(CheckVerdict verdict) => verdict switch
    {
        CheckVerdict.Quiet => "quiet",
        CheckVerdict.Warns => "warns",
        _ => "not-possible",
    };

    /// <summary>The seed as text: a number beyond 2^53 would lose digits in a reader that knows only doubles.</summary>
    public static Cell Seed(ExperimentResult result) => Cell.Text(result.Resampling?.Seed is { } seed ? FormattableString.Invariant($"{seed}") : null);

    private static Cell[] Test(string values, string key, TestOutcome outcome, string note) => outcome is Tested tested
        ? [Cell.Text(values), Cell.Text(key), Cell.Number(tested.Statistic), Cell.Degrees(tested.Df1), Cell.Degrees(tested.Df2), Cell.P(tested.P), Cell.Text(note)]
        : [Cell.Text(values), Cell.Text(key), Cell.Empty, Cell.Empty, Cell.Empty, Cell.Empty, Cell.Text(ExperimentStatusWords.Of(((NotTestable)outcome).Reason).Sentence())];

    private static Cell[] Line(VariationLine line) =>
        [Cell.Number(line.SumOfSquares), Cell.Whole(line.DegreesOfFreedom), Cell.Number(line.MeanSquare)];
}
