using Campaigns.Statistics.Corrections;

namespace Campaigns.Domain;

/// <summary>What a plan says of its families: whether it may be sealed so, and what is worth a word before.</summary>
public static class FamilyPlan
{
    private const int MostTold = 20;

    /// <summary>The families that experiments name, in the order of the plan; empty where none names one.</summary>
    public static IReadOnlyList<Family> NamedIn(IEnumerable<PlannedExperiment> plan) =>
        [.. plan.Select(e => e.Family).OfType<string>().Distinct(StringComparer.Ordinal).Select(name => new Family(name))];

    /// <summary>Whether families and plan fit each other and the campaign, so that the plan may be sealed.</summary>
    /// <param name="campaign">Error rate, level, correction.</param>
    /// <param name="families">Its families; empty for one family.</param>
    /// <param name="plan">Its experiments.</param>
    /// <exception cref="RefusedException">They do not; every reason is a sentence of the details, or the message where there is one.</exception>
    public static void Check(Campaign campaign, IReadOnlyList<Family> families, IReadOnlyList<PlannedExperiment> plan)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(families);
        ArgumentNullException.ThrowIfNull(plan);
        string[] problems = [.. families.Count == 0 ? [] : Rules(campaign, families).Concat(Members(families, plan)), .. WithoutWeight(campaign, families, plan)];
        if (problems.Length > 0)
        {
            throw new RefusedException($"{(families.Count == 0 ? "The weights" : "The families")} of '{campaign.Code}' were refused; nothing was changed.", problems.Length <= MostTold ? problems : [.. problems.Take(MostTold), FormattableString.Invariant($"... and {problems.Length - MostTold} more")]);
        }

