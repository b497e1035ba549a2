using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>corrections: every correction side by side, and what hangs on the choice.</summary>
internal sealed class CorrectionsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<bool> _byExperiment = new("--by-experiment") { Description = "A row an experiment with its adjusted p under every correction, instead of a row a correction." };
    private readonly Option<bool> _hanging = new("--hanging") { Description = "Of these, only the experiments that survive under some corrections of the campaign's kind and not under others." };
    private readonly Option<bool> _nearMisses = new("--near-misses") { Description = "What would survive at another level, in a family of the tested alone, or under another correction." };
    private readonly Option<double?> _level = TypedOptions.LevelOrNone("With --near-misses, the other level to look at (else 0.01, 0.05 and 0.1).");

    public override Command Build() => new("corrections", Describe("Every correction side by side on the campaign's family, and what hangs on the choice; the sealed one alone decides.",
        "corrections PRIMERS --hanging"))
    {
        _code, _byExperiment, _hanging, _nearMisses, _level,
    };

    public override int Run(Session session)
    {
        bool nearMisses = session.Get(_nearMisses);
        bool byExperiment = session.Get(_byExperiment) || session.Get(_hanging);
        double? level = session.Typed.GetValue(_level);
        if (nearMisses && byExperiment)
        {
            throw new UsageException("--near-misses gives a row a change; ask for --by-experiment or --hanging in a command of its own.");
        }

        if (level is not null && !nearMisses)
        {
            throw new UsageException("--level goes with --near-misses: the corrections are shown at the sealed level.");
        }

        using Catalog.Catalog catalog = session.OpenCatalog();
        CampaignStanding standing = new StandingReader(catalog).Read(session.Get(_code));
        session.Print(
            nearMisses ? NearMisses(standing, level)
            : byExperiment ? ByExperiment(standing, session.Get(_hanging))
            : ByCorrection(standing));
        return ExitCode.Done;
    }

    /// <summary>A row a correction.</summary>
    public static RowTable ByCorrection(CampaignStanding standing)
    {
        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(standing);
        int hanging = HangingPlaces(standing, outcomes).Count();
        return new RowTable(
            [
                new("correction", "key"), new("name", "name"), new("controls", "holds", GivesWay: 1), new("valid_under", "under", GivesWay: 1), new("survivors", "survivors", true),
                new("level", "level", true, 2), new("family_size", "family", true, 2), new("sealed", "sealed"), new("guarantee", null), new("source", null),
            ],
            outcomes.Select(o => (Cell[])
            [
                Cell.Text(o.Key), Cell.Text(o.IsMixed ? FamilyText.Procedures(standing.Campaign) : o.Procedure.Name), Cell.Text(CampaignText.RateWords(o.Procedure.Controls)), Cell.Text(o.IsMixed ? null : CorrectionsText.Under(o.Procedure.ValidUnder)),
                Cell.Whole(o.IsSealed ? standing.SurvivorCount : o.SurvivorCount), Cell.Setting(standing.Campaign.Level.Value), Cell.Whole(standing.FamilySize),
                Cell.Truth(o.IsSealed || standing.Families.Any(f => f.Correction == o.Key)), Cell.Text(o.IsMixed ? string.Join(" ", FamilyText.Guarantees(standing.Overview)) : o.Procedure.Guarantee), Cell.Text(o.IsMixed ? null : o.Procedure.Source),
            ]))
        {
            Above = [FormattableString.Invariant($"{standing.Campaign.Code}: {standing.TestedCount} results in {Of(standing)}, every correction at {(standing.Campaign.JudgedFamilies.Count == 0 ? standing.Campaign.Level.ToString() : "the level of each family")}")],
            Below =
            [
                $"{CorrectionsText.Hanging(hanging, CampaignText.RateWords(standing.Campaign.ErrorRate))}{(hanging > 0 ? "; --hanging lists them" : "")}.",
                CorrectionsText.NeverToChoose, .. InFamilies(standing), .. Ending(standing),
            ],
        };
    }

    /// <summary>A row an experiment with its adjusted p under every correction.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="hangingOnly">Whether only those are wanted that hang on the choice.</param>
    public static RowTable ByExperiment(CampaignStanding standing, bool hangingOnly)
    {
        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(standing);
        ErrorRate rate = standing.Campaign.ErrorRate;
        HashSet<int> hanging = [.. HangingPlaces(standing, outcomes)];
        Column[] columns =
        [
            new("experiment", "experiment"), new("p", "p", true),
            .. outcomes.Select(o => new Column(o.Key, o.IsSealed && !o.IsMixed ? $"{o.Key} (sealed)" : o.Key, true, o.IsSealed ? 0 : 2)),
            new("hangs", "hangs"), new("survives_under", hangingOnly ? "survives under" : null, GivesWay: 1, CutLast: true),
            new(AdjustQValues.Column, null, true),
        ];
        ExperimentResult[] tested = [.. standing.Experiments.Where(e => e.P is not null)];
        var qValues = new AdjustQValues([.. tested.Select(e => e.P!.Value)]);
        IEnumerable<int> places = Enumerable.Range(0, tested.Length).Where(i => !hangingOnly || hanging.Contains(i));
        return new RowTable(columns, places.Select(i => (Cell[])
        [
            Cell.Text(tested[i].Plan.Code), Cell.P(tested[i].P), .. outcomes.Select(o => Cell.P(o.Adjusted[i])),
            Cell.Truth(hanging.Contains(i)), Cell.Text(string.Join('|', CorrectionsBeside.SurvivesUnder(outcomes, rate, i))), Cell.P(qValues.At(i)),
        ]))
        {
            Above = [FormattableString.Invariant($"{standing.Campaign.Code}: adjusted p-values in {Of(standing)}, to be held against {(standing.Campaign.JudgedFamilies.Count == 0 ? standing.Campaign.Level.ToString() : "the level of each family")}")],
            WhenEmpty = hangingOnly ? "No experiment hangs on the choice." : "There is nothing to show.",
            Below = [$"Hangs: survives under some of the corrections that hold the {CampaignText.RateWords(rate)}, each under its own assumptions, and not under others.", CorrectionsText.NeverToChoose, .. qValues.Sentences, .. InFamilies(standing), .. Ending(standing)],
        };
    }

    private static RowTable NearMisses(CampaignStanding standing, double? level)
    {
        SignificanceLevel[] levels = [.. (level is { } one ? [one] : PlanScenarios.UsualLevels).Select(l => new SignificanceLevel(l))];
        return new RowTable(
            [
                new("scenario", "scenario"), new("changed", "changed to", CutLast: true), new("survivors", "survivors", true),
                new("gained", "gained"), new("lost", "lost"),
            ],
            PlanScenarios.Of(standing, levels).Select(s => (Cell[])
            [
                Cell.Text(s.Kind), Cell.Text(s.Changed), Cell.Whole(s.SurvivorCount), Cell.Text(string.Join('|', s.Gained)), Cell.Text(string.Join('|', s.Lost)),
            ]))
        {
            Above = [$"{standing.Campaign.Code}: {CampaignText.Goal(standing.Campaign)}, and what would survive with one thing changed"],
            Below = ["Gained and lost are against the sealed plan. It alone decides: a plan that is changed after its results were seen holds no error rate.", .. Ending(standing)],
        };
    }

    private static IEnumerable<int> HangingPlaces(CampaignStanding standing, IReadOnlyList<CorrectionOutcome> outcomes) =>
        Enumerable.Range(0, standing.TestedCount).Where(i => CorrectionsBeside.Hangs(outcomes, standing.Campaign.ErrorRate, i));

    private static IEnumerable<string> Ending(CampaignStanding standing) => [.. CampaignText.Deviations(standing.Overview), CampaignText.ReviewLine(standing.Overview)];

    private static string Of(CampaignStanding standing) => standing.Campaign.JudgedFamilies.Count == 0
        ? FormattableString.Invariant($"a family of {standing.FamilySize}")
        : FormattableString.Invariant($"{standing.Families.Count} families of {standing.FamilySize} together");

    private static IEnumerable<string> InFamilies(CampaignStanding standing) => standing.Campaign.JudgedFamilies.Count == 0
        ? []
        : [FormattableString.Invariant($"Each correction is applied in each of the {standing.Families.Count} families, at the family's level and behind its gate; an adjusted p of a closed family is 1. The sealed ones are: {string.Join("; ", standing.Families.Select(f => $"{f.Name} {f.Correction} at {FamilyText.Level(f.Level)}"))}.")];
}
