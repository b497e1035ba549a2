using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>comparisons: a row a follow-up comparison.</summary>
internal sealed class ComparisonsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("comparisons", Describe("A row a follow-up comparison inside an experiment: difference with its interval, p within the experiment, p adjusted for the selection of the experiment, and whether it is claimed.",
        "comparisons PRIMERS --format csv"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();

        // Read whole, at one moment, before the first line is written: a slow reader of the output then holds nobody up.
        (CampaignStanding standing, ExperimentComparison[] comparisons) = catalog.Snapshot(() =>
        {
            CampaignStanding now = new StandingReader(catalog).Read(session.Get(_code));
            return (now, new ComparisonReader(catalog).All(now).ToArray());
        });
        session.Print(new RowTable(Columns, comparisons.Select(Row))
        {
            Above = [$"{standing.Campaign.Code}: {CampaignText.Goal(standing.Campaign)}"],
            Below = [.. ExperimentWording.NotClaimed(comparisons), .. ExperimentWording.Comparisons(standing.Overview, standing.Experiments.Select(e => e.Plan.FollowUp)), .. CampaignText.Footnotes(standing.Overview, standing.Experiments.Select(e => e.Plan.Test)), .. UnitNotes.Of(standing.Experiments)],
            WhenEmpty = "There is no comparison: no experiment with a result names a follow-up, or its data allow none (a control that is not there, no variation inside the groups).",
        });
        return ExitCode.Done;
    }

    public static IReadOnlyList<Column> Columns { get; } =
    [
        new("experiment", "experiment"), new("group_a", "group a", CutLast: true), new("group_b", "group b", CutLast: true), new("difference", "b - a", true),
        new("lower", "lower", true, 1, NotWithout: "upper"), new("upper", "upper", true, 1), new("statistic", "statistic", true, 2), new("p", "p", true), new("adjusted_p", "adjusted p", true),
        new("survives", "claimed"), new("follow_up", "follow-up", GivesWay: 3), new("df", null, true), new("unit", "unit", GivesWay: 2), new("note", "not claimed because", GivesWay: 4, CutLast: true), new("amendments", null), new("family", null),
        new("selected_lower", "selected lower", true, 5, NotWithout: "selected_upper"), new("selected_upper", "selected upper", true, 5), new("selected_confidence", null, true),
    ];

    public static Cell[] Row(ExperimentComparison c) =>
    [
        Cell.Text(c.Experiment.Plan.Code), Cell.Text(c.GroupA), Cell.Text(c.GroupB), Cell.Number(c.Comparison.Difference),
        Cell.Number(c.Comparison.Lower), Cell.Number(c.Comparison.Upper), Cell.Number(c.Comparison.Statistic), Cell.P(c.Comparison.P), Cell.P(c.AdjustedP),
        Cell.Truth(c.Survives), Cell.Text(c.Experiment.Plan.FollowUp), Cell.Degrees(c.Comparison.DegreesOfFreedom), Cell.Text(c.Experiment.Plan.Unit), Cell.Text(c.NotClaimedBecause), Cell.Text(string.Join("; ", c.Experiment.Amendments)), Cell.Text(c.Experiment.Family?.Name),
        Cell.Number(c.SelectedInterval?.Lower), Cell.Number(c.SelectedInterval?.Upper), Cell.Number(c.SelectedConfidence),
    ];
}
