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
        session.Print(Table(standing, standing.Experiments));
        return ExitCode.Done;
    }

    /// <summary>A row an experiment, with what must be known to read it.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="shown">The experiments wanted, in the order wanted.</param>
    public static RowTable Table(CampaignStanding standing, IEnumerable<ExperimentResult> shown) => new([.. ColumnsFor(standing)], shown.Select(Row))
    {
        Above = [$"{standing.Campaign.Code}: {CampaignText.Goal(standing.Campaign)}"],
        Below = [.. OnlineText.WithoutLevel(standing.Experiments.Select(e => e.Entry).OfType<StreamEntry>()) is { } late ? [late] : (string[])[], .. OnlineText.OnOtherData(standing.Experiments), .. ConfirmationText.Footnotes(standing.Campaign, standing.Experiments), .. CampaignText.Footnotes(standing.Overview, standing.Experiments.Select(e => e.Plan.Test)), .. UnitNotes.Of(standing.Experiments)],
    };

    public static IReadOnlyList<Column> Columns { get; } =
    [
        new("experiment", "experiment"), new("test", "test", GivesWay: 2), new("groups", "groups", true, 2), new("observations", "values", true, 2),
        new("statistic", "statistic", true, 1), new("df1", "df1", true, 1), new("df2", "df2", true, 1), new("p", "p", true), new("adjusted_p", "adjusted p", true),
        new("survives", "survives"), new("status", "status", GivesWay: 1),
        new("ln_p", null, true), new("eta_squared", "eta squared", true, 4), new("omega_squared", null, true), new("title", "title", GivesWay: 3), new("amendments", null),
        new("specimens", null, true), new("epsilon_squared", null, true), new("cohen_f", null, true), new("arrangements", null, true), new("seed", null), new("follow_up", null),
        new("standing_level", null, true), new("batch_adjusted_p", null, true), new("batch_survives", null),
        new("family", null), new("family_size", null, true), new("family_tested", null, true), new("level", null, true),
        new("confirms", null), new("replicability_p", null, true), new("replicability_adjusted_p", null, true), new("replicated", null),
    ];

    /// <summary>The columns, for people with the family where there are several to tell apart, and with confirmations where there are any.</summary>
    private static IEnumerable<Column> ColumnsFor(CampaignStanding standing)
    {
        bool confirms = standing.Experiments.Any(e => e.Plan.Confirms is not null);
        return Columns.Select(c => c.Name switch
        {
            "family" when standing.Campaign.JudgedFamilies.Count > 0 => c with { Heading = "family", GivesWay = 1 },
            "confirms" when confirms => c with { Heading = "confirms", GivesWay = 1 },
            "replicability_adjusted_p" when confirms => c with { Heading = "adjusted p of both", GivesWay = 0 },
            "replicated" when confirms => c with { Heading = "replicated", GivesWay = 0, CutLast = true },
            _ => c,
        });
    }

    public static Cell[] Row(ExperimentResult result) =>
    [
        Cell.Text(result.Plan.Code), Cell.Text(result.Plan.Test), Cell.Whole(result.GroupCount), Cell.Whole(result.ObservationCount),
        Cell.Number(result.Statistic), Cell.Degrees(result.Df1), Cell.Degrees(result.Df2), Cell.P(result.P), Cell.P(result.AdjustedP),
        Cell.Truth(result.Survives), Cell.Text(result.Status.Word()),
        Cell.Number(result.P?.Log), Cell.Number(result.EtaSquared), Cell.Number(result.OmegaSquared), Cell.Text(result.Plan.Title),
        Cell.Text(string.Join("; ", result.Amendments)),
        Cell.Whole(result.SpecimenCount), Cell.Number(EffectSection.EpsilonSquared(result)), Cell.Number(EffectSection.CohenF(result)),
        Cell.Whole(result.Resampling?.Arrangements), ExperimentSections.Seed(result), Cell.Text(result.Plan.FollowUp),
        Cell.Number(result.GivenLevel), Cell.P(result.BatchAdjustedP), Cell.Truth(result.BatchSurvives),
        Cell.Text(result.Family?.Name), Cell.Whole(result.Family?.Size), Cell.Whole(result.Family?.Tested), result.Family is { } family ? Cell.Setting(family.Level.Value) : Cell.Empty,
        Cell.Text(result.Plan.Confirms), Cell.P(result.Confirmation?.P), Cell.P(result.Confirmation?.AdjustedP), Cell.Truth(result.Confirmation?.IsReplicated),
    ];
}
