using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.CampaignPermutation;

namespace Campaigns.Catalog.Results;

/// <summary>Reads the tested experiments of a campaign and finds out which of them were measured on the same specimens.</summary>
/// <remarks>
/// Experiments stand in one set where all their units are named specimens, the same names in the same groups. An experiment with an unnamed unit is a set of its own.
/// Sets that share some specimens but not all depend on each other in a way that neither a common permutation nor separate ones keep: they are refused.
/// A set whose experiments are tested within blocks, or some of them, is permuted within those blocks: that is how its specimens were assigned.
/// </remarks>
/// <param name="catalog">The open catalog.</param>
public sealed class SpecimenFamilyReader(Catalog catalog)
{
    /// <summary>What is computed under every arrangement instead of the statistic of a test; null where it is not permuted.</summary>
    /// <param name="test">Key of the test.</param>
    public static PermutedStatistic? StatisticOf(string test) => test switch
    {
        "f" or "permutation" => PermutedStatistic.Values,
        "kruskal-wallis" => PermutedStatistic.Ranks,
        "block-f" => PermutedStatistic.WithinBlocks,
        _ => null,
    };

    /// <summary>The experiments with a result, at one moment.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="only">Experiments that are wanted; all of them if empty.</param>
    /// <param name="withOthers">Whether experiments whose test has no permuted statistic are wanted, too: they make their set one that is not permuted.</param>
    /// <exception cref="RefusedException">The campaign is not sealed; an experiment that was named is not there, has no result or another test; sets overlap; experiments on the same specimens name different blocks.</exception>
    public SpecimenFamily Read(string code, IReadOnlyList<string> only, bool withOthers) => catalog.Snapshot(() =>
    {
        CampaignStanding standing = new StandingReader(catalog).Read(code);
        if (!standing.Campaign.IsSealed)
        {
            throw new RefusedException($"The campaign '{code}' is not sealed: level, correction and family must be fixed before the first result is seen; run 'campaigns seal {code}'.");
        }

        ExperimentResult[] wanted = Wanted(standing, only, withOthers);
        ExperimentResult[] leftOut = [.. wanted.Where(e => !withOthers && StatisticOf(e.Plan.Test) is null)];
        List<Member>[] sets = Group(ReadUnits(code, [.. wanted.Except(leftOut)]));
        RefuseOverlap(sets);
        return new SpecimenFamily(standing, [.. sets.Select(Build)], leftOut);
    });

    private static ExperimentResult[] Wanted(CampaignStanding standing, IReadOnlyList<string> only, bool withOthers)
    {
        string code = standing.Campaign.Code;
        var byCode = standing.Experiments.ToDictionary(e => e.Plan.Code, StringComparer.Ordinal);
        foreach (string name in only)
        {
            if (!byCode.TryGetValue(name, out ExperimentResult? experiment))
            {
                string hint = Nearest.Of(name, byCode.Keys) is { } near ? $"'{near}' may be meant" : $"'campaigns results {code}' lists those it has";
                throw new RefusedException($"The campaign '{code}' has no experiment '{name}'; {hint}.");
            }

            if (experiment.P is null)
            {
                throw new RefusedException($"Experiment '{name}' has no result to adjust ({experiment.Status.Sentence()}); permuting before the planned test would be a look at data that may still grow.");
            }

            if (!withOthers && StatisticOf(experiment.Plan.Test) is null)
            {
                throw new RefusedException($"Experiment '{name}' is planned with the test {experiment.Plan.Test}, which allows for unequal variances; permuting takes all groups for exchangeable, which they then are not. Leave it out, or take 'exact-min-p', which uses its p as it is.");
            }
        }

        ExperimentResult[] wanted = [.. standing.Experiments.Where(e => e.P is not null && (only.Count == 0 || only.Contains(e.Plan.Code, StringComparer.Ordinal)))];
        return wanted.Length > 0 ? wanted : throw new RefusedException($"The campaign '{code}' has no result yet, so there is nothing to adjust; 'campaigns test {code}' tests what is complete.");
    }

