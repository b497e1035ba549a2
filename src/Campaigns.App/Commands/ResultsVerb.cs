using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>results: a row an experiment.</summary>
internal sealed class ResultsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("results", Describe("A row an experiment: test, p, adjusted p, whether it survives; those without a result stay visible.",
        "results PRIMERS --format csv"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        CampaignStanding standing = new StandingReader(catalog).Read(session.Get(_code));
        session.Print(new RowTable(ColumnsFor(standing), standing.Experiments.Select(Row))
        {
            Above = [$"{standing.Campaign.Code}: {CampaignText.Goal(standing.Campaign)}"],
            Below = [.. ConfirmationText.Footnotes(standing.Campaign, standing.Experiments), .. CampaignText.Footnotes(standing.Overview, standing.Experiments.Select(e => e.Plan.Test)), .. UnitNotes.Of(standing.Experiments)],
        });
        return ExitCode.Done;
    }

    /// <summary>The columns, those on confirmations for people too where there are any.</summary>
    private static IReadOnlyList<Column> ColumnsFor(CampaignStanding standing) => standing.Experiments.All(e => e.Plan.Confirms is null) ? Columns :
    [
        .. Columns.Select(c => c.Name switch
        {
            "confirms" => c with { Heading = "confirms", GivesWay = 1 },
            "replicability_adjusted_p" => c with { Heading = "adjusted p of both", GivesWay = 0 },
            "replicated" => c with { Heading = "replicated", GivesWay = 0, CutLast = true },
            _ => c,
        }),
    ];

    public static IReadOnlyList<Column> Columns { get; } =
    [
        new("experiment", "experiment"), new("test", "test", GivesWay: 2), new("groups", "groups", true, 2), new("observations", "values", true, 2),
        new("statistic", "statistic", true, 1), new("df1", "df1", true, 1), new("df2", "df2", true, 1), new("p", "p", true), new("adjusted_p", "adjusted p", true),
        new("survives", "survives"), new("status", "status", GivesWay: 1),
        new("ln_p", null, true), new("eta_squared", "eta squared", true, 4), new("omega_squared", null, true), new("title", "title", GivesWay: 3), new("amendments", null),
        new("specimens", null, true), new("epsilon_squared", null, true), new("cohen_f", null, true), new("arrangements", null, true), new("seed", null), new("follow_up", null),
        new("confirms", null, GivesWay: 5), new("replicability_p", null, true, 4), new("replicability_adjusted_p", null, true, 4), new("replicated", null, GivesWay: 4),
    ];

    public static Cell[] Row(ExperimentResult result) =>
    [
        Cell.Text(result.Plan.Code), Cell.Text(result.Plan.Test), Cell.Whole(result.GroupCount), Cell.Whole(result.ObservationCount),
        Cell.Number(result.Statistic), Cell.Degrees(result.Df1), Cell.Degrees(result.Df2), Cell.P(result.P), Cell.P(result.AdjustedP),
        Cell.Truth(result.Survives), Cell.Text(result.Status.Word()),
        Cell.Number(result.P?.Log), Cell.Number(result.EtaSquared), Cell.Number(result.OmegaSquared), Cell.Text(result.Plan.Title),
        Cell.Text(string.Join("; ", result.Amendments)),
        Cell.Whole(result.SpecimenCount), Cell.Number(EffectSection.EpsilonSquared(result)), Cell.Number(EffectSection.CohenF(result)),
        Cell.Whole(result.Resampling?.Arrangements), ExperimentSections.Seed(result), Cell.Text(result.Plan.FollowUp),
        Cell.Text(result.Plan.Confirms), Cell.P(result.Confirmation?.P), Cell.P(result.Confirmation?.AdjustedP), Cell.Truth(result.Confirmation?.IsReplicated),
    ];
}
