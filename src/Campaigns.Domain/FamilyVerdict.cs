using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What a campaign's correction makes of its families: the one way from p-values to survivors.</summary>
public static class FamilyVerdict
{
    /// <summary>The procedure by which a campaign is judged: its batch correction, or its online procedure.</summary>
    /// <exception cref="RefusedException">This version of the program does not have it.</exception>
    public static ErrorProcedure ProcedureOf(Campaign campaign) => CorrectionOf(campaign);

    /// <summary>The batch correction that a campaign names.</summary>
    /// <exception cref="RefusedException">This version of the program does not have it.</exception>
    public static Correction CorrectionOf(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return CorrectionRegistry.Find(campaign.Correction)
            ?? throw new RefusedException($"The campaign '{campaign.Code}' names the correction '{campaign.Correction}', which this version of the program does not have.");
    }

    /// <summary>Adjusted p-values and survivors of a campaign.</summary>
    /// <param name="campaign">Level, correction, families.</param>
    /// <param name="members">Its hypotheses.</param>
    /// <returns>The verdict. O(m log m).</returns>
    public static CampaignVerdict Judge(Campaign campaign, FamilyMembers members)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(members);
        FamilyCount count = members.Families[0];
        PValue[] adjusted = CorrectionOf(campaign).Adjust(RankedFamily.Of(members.P.Span, count.Size));
        bool[] survives = [.. adjusted.Select(p => campaign.Level.Rejects(p))];
        return new CampaignVerdict(
            adjusted,
            survives,
            [new FamilyStanding("", campaign.Correction, campaign.Level, count.Size, count.Planned, adjusted.Length, survives.Count(s => s))]);
    }

    /// <summary>The experiments with their adjusted p-values, their families and whether they survive.</summary>
    /// <param name="experiments">Experiments, those without a result included, in the order in which the verdict was given their p-values.</param>
    /// <param name="verdict">The verdict on those that have a p-value.</param>
    /// <returns>The same experiments in the same order.</returns>
    public static IReadOnlyList<ExperimentResult> Apply(IReadOnlyList<ExperimentResult> experiments, CampaignVerdict verdict)
    {
        ArgumentNullException.ThrowIfNull(experiments);
        ArgumentNullException.ThrowIfNull(verdict);
        var judged = new ExperimentResult[experiments.Count];
        int next = 0;
        for (int i = 0; i < judged.Length; i++)
        {
            ExperimentResult experiment = experiments[i];
            judged[i] = experiment.P is null
                ? experiment with { Family = FamilyOf(experiment, verdict) }
                : experiment with { AdjustedP = verdict.Adjusted[next], Survives = verdict.Survives[next], Family = verdict.FamilyAt(next++) };
        }

        return judged;
    }

    /// <summary>The experiments of a campaign, judged: all of them are counted.</summary>
    /// <param name="campaign">Level, correction, families.</param>
    /// <param name="experiments">Every experiment of the campaign, those without a result included.</param>
    /// <returns>The same experiments in the same order. O(m log m).</returns>
    public static IReadOnlyList<ExperimentResult> Apply(Campaign campaign, IReadOnlyList<ExperimentResult> experiments) =>
        Apply(experiments, Judge(campaign, FamilyMembers.Of(campaign, experiments)));

    private static FamilyStanding FamilyOf(ExperimentResult experiment, CampaignVerdict verdict) =>
        verdict.Families.FirstOrDefault(f => f.Name == (experiment.Plan.Family ?? "")) ?? verdict.Families[0];
}