    private List<Member> ReadUnits(string code, ExperimentResult[] experiments)
    {
        long campaignId = new CampaignStore(catalog).Get(code).Id;
        var byCode = experiments.ToDictionary(e => e.Plan.Code, StringComparer.Ordinal);
        using var rows = new ValueRows(catalog, campaignId, new StandingExclusions(catalog, campaignId), byCode.Keys);
        var members = new List<Member>();
        while (rows.Next())
        {
            members.Add(new Member(byCode[rows.Code], SpecimenUnits.Of(rows.Values, rows.Labels)));
        }

        return [.. members.OrderBy(m => m.Experiment.Position)];
    }

    /// <summary>Experiments with the same named units, sets in the order of their first experiments.</summary>
    private static List<Member>[] Group(List<Member> members)
    {
        var sets = new List<List<Member>>();
        var bySpecimens = new Dictionary<string, List<Member>>(StringComparer.Ordinal);
        foreach (Member member in members)
        {
            // Names hold no control characters, so these part them.
            string key = string.Join('\u0001', member.Units.Names.Select(n => $"{n.Group}\u0002{n.Name}"));
            if (key.Length > 0 && bySpecimens.TryGetValue(key, out List<Member>? set))
            {
                set.Add(member);
                continue;
            }

            set = [member];
            sets.Add(set);
            if (key.Length > 0)
            {
                bySpecimens.Add(key, set);
            }
        }

        return [.. sets];
    }

    private static void RefuseOverlap(List<Member>[] sets)
    {
        var owner = new Dictionary<(string Group, string Name), Member>();
        foreach (Member first in sets.Select(set => set[0]))
        {
            foreach ((string Group, string Name) specimen in first.Units.Names)
            {
                if (!owner.TryAdd(specimen, first))
                {
                    throw new RefusedException($"Experiments '{owner[specimen].Experiment.Plan.Code}' and '{first.Experiment.Plan.Code}' share specimen '{specimen.Name}' of group '{specimen.Group}', but not all their specimens, so that they can be permuted neither together nor apart. Name the experiments to permute, leave out what the others lack ('campaigns exclude'), or give different specimens different names.");
                }
            }
        }
    }

    private static ExperimentsOnSpecimens Build(List<Member> members)
    {
        ExperimentResult[] experiments = [.. members.Select(m => m.Experiment)];
        if (experiments.Any(e => StatisticOf(e.Plan.Test) is null))
        {
            return new ExperimentsOnSpecimens(experiments, null);
        }

        var set = new SpecimenSet(members[0].Units.Groups, Blocks(members));
        foreach (Member member in members)
        {
            member.Units.AddTo(set, StatisticOf(member.Experiment.Plan.Test)!.Value);
        }

        return new ExperimentsOnSpecimens(experiments, set);
    }

    /// <summary>Blocks of the units by number, where an experiment of the set is tested within them; else none.</summary>
    private static int[] Blocks(List<Member> members)
    {
        Member[] blocked = [.. members.Where(m => StatisticOf(m.Experiment.Plan.Test) == PermutedStatistic.WithinBlocks)];
        if (blocked.Length == 0)
        {
            return [];
        }

        string?[] names = blocked[0].Units.Blocks;
        if (blocked.FirstOrDefault(m => !m.Units.Blocks.AsSpan().SequenceEqual(names)) is { } other)
        {
            throw new RefusedException($"Experiments '{blocked[0].Experiment.Plan.Code}' and '{other.Experiment.Plan.Code}' name the same specimens in different blocks, so that they cannot be permuted together; name one of them.");
        }

        string?[] inOrder = [.. names.Distinct().Order(StringComparer.Ordinal)];
        return [.. names.Select(n => Array.IndexOf(inOrder, n))];
    }

    private sealed record Member(ExperimentResult Experiment, SpecimenUnits Units);
}
