using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>bound: at most how many of some experiments may be false.</summary>
internal sealed class BoundVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string[]> _experiments = TypedOptions.NotBlank(new Argument<string[]>("EXPERIMENT") { Description = "The experiments that are marked.", Arity = ArgumentArity.ZeroOrMore });
    private readonly Option<double?> _level = TypedOptions.LevelOrNone("One less the confidence (else the campaign's level).");
    private readonly Option<string?> _dependence = TypedOptions.Word("--dependence", "What the bound assumes of the dependence between experiments (else simes).", "simes|any", "simes", "any");
    private readonly Option<bool> _allSurvivors = new("--all-survivors") { Description = "Mark every survivor of the campaign's correction." };
    private readonly Option<bool> _curve = new("--curve") { Description = "A row for the k smallest p-values, for every k." };

    public override Command Build() => new("bound", Describe("At most how many of the marked experiments may be false, with a confidence that holds for every set at once, so that the set may be chosen after looking.",
        "bound PRIMERS E03 E07 E11"))
    {
        _code, _experiments, _level, _dependence, _allSurvivors, _curve,
    };

    public override int Run(Session session)
    {
        string[] named = session.Get(_experiments) ?? [];
        bool survivors = session.Get(_allSurvivors);
        bool curve = session.Get(_curve);
        if (curve && (survivors || named.Length > 0))
        {
            throw new UsageException("--curve is about the smallest p-values of the whole campaign; leave out the experiments and --all-survivors.");
        }

        if (!curve && !survivors && named.Length == 0)
        {
            throw new UsageException("Name the experiments to mark, or give --all-survivors or --curve.");
        }

        using Catalog.Catalog catalog = session.OpenCatalog();
        CampaignStanding standing = new StandingReader(catalog).Read(session.Get(_code));
        SignificanceLevel level = session.Typed.GetValue(_level) is { } chosen ? new SignificanceLevel(chosen) : standing.Campaign.Level;
        CampaignBounds bounds = CampaignBounds.Of(standing.Experiments, level, session.Typed.GetValue(_dependence) == "any");
        session.Print(curve ? Curve(standing, bounds) : Marked(standing, bounds, Members(session, standing, named, survivors)));
        return ExitCode.Done;
    }

    private static SortedSet<int> Members(Session session, CampaignStanding standing, string[] named, bool survivors)
    {
        var places = new Dictionary<string, int>(StringComparer.Ordinal);
        var members = new SortedSet<int>();
        for (int i = 0; i < standing.Experiments.Count; i++)
        {
            places[standing.Experiments[i].Plan.Code] = i;
            if (survivors && standing.Experiments[i].Survives == true)
            {
                members.Add(i);
            }
        }

        foreach (IGrouping<string, string> name in named.GroupBy(n => n, StringComparer.Ordinal))
        {
            if (!places.TryGetValue(name.Key, out int place))
            {
                string hint = Nearest.Of(name.Key, places.Keys) is { } near ? $"'{near}' may be meant" : $"'campaigns results {standing.Campaign.Code}' lists those it has";
                throw new RefusedException($"The campaign '{standing.Campaign.Code}' has no experiment '{name.Key}'; {hint}.");
            }

            if (standing.Experiments[place].LeftFamily)
            {
                throw new RefusedException($"The experiment '{name.Key}' was withdrawn before any data and is not in the family of '{standing.Campaign.Code}' any more, so that no bound speaks of it; leave it out.");
            }

            if (name.Count() > 1)
            {
                session.Host.Notice($"Note: '{name.Key}' is named more than once; it counts once.");
            }

            members.Add(place);
        }

        return members;
    }

    private static RowTable Marked(CampaignStanding standing, CampaignBounds bounds, SortedSet<int> members)
    {
        MarkedBound bound = bounds.Mark(members);
        string[] untested = [.. members.Where(i => standing.Experiments[i].P is null).Select(i => standing.Experiments[i].Plan.Code)];
        return new RowTable(
            [
                new("marked", "marked", true), new("real_at_least", "real at least", true), new("false_at_most", "false at most", true), new("confidence", "confidence", true),
                new("level", "level", true), new("family_size", "family", true), new("dependence", "dependence"), new("untested", "untested", true),
            ],
            [
                [
                    Cell.Whole(bound.Marked), Cell.Whole(bound.RealAtLeast), Cell.Whole(bound.FalseAtMost), Cell.Setting(bounds.Confidence), Cell.Setting(bounds.Testing.Level.Value),
                    Cell.Whole(standing.FamilySize), Cell.Text(DependenceWord(bounds)), Cell.Whole(bound.Untested),
                ],
            ])
        {
            Above = [$"{standing.Campaign.Code}: {BoundWording.Line(bound, bounds.Confidence)}"],
            Below = [.. Untested(untested), .. Footnotes(standing, bounds)],
        };
    }

    private static RowTable Curve(CampaignStanding standing, CampaignBounds bounds) => new(
        [
            new("k", "k", true), new("experiment", "experiment"), new("p", "p", true), new("real_at_least", "real at least", true), new("false_at_most", "false at most", true),
            new("confidence", "confidence", true, 1), new("level", null, true), new("family_size", null, true), new("dependence", null), new("survives", "survives"),
        ],
        bounds.Curve().Select(row => (Cell[])
        [
            Cell.Whole(row.Bound.Marked), Cell.Text(row.Experiment.Plan.Code), Cell.P(row.Experiment.P), Cell.Whole(row.Bound.RealAtLeast), Cell.Whole(row.Bound.FalseAtMost),
            Cell.Setting(bounds.Confidence), Cell.Setting(bounds.Testing.Level.Value), Cell.Whole(standing.FamilySize), Cell.Text(DependenceWord(bounds)), Cell.Truth(row.Experiment.Survives),
        ]))
    {
        Above = [FormattableString.Invariant($"{standing.Campaign.Code}: the k smallest of {standing.TestedCount} p-values, for every k")],
        Below = Footnotes(standing, bounds),
        WhenEmpty = "No experiment has a result yet.",
    };

    private static IEnumerable<string> Untested(string[] codes)
    {
        if (codes.Length > 0)
        {
            yield return $"Marked without a result, counted as p = 1: {string.Join(", ", codes)}.";
        }
    }

    private static IReadOnlyList<string> Footnotes(CampaignStanding standing, CampaignBounds bounds) =>
    [
        BoundWording.Simultaneous(bounds),
        BoundWording.Assumption(bounds.Testing),
        BoundWording.NoEstimate,
        .. CampaignText.Deviations(standing.Overview),
        CampaignText.Caution,
    ];

    private static string DependenceWord(CampaignBounds bounds) => bounds.Testing.AnyDependence ? "any" : "simes";
}
