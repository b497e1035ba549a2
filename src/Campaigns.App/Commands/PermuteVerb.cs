using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>permute: p-values adjusted by permuting the whole campaign.</summary>
internal sealed class PermuteVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string[]> _experiments = new("EXPERIMENT") { Description = "Experiments to permute; without any, all that have a result and a test whose statistic can be permuted.", Arity = ArgumentArity.ZeroOrMore };
    private readonly Option<string?> _method = TypedOptions.Word("--method", "max-t (the default): the largest share of variation; min-p: the smallest p; exact-min-p: the smallest p, without a random draw.", "max-t|min-p|exact-min-p", PermuteTable.MaxT, PermuteTable.MinP, PermuteTable.ExactMinP);
    private readonly Option<int?> _draws = TypedOptions.WholeOrNone("--draws", 1, "Random arrangements, where not all can be looked at (else as many as the plan's level and family ask for).");
    private readonly Option<int?> _seed = TypedOptions.WholeOrNone("--seed", 0, "Seed of the draws (else made of the campaign's name).");
    private readonly Option<int?> _threads = TypedOptions.WholeOrNone("--threads", 1, "Most threads to work; changes nothing in the result (else as many as there are cores).");

    public override Command Build() => new("permute", Describe("p-values adjusted by permuting specimens over the whole campaign (Westfall and Young), which uses how the responses depend on each other; beside the sealed correction, which alone decides.",
        "permute PRIMERS --method min-p --draws 99999"))
    {
        _code, _experiments, _method, _draws, _seed, _threads,
    };

    public override int Run(Session session)
    {
        string method = session.Get(_method) ?? PermuteTable.MaxT;
        RefuseIdleOptions(session, method);
        using Catalog.Catalog catalog = session.OpenCatalog();
        SpecimenFamily family = new SpecimenFamilyReader(catalog).Read(session.Get(_code), session.Get(_experiments), withOthers: method == PermuteTable.ExactMinP);
        RandomDraws draws = Draws(session, family.Standing) with { Stop = session.Host.Cancel };
        using var line = new ProgressLine(session.Host);
        var run = new PermutationRun(draws)
        {
            Threads = session.Get(_threads) ?? Environment.ProcessorCount,
            Progress = (done, total) => line.Report(new WorkProgress("permuting", done, total, "shares")),
        };
        PermuteTable table = Adjust(family, method, run);
        line.Dispose();
        session.Print(table.Rows());
        return ExitCode.Done;
    }

    private static PermuteTable Adjust(SpecimenFamily family, string method, PermutationRun run)
    {
        if (method == PermuteTable.ExactMinP)
        {
            ExperimentsOnSpecimens[] exact = [.. family.Sets.Where(s => s.Set is { IsEnumerable: true })];
            ExperimentsOnSpecimens[] given = [.. family.Sets.Except(exact)];
            ExperimentResult[] adjusted = [.. exact.Concat(given).SelectMany(s => s.Experiments)];
            run = run with { Others = family.Standing.FamilySize - adjusted.Length };
            PValue[][] p = [.. given.Select(s => s.Experiments.Select(e => e.P!.Value).ToArray())];
            return new PermuteTable(family, method, adjusted, StepDownPermutation.ExactMinP([.. exact.Select(s => s.Set!)], p, run));
        }

        if (family.Sets.Count == 0)
        {
            throw new RefusedException($"No result of the campaign '{family.Standing.Campaign.Code}' comes from a test whose statistic is permuted (f, permutation, kruskal-wallis, block-f).");
        }

        ExperimentResult[] experiments = [.. family.Sets.SelectMany(s => s.Experiments)];
        run = run with { Others = family.Standing.FamilySize - experiments.Length };
        SpecimenSet[] sets = [.. family.Sets.Select(s => s.Set!)];
        if (method == PermuteTable.MaxT)
        {
            RefuseDifferentDegrees(family);
        }

        return new PermuteTable(family, method, experiments, method == PermuteTable.MaxT ? StepDownPermutation.MaxT(sets, run) : StepDownPermutation.MinP(sets, run));
    }

    private void RefuseIdleOptions(Session session, string method)
    {
        if (method == PermuteTable.ExactMinP && (session.Get(_draws) ?? session.Get(_seed)) is not null)
        {
            throw new UsageException("exact-min-p draws nothing at random, so --draws and --seed mean nothing to it; leave them out.");
        }

        if (session.Get(_draws) > PermutationRun.MostDraws)
        {
            throw new UsageException(FormattableString.Invariant($"--draws takes a whole number from 1 to {PermutationRun.MostDraws}, not {session.Get(_draws)}."));
        }
    }

    private RandomDraws Draws(Session session, CampaignStanding standing) => new(
        session.Get(_seed) is { } seed ? (ulong)seed : PermutationDraws.Seed(standing.Campaign.Code),
        session.Get(_draws) ?? PermutationDraws.Count(standing.Campaign.Level, standing.FamilySize));

    /// <summary>Shares of variation mean the same in two experiments only where their degrees of freedom do not differ.</summary>
    private static void RefuseDifferentDegrees(SpecimenFamily family)
    {
        ((double, double) Degrees, string Code)[] all = [.. family.Sets.SelectMany(s => s.Experiments.Select(e => (Degrees(e, s.Set!), e.Plan.Code)))];
        foreach (((double Df1, double Df2) degrees, string code) in all)
        {
            if (degrees != all[0].Degrees)
            {
                ((double df1, double df2), string first) = all[0];
                throw new RefusedException(FormattableString.Invariant($"max-t compares shares of variation, which mean the same only where degrees of freedom are the same, and those of '{first}' are {df1} and {df2}, those of '{code}' {degrees.Df1} and {degrees.Df2}; take --method min-p, or name experiments that are alike."));
            }
        }
    }

    private static (double Df1, double Df2) Degrees(ExperimentResult experiment, SpecimenSet set) =>
        experiment is { Plan.Test: "block-f", Df1: { } df1, Df2: { } df2 } ? (df1, df2) : (experiment.GroupCount - 1, set.Count - experiment.GroupCount);
}
