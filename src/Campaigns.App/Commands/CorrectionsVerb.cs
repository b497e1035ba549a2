using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>corrections: every correction side by side.</summary>
internal sealed class CorrectionsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<bool> _byExperiment = new("--by-experiment") { Description = "A row an experiment with its adjusted p under every correction, instead of a row a correction." };

    public override Command Build() => new("corrections", Describe("Every correction side by side on the campaign's family; the sealed one alone decides.",
        "corrections PRIMERS --by-experiment --format csv"))
    {
        _code, _byExperiment,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        CampaignStanding standing = new StandingReader(catalog).Read(session.Get(_code));
        ExperimentResult[] tested = [.. standing.Experiments.Where(e => e.P is not null)];
        IReadOnlyList<Correction> shown = Shown(standing);
        CampaignVerdict[] verdicts = [.. shown.Select(c => FamilyVerdict.JudgeBy(standing.Campaign, standing.Experiments, c))];
        session.Print(session.Get(_byExperiment) ? ByExperiment(standing, tested, shown, verdicts) : ByCorrection(standing, shown, verdicts));
        return ExitCode.Done;
    }

    private static RowTable ByCorrection(CampaignStanding standing, IReadOnlyList<Correction> shown, CampaignVerdict[] verdicts)
    {
        SignificanceLevel level = standing.Campaign.Level;
        return new RowTable(
            [
                new("correction", "key"), new("name", "name"), new("controls", "holds", GivesWay: 1), new("valid_under", "under", GivesWay: 1), new("survivors", "survivors", true),
                new("level", "level", true, 2), new("family_size", "family", true, 2), new("sealed", "sealed"), new("guarantee", null), new("source", null),
            ],
            shown.Select((c, i) => new[]
            {
                Cell.Text(c.Key), Cell.Text(c.Name), Cell.Text(CampaignText.RateWords(c.Controls)), Cell.Text(DependenceWords(c.ValidUnder)),
                Cell.Whole(verdicts[i].SurvivorCount), Cell.Setting(level.Value), Cell.Whole(standing.FamilySize),
                Cell.Truth(standing.Families.Any(f => f.Correction == c.Key)), Cell.Text(c.Guarantee), Cell.Text(c.Source),
            }).Concat(StandingRow(standing)))
        {
            Above = [FormattableString.Invariant($"{standing.Campaign.Code}: {standing.TestedCount} results in {Of(standing)}, every correction at {(standing.Campaign.JudgedFamilies.Count == 0 ? level.ToString() : "the level of each family")}")],
            Below = ["The sealed correction alone decides what survives; choosing another after seeing this table would undo what a correction is for.", .. InFamilies(standing), .. CampaignText.Deviations(standing.Overview), CampaignText.ReviewLine(standing.Overview)],
        };
    }

    /// <summary>In a campaign judged as its experiments arrive, the decisions that stand, below the batch corrections.</summary>
    private static IEnumerable<Cell[]> StandingRow(CampaignStanding standing)
    {
        if (OnlineVerdict.ProcedureOf(standing.Campaign) is { } c)
        {
            yield return
            [
                Cell.Text(c.Key), Cell.Text(c.Name), Cell.Text(CampaignText.RateWords(c.Controls)), Cell.Text(DependenceWords(c.ValidUnder)),
                Cell.Whole(standing.SurvivorCount), Cell.Setting(standing.Campaign.Level.Value), Cell.Whole(standing.FamilySize), Cell.Truth(true), Cell.Text(c.Guarantee), Cell.Text(c.Source),
            ];
        }
    }

    private static RowTable ByExperiment(CampaignStanding standing, ExperimentResult[] tested, IReadOnlyList<Correction> shown, CampaignVerdict[] verdicts)
    {
        Column[] columns =
        [
            new("experiment", "experiment"), new("p", "p", true),
            .. shown.Select(c => new Column(c.Key, c.Key, true)),
        ];
        return new RowTable(columns, tested.Select((e, row) => (Cell[])[Cell.Text(e.Plan.Code), Cell.P(e.P), .. verdicts.Select(v => Cell.P(v.Adjusted[row]))]))
        {
            Above = [FormattableString.Invariant($"{standing.Campaign.Code}: adjusted p-values in {Of(standing)}")],
            Below = [standing.Campaign.JudgedFamilies.Count == 0 ? $"The sealed correction is {standing.Campaign.Correction}; it alone decides what survives." : "The sealed corrections alone decide what survives.", .. InFamilies(standing), .. CampaignText.Deviations(standing.Overview), CampaignText.ReviewLine(standing.Overview)],
        };
    }

    /// <summary>Those that need nothing but p, and those with weights where the plan gives some.</summary>
    private static IReadOnlyList<Correction> Shown(CampaignStanding standing) =>
        standing.Experiments.Any(e => e.Plan.Weight is not null) ? CorrectionRegistry.All : CorrectionRegistry.FromPAlone;

    private static string Of(CampaignStanding standing) => standing.Campaign.JudgedFamilies.Count == 0
        ? FormattableString.Invariant($"a family of {standing.FamilySize}")
        : FormattableString.Invariant($"{standing.Families.Count} families of {standing.FamilySize} together");

    private static IEnumerable<string> InFamilies(CampaignStanding standing) => standing.Campaign.JudgedFamilies.Count == 0
        ? []
        : [FormattableString.Invariant($"Each correction is applied in each of the {standing.Families.Count} families, at the family's level and behind its gate; an adjusted p of a closed family is 1. The sealed ones are: {string.Join("; ", standing.Families.Select(f => $"{f.Name} {f.Correction} at {FamilyText.Level(f.Level)}"))}.")];

    private static string DependenceWords(Dependence dependence) => dependence switch
    {
        Dependence.Any => "any dependence",
        Dependence.Sidak => "independence, or Sidak's inequality",
        Dependence.Simes => "independence, or Simes' inequality",
        Dependence.PositiveRegression => "independence, or positive dependence",
        Dependence.Independent => "independence",
        Dependence.IndependentConservative => "independence, and nulls that are uniformly conservative",
        _ => throw new ArgumentOutOfRangeException(nameof(dependence), dependence, "No words for this dependence."),
    };
}
