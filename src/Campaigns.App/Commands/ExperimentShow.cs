using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Commands;

/// <summary>One experiment in full: for people as tables, for scripts as one row a group (csv) with the experiment's figures beside it.</summary>
internal static class ExperimentShow
{
    private static IReadOnlyList<Column> GroupColumns { get; } =
    [
        new("group", "group"), new("control", "control"), new("n", "n", true), new("mean", "mean", true), new("standard_deviation", "sd", true),
        new("standard_error", "se", true), new("lower", "lower", true), new("upper", "upper", true),
    ];

    private static IReadOnlyList<Column> VariationColumns { get; } =
    [
        new("source", "source"), new("sum_of_squares", "sum of squares", true), new("df", "df", true), new("mean_square", "mean square", true), new("f", "F", true), new("p", "p", true),
    ];

    public static void Write(Session session, CampaignStanding standing, ExperimentDetail detail)
    {
        ExperimentResult result = detail.Result;
        if (session.Format != RowFormat.Table)
        {
            session.Print(ForScripts(detail));
            return;
        }

        string unit = result.Plan.Unit.Length > 0 ? $" [{result.Plan.Unit}]" : "";
        session.Print(new RowTable(GroupColumns, detail.Groups.Select(GroupRow))
        {
            Above =
            [
                $"{standing.Campaign.Code} / {result.Plan.Code}  {result.Plan.Title}",
                $"Response: {(result.Plan.Response.Length > 0 ? result.Plan.Response : "not named")}{unit}. Status: {result.Status.Sentence()}.{Missing(detail)}",
                .. result.Amendments.Select(reason => $"Deviation from the plan: {reason}."),
            ],
            WhenEmpty = "No group is known yet.",
        });
        session.Host.Out.WriteLine();
        if (detail.Variation is { } variation)
        {
            session.Print(new RowTable(VariationColumns, VariationRows(variation, result)));
            session.Host.Out.WriteLine();
        }

        TextTable.Sentences(session.Host, Conclusion(standing, detail));
    }

    private static string Missing(ExperimentDetail detail) =>
        detail.MissingCount > 0 ? FormattableString.Invariant($" Marked as missing and left out: {detail.MissingCount}.") : "";

    private static Cell[] GroupRow(GroupDetail group) =>
    [
        Cell.Text(group.Label), group.IsControl ? Cell.Truth(true) : Cell.Empty, Cell.Whole(group.Summary.Count), Cell.Number(group.Summary.Mean),
        Cell.Number(group.Summary.StandardDeviation), Cell.Number(group.Summary.StandardError), Cell.Number(group.Summary.Lower), Cell.Number(group.Summary.Upper),
    ];

    private static Cell[][] VariationRows(VariationTable v, ExperimentResult result) =>
    [
        [Cell.Text("between groups"), .. Line(v.Between), Cell.Number(v.F), Cell.P(result.P)],
        [Cell.Text("within groups"), .. Line(v.Within), Cell.Empty, Cell.Empty],
        [Cell.Text("total"), Cell.Number(v.Total.SumOfSquares), Cell.Whole(v.Total.DegreesOfFreedom), Cell.Empty, Cell.Empty, Cell.Empty],
    ];

    private static Cell[] Line(VariationLine line) =>
        [Cell.Number(line.SumOfSquares), Cell.Whole(line.DegreesOfFreedom), Cell.Number(line.MeanSquare)];

    private static IEnumerable<string> Conclusion(CampaignStanding standing, ExperimentDetail detail)
    {
        ExperimentResult result = detail.Result;
        if (result.P is not { } p)
        {
            yield return "No result: the experiment counts as p = 1 in its family.";
        }
        else
        {
            string verdict = result.Survives == true ? "It survives: evidence that not all group means are equal." : "It does not survive: no difference shown, which is not the same as no difference.";
            yield return $"p = {NumberText.P(p)}, adjusted p = {NumberText.P(result.AdjustedP!.Value)}. {verdict}";
            if (detail.Variation is { } v)
            {
                yield return $"Eta squared {NumberText.Screen(v.EtaSquared, 4)}, omega squared {NumberText.Screen(v.OmegaSquared, 4)}, residual standard deviation {NumberText.Screen(v.ResidualStandardDeviation, 5)}.";
            }
        }

        if (detail.Groups.Any(g => g.Summary.Lower is not null))
        {
            yield return FormattableString.Invariant($"Intervals: {100 * detail.Confidence:0.#} % for each mean alone, from the group's own standard deviation and Student's t.");
        }

        foreach (string line in CampaignText.Footnotes(standing.Overview))
        {
            yield return line;
        }

        yield return CampaignText.Caution;
    }

    private static RowTable ForScripts(ExperimentDetail detail)
    {
        ExperimentResult r = detail.Result;
        VariationTable? v = detail.Variation;
        (string Name, Cell Value)[] experiment =
        [
            ("experiment", Cell.Text(r.Plan.Code)), ("title", Cell.Text(r.Plan.Title)), ("response", Cell.Text(r.Plan.Response)), ("unit", Cell.Text(r.Plan.Unit)),
            ("status", Cell.Text(r.Status.Word())), ("test", Cell.Text(r.Plan.Test)), ("statistic", Cell.Number(r.Statistic)), ("df1", Cell.Degrees(r.Df1)), ("df2", Cell.Degrees(r.Df2)),
            ("p", Cell.P(r.P)), ("adjusted_p", Cell.P(r.AdjustedP)), ("survives", Cell.Truth(r.Survives)),
            ("between_sum_of_squares", Cell.Number(v?.Between.SumOfSquares)), ("within_sum_of_squares", Cell.Number(v?.Within.SumOfSquares)), ("total_sum_of_squares", Cell.Number(v?.Total.SumOfSquares)),
            ("between_mean_square", Cell.Number(v?.Between.MeanSquare)), ("within_mean_square", Cell.Number(v?.Within.MeanSquare)),
            ("eta_squared", Cell.Number(v?.EtaSquared)), ("omega_squared", Cell.Number(v?.OmegaSquared)), ("residual_standard_deviation", Cell.Number(v?.ResidualStandardDeviation)),
            ("missing", Cell.Whole(detail.MissingCount)), ("amendments", Cell.Text(string.Join("; ", r.Amendments))),
        ];
        return new RowTable(
            [.. GroupColumns, .. experiment.Select(e => new Column(e.Name, null))],
            detail.Groups.Select(g => (Cell[])[.. GroupRow(g), .. experiment.Select(e => e.Value)]));
    }
}
