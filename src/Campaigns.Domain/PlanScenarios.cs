using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>How near the survivors of a campaign are to being others: what another level, another family or another correction would have made of it. The sealed plan alone decides.</summary>
public static class PlanScenarios
{
    /// <summary>The levels that are looked at where none is named.</summary>
    public static IReadOnlyList<double> UsualLevels { get; } = [0.01, 0.05, 0.10];

    /// <summary>The sealed plan first, then other levels, the tested experiments alone as the family, and every other correction.</summary>
    /// <param name="standing">The campaign as it stands. Where a procedure that decides as experiments arrive is sealed, other corrections alone are looked at: another level would have spent its error otherwise from the first experiment on.</param>
    /// <param name="levels">Levels to look at; the sealed one is left out.</param>
    /// <remarks>O(m log m) for each.</remarks>
    public static IReadOnlyList<PlanScenario> Of(CampaignStanding standing, IReadOnlyList<SignificanceLevel> levels)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ArgumentNullException.ThrowIfNull(levels);
        Campaign campaign = standing.Campaign;
        ExperimentResult[] tested = [.. standing.Experiments.Where(e => e.P is not null)];
        bool[] asSealed = [.. tested.Select(e => e.Survives == true)];
        List<PlanScenario> scenarios = [Beside("sealed", "", asSealed)];
        if (CorrectionRegistry.Find(campaign.Correction) is not null)
        {
            FamilyMembers planned = FamilyMembers.Of(campaign, standing.Experiments);
            scenarios.AddRange(levels.Where(l => l != campaign.Level).Select(l => Beside("level", l.ToString(), FamilyVerdict.Judge(At(campaign, l), planned).Survives)));
            string changed = FormattableString.Invariant($"the {tested.Length} tested alone instead of {standing.FamilySize} planned");
            scenarios.Add(Beside("family", changed, FamilyVerdict.Judge(campaign, TestedAlone(planned)).Survives));
        }

        scenarios.AddRange(CorrectionsBeside.Of(standing).Where(o => !o.IsSealed).Select(o => Beside("correction", o.Procedure.Key, o.Survives)));
        return scenarios;

        PlanScenario Beside(string kind, string changed, IReadOnlyList<bool> survives) => new(
            kind, changed, survives.Count(s => s),
            [.. tested.Where((_, i) => survives[i] && !asSealed[i]).Select(e => e.Plan.Code)],
            [.. tested.Where((_, i) => !survives[i] && asSealed[i]).Select(e => e.Plan.Code)]);
    }

    /// <summary>The campaign at another level; families that have a level of their own keep their shares of it.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="level">The level in the place of the sealed one.</param>
    public static Campaign At(Campaign campaign, SignificanceLevel level) => (campaign ?? throw new ArgumentNullException(nameof(campaign))) with
    {
        Level = level,
        Families = [.. campaign.Families.Select(f => f.Level is { } own ? f with { Level = new SignificanceLevel(Math.Min(own.Value * (level.Value / campaign.Level.Value), Math.BitDecrement(1.0))) } : f)],
    };

    private static FamilyMembers TestedAlone(FamilyMembers members)
    {
        var tested = new int[members.Families.Count];
        for (int i = 0; i < members.P.Length; i++)
        {
            tested[members.FamilyOf.IsEmpty ? 0 : members.FamilyOf.Span[i]]++;
        }

        return members with { Families = [.. members.Families.Select((f, i) => f with { Size = tested[i], WeightOfRest = 0 })] };
    }
}