        FamilyLevels.Of(campaign, families);
    }

    /// <summary>What should be known before the seal, in sentences: weights that are missing or idle, corrections that do not hold the campaign's error rate, shared controls, families too small for their correction.</summary>
    /// <param name="campaign">The campaign with its families.</param>
    /// <param name="plan">Its experiments.</param>
    public static IEnumerable<string> Notes(Campaign campaign, IReadOnlyList<PlannedExperiment> plan)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(plan);
        IReadOnlyList<Family> families = campaign.Families.Count == 0 ? [new Family("")] : campaign.Families;
        ILookup<string, PlannedExperiment> members = plan.ToLookup(e => campaign.Families.Count == 0 ? "" : e.Family ?? "", StringComparer.Ordinal);
        foreach (Family family in families)
        {
            string of = family.Name.Length > 0 ? $" of the family '{family.Name}'" : "";
            ErrorProcedure procedure = FamilyVerdict.ProcedureOf(campaign, family);
            bool takesWeights = procedure is Correction { NeedsWeights: true };
            bool hasWeights = members[family.Name].Any(e => e.Weight is not null);
            if (takesWeights != hasWeights)
            {
                yield return takesWeights
                    ? $"Note: {procedure.Name} takes weights, and the plan gives none{of}: every experiment weighs 1."
                    : $"Note: the plan's weights{of} are not used: {procedure.Name} takes none.";
            }

            if (family.Correction is not null && !Holds(procedure, campaign.ErrorRate))
            {
                yield return $"Note: {procedure.Name}, by which the family '{family.Name}' is corrected, does not hold the error rate that '{campaign.Code}' names as its goal. {procedure.Guarantee}";
            }

            if (SharedControls.Warning(procedure, family.Name, SharedControls.Count(members[family.Name].Select(e => e.SharedControl))) is { } warning)
            {
                yield return warning;
            }

            if (FewExperiments.Warning(procedure, family.Name, members[family.Name].Count()) is { } few && plan.Count > 0)
            {
                yield return few;
            }
        }
    }

    /// <summary>Whether a procedure holds an error rate; the familywise one holds the false discovery rate, too.</summary>
    public static bool Holds(ErrorProcedure procedure, ErrorRate rate)
    {
        ArgumentNullException.ThrowIfNull(procedure);
        return procedure.Controls == rate || (procedure.Controls == ErrorRate.Familywise && rate == ErrorRate.FalseDiscovery);
    }

    /// <summary>What differs between two lists of families, in sentences; their order makes no difference.</summary>
    /// <param name="families">Those that stand.</param>
    /// <param name="other">Those held against them.</param>
    public static IReadOnlyList<string> Differences(IReadOnlyList<Family> families, IReadOnlyList<Family> other)
    {
        var others = other.ToDictionary(f => f.Name, StringComparer.Ordinal);
        var told = new List<string>();
        foreach (Family family in families)
        {
            if (!others.Remove(family.Name, out Family? found))
            {
                told.Add($"family {family.Name}: is in the sealed plan, and missing in the other");
            }
            else if (family != found)
            {
                told.Add($"family {family.Name}: {Words(family)} against {Words(found)}");
            }
        }

        return [.. told, .. others.Keys.Order(StringComparer.Ordinal).Select(name => $"family {name}: is not in the sealed plan")];
    }

    private static string Words(Family family) =>
        $"correction '{family.Correction}', level '{family.Level}'" + (family.OpensAfter is { } other ? $", opens after '{other}' when {(family.Gate == FamilyGate.AllSurvive ? "all" : "any")}" : "");

    private static IEnumerable<string> Rules(Campaign campaign, IReadOnlyList<Family> families)
    {
        if (campaign.IsExploratory)
        {
            yield return "The experiments come from the data, so that no family was fixed before them: an exploratory campaign is one family.";
        }

        if (CorrectionRegistry.Find(campaign.Correction) is null)
        {
            yield return $"The procedure '{campaign.Correction}' decides as experiments arrive, in one stream: leave families out, or name a batch correction.";
        }

        var byName = families.ToDictionary(f => f.Name, StringComparer.Ordinal);
        foreach (Family family in families)
        {
            if (family.Correction is { } key && CorrectionRegistry.Find(key) is null)
            {
                yield return $"The family '{family.Name}' names the correction '{key}', which is none of the batch corrections: {string.Join(", ", CorrectionRegistry.All.Select(c => c.Key))}.";
            }

            if (family.OpensAfter is { } other && !byName.ContainsKey(other))
            {
                yield return $"The family '{family.Name}' opens after '{other}', which is none of the families.";
            }
            else if (WaitsOnItself(family, byName))
            {
                yield return $"The family '{family.Name}' waits on itself{(family.OpensAfter == family.Name ? "" : " over others")}: let one of them be open from the start.";
            }
        }
    }

    /// <summary>Whether the families on which one waits lead back to it.</summary>
    public static bool WaitsOnItself(Family family, IReadOnlyDictionary<string, Family> byName)
    {
        Family? on = family;
        for (int steps = 0; steps <= byName.Count && on?.OpensAfter is { } next; steps++)
        {
            if (next == family.Name)
            {
                return true;
            }

            on = byName.GetValueOrDefault(next);
        }

        return false;
    }

    private static IEnumerable<string> Members(IReadOnlyList<Family> families, IReadOnlyList<PlannedExperiment> plan)
    {
        string[] names = [.. families.Select(f => f.Name)];
        var known = new HashSet<string>(names, StringComparer.Ordinal);
        var used = new HashSet<string>(StringComparer.Ordinal);
        foreach (PlannedExperiment experiment in plan)
        {
            if (experiment.Family is not { } name)
            {
                yield return $"The experiment '{experiment.Code}' names no family, while the campaign has some ({string.Join(", ", names)}): name one in the plan's column family.";
            }
            else if (known.Contains(name))
            {
                used.Add(name);
            }
            else
            {
                yield return $"The experiment '{experiment.Code}' names the family '{name}', which is none of the campaign's{(Nearest.Of(name, names) is { } near ? $" (did you mean '{near}'?)" : "")}: {string.Join(", ", names)}.";
            }
        }

        foreach (string idle in names.Where(n => !used.Contains(n)))
        {
            yield return $"The family '{idle}' has no experiment in the plan: leave it out, or name it in the plan's column family.";
        }
    }

    private static IEnumerable<string> WithoutWeight(Campaign campaign, IReadOnlyList<Family> families, IReadOnlyList<PlannedExperiment> plan)
    {
        foreach (Family family in families.Count == 0 ? [new Family("")] : families)
        {
            if (CorrectionRegistry.Find(family.Correction ?? campaign.Correction) is { NeedsWeights: true } correction)
            {
                PlannedExperiment[] members = [.. plan.Where(e => families.Count == 0 || e.Family == family.Name)];
                if (members.Length > 0 && members.All(e => e.Weight == 0))
                {
                    yield return $"All weights{(family.Name.Length > 0 ? $" of the family '{family.Name}'" : "")} are 0, so that nothing could survive {correction.Name}: give at least one experiment a weight above 0.";
                }
            }
        }
    }
}
