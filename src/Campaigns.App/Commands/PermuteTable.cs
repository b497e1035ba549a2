using Campaigns.App.Output;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.CampaignPermutation;

namespace Campaigns.App.Commands;

/// <summary>What permuting a campaign gave, as rows and the sentences that belong to them.</summary>
internal sealed class PermuteTable(SpecimenFamily family, string method, ExperimentResult[] experiments, StepDownResult[] results)
{
    public const string MaxT = "max-t";
    public const string MinP = "min-p";
    public const string ExactMinP = "exact-min-p";

    private const int MostNamed = 8;

    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("experiment", "experiment"), new("p", "p", true), new("adjusted_p", "adjusted p", true), new("survives_here", "survives here"),
        new("arrangements", "arrangements", true, 2), new("as_extreme", "as extreme", true, 2), new("seed", null), new("method", null),
        new("set", "set", true, 1), new("specimens", null, true), new("test", "test", GivesWay: 3), new("test_p", "planned p", true, 1), new("sealed_adjusted_p", "sealed adj. p", true), new("survives", "survives"), new("amendments", null),
    ];

    private CampaignStanding Standing => family.Standing;

    private bool IsDrawn => results.Any(r => r.Resampling is { IsExact: false });

    public RowTable Rows()
    {
        Campaign campaign = Standing.Campaign;
        var byCode = experiments.Zip(results).ToDictionary(pair => pair.First.Plan.Code, pair => pair.Second, StringComparer.Ordinal);
        return new RowTable(Columns, experiments.OrderBy(e => e.Position).Select(e => Row(e, byCode[e.Plan.Code])))
        {
            Above = [FormattableString.Invariant($"{campaign.Code}: {Name()}, familywise at {campaign.Level}, {results.Length} of a family of {Standing.FamilySize}")],
            Below =
            [
                Arrangements(), Sets(), .. Rest(),
                FormattableString.Invariant($"Holds the familywise error rate at {campaign.Level}, whichever hypotheses are true, if groups are exchangeable wherever their hypothesis holds, whatever the others do, and different sets were assigned independently. A difference in spread alone may also give a small p."),
                "Source: P. H. Westfall and S. S. Young, Resampling-Based Multiple Testing, 1993.",
                $"Survives here is no decision: the sealed correction ({FamilyVerdict.ProcedureOf(campaign).Name}) alone decides, as the last columns show; choosing after seeing this table would undo what a correction is for.",
                .. CampaignText.Deviations(Standing.Overview), CampaignText.ReviewLine(Standing.Overview),
            ],
        };
    }

    private Cell[] Row(ExperimentResult experiment, StepDownResult result)
    {
        int number = 0;
        while (!family.Sets[number].Experiments.Contains(experiment))
        {
            number++;
        }

        return
        [
            Cell.Text(experiment.Plan.Code), Cell.P(result.P), Cell.P(result.AdjustedP), Cell.Truth(Standing.Campaign.Level.Rejects(result.AdjustedP)),
            Cell.Whole(result.Resampling?.Arrangements), Cell.Whole(result.Resampling?.AsExtreme), Cell.Text(result.Resampling?.Seed is { } seed ? FormattableString.Invariant($"{seed}") : null), Cell.Text(method),
            Cell.Whole(number + 1), Cell.Whole(family.Sets[number].Set?.Count ?? experiment.SpecimenCount ?? experiment.ObservationCount), Cell.Text(experiment.Plan.Test), Cell.P(experiment.P), Cell.P(experiment.AdjustedP), Cell.Truth(experiment.Survives), Cell.Text(string.Join("; ", experiment.Amendments)),
        ];
    }

    private string Name() => method switch
    {
        MaxT => "step-down maxT by permutation",
        MinP => "step-down minP by permutation",
        _ => "exact step-down minP by permutation",
    };

    private string Arrangements()
    {
        string evidence = method == MaxT ? "the largest share of variation between groups" : "the smallest p";
        string what = $"Adjusted p: in which share of arrangements {evidence}, among the experiment and those with weaker evidence, is at least as extreme. Ties count.";
        if (IsDrawn)
        {
            StepDownResult drawn = results.First(r => r.Resampling is not null);
            return FormattableString.Invariant($"{what} {drawn.Resampling!.Arrangements} random arrangements from seed {drawn.Resampling.Seed}, the observed one counted among them: p = (as extreme + 1)/(arrangements + 1).");
        }

        return results.Any(r => r.Resampling is null)
            ? $"{what} All arrangements were looked at, except for {Names([.. experiments.Where((_, i) => results[i].Resampling is null)])}: too many, or a test whose statistic is not permuted; there stands the p of the planned test, under that test's assumptions, taken for one that can reach every value."
            : $"{what} All arrangements were looked at, so p is exact.";
    }

    private string Sets()
    {
        ExperimentsOnSpecimens[] joint = [.. family.Sets.Where(s => s.Experiments.Count > 1)];
        int alone = family.Sets.Count - joint.Length;
        string together = joint.Length == 0
            ? "No two experiments name the same specimens in the same groups, so each is permuted by itself"
            : $"Measured on the same specimens, so permuted together: {string.Join("; ", joint.Select(s => Names(s.Experiments)))}{(alone > 0 ? FormattableString.Invariant($"; {alone} by itself each") : "")}";
        ExperimentsOnSpecimens[] blocked = [.. family.Sets.Where(s => s.Set is { HasBlocks: true })];
        return blocked.Length == 0 ? together + "." : $"{together}. Specimens change places within their block in {Names([.. blocked.SelectMany(s => s.Experiments)])}.";
    }

    /// <summary>The experiments of the family that are not adjusted here.</summary>
    private IEnumerable<string> Rest()
    {
        int others = Standing.FamilySize - results.Length;
        if (others == 0)
        {
            yield break;
        }

        string tests = family.LeftOut.Count > 0 ? $" ({Names(family.LeftOut)}: tests that allow for unequal variances are not permuted, because groups are then not exchangeable)" : "";
        yield return FormattableString.Invariant($"The other {others} of the family, without a result, not named or not permuted{tests}, still count: wherever an experiment is adjusted, each of them is granted its p, whatever the dependence.");
    }

    private static string Names(IReadOnlyList<ExperimentResult> named) => named.Count <= MostNamed
        ? string.Join(", ", named.Select(e => e.Plan.Code))
        : FormattableString.Invariant($"{string.Join(", ", named.Take(MostNamed).Select(e => e.Plan.Code))} and {named.Count - MostNamed} more");
}
