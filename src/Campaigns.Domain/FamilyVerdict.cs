using Campaigns.Statistics.Corrections;

namespace Campaigns.Domain;

/// <summary>What a campaign's correction makes of its families: the one way from p-values to survivors.</summary>
public static class FamilyVerdict
{
    /// <summary>The procedure by which a campaign is judged: its batch correction, or its online procedure.</summary>
    /// <exception cref="RefusedException">This version of the program does not have it.</exception>
    public static ErrorProcedure ProcedureOf(Campaign campaign) => OnlineVerdict.ProcedureOf(campaign) is { } online ? online : CorrectionOf(campaign);

    /// <summary>The procedure of one of its families: the family's own, or else the campaign's.</summary>
    /// <exception cref="RefusedException">This version of the program does not have it.</exception>
    public static ErrorProcedure ProcedureOf(Campaign campaign, Family family)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(family);
        return family.Correction is { } own ? CorrectionOf(campaign with { Correction = own }) : ProcedureOf(campaign);
    }

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
    /// <returns>The verdict: each family corrected at its level; in one that its gate keeps closed nothing survives and every adjusted p-value is 1. O(m log m).</returns>
    public static CampaignVerdict Judge(Campaign campaign, FamilyMembers members)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(members);
        return OnlineVerdict.ProcedureOf(campaign) is not null ? OnlineVerdict.Judge(campaign, members) : new FamilyJudgement(campaign, members).Verdict();
    }

    /// <summary>What a campaign would look like if every family of it had one correction: for comparison, since the sealed ones alone decide.</summary>
    /// <param name="campaign">Level, families.</param>
    /// <param name="experiments">Every experiment of the campaign.</param>
    /// <param name="correction">The correction in the place of the sealed ones.</param>
    public static CampaignVerdict JudgeBy(Campaign campaign, IReadOnlyList<ExperimentResult> experiments, Correction correction)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(correction);
        Campaign other = campaign with { Correction = correction.Key, Families = [.. campaign.Families.Select(f => f with { Correction = null })] };
        return Judge(other, FamilyMembers.Of(other, experiments));
    }

    /// <summary>The experiments with their adjusted p-values, their families and whether they survive.</summary>
    /// <param name="experiments">Experiments, those without a result included, in the order in which the verdict was given their p-values.</param>
    /// <param name="verdict">The verdict on those that have a p-value.</param>
    /// <returns>The same experiments in the same order.</returns>
    public static IReadOnlyList<ExperimentResult> Apply(IReadOnlyList<ExperimentResult> experiments, CampaignVerdict verdict)
    {
        ArgumentNullException.ThrowIfNull(experiments);
        ArgumentNullException.ThrowIfNull(verdict);
        if (verdict.Batch is { } batch)
        {
            return OnlineVerdict.Apply(experiments, verdict, batch);
        }

        Func<ExperimentResult, FamilyStanding> familyOf = FamiliesOf(verdict);
        var judged = new ExperimentResult[experiments.Count];
        int next = 0;
        for (int i = 0; i < judged.Length; i++)
        {
            ExperimentResult experiment = experiments[i];
            judged[i] = experiment.P is null
                ? experiment with { Family = familyOf(experiment) }
                : experiment with { AdjustedP = verdict.Adjusted[next], Survives = verdict.Survives[next], Family = verdict.FamilyAt(next++) };
        }

        return judged;
    }

    /// <summary>The same for experiments that were just read and that nobody else holds: a batch verdict is put into them instead of into copies.</summary>
    /// <param name="own">As in <see cref="Apply(IReadOnlyList{ExperimentResult}, CampaignVerdict)"/>.</param>
    /// <param name="verdict">The verdict on those that have a p-value.</param>
    /// <returns>The experiments, judged, in the same order.</returns>
    public static IReadOnlyList<ExperimentResult> ApplyToOwn(IReadOnlyList<ExperimentResult> own, CampaignVerdict verdict)
    {
        ArgumentNullException.ThrowIfNull(own);
        ArgumentNullException.ThrowIfNull(verdict);
        if (verdict.Batch is not null)
        {
            return Apply(own, verdict);
        }

        Func<ExperimentResult, FamilyStanding> familyOf = FamiliesOf(verdict);
        int next = 0;
        for (int i = 0; i < own.Count; i++)
        {
            if (own[i].P is null)
            {
                own[i].Judge(null, null, familyOf(own[i]));
            }
            else
            {
                own[i].Judge(verdict.Adjusted[next], verdict.Survives[next], verdict.FamilyAt(next));
                next++;
            }
        }

        return own;
    }

    /// <summary>The experiments of a campaign, judged: all of them are counted.</summary>
    /// <param name="campaign">Level, correction, families.</param>
    /// <param name="experiments">Every experiment of the campaign, those without a result included.</param>
    /// <returns>The same experiments in the same order. O(m log m).</returns>
    public static IReadOnlyList<ExperimentResult> Apply(Campaign campaign, IReadOnlyList<ExperimentResult> experiments) =>
        Apply(experiments, Judge(campaign, FamilyMembers.Of(campaign, experiments)));

    private static Func<ExperimentResult, FamilyStanding> FamiliesOf(CampaignVerdict verdict)
    {
        if (verdict.Families.Count == 1)
        {
            return _ => verdict.Families[0];
        }

        var byName = verdict.Families.ToDictionary(f => f.Name, StringComparer.Ordinal);
        return experiment => byName[experiment.Plan.Family ?? ""];
    }
}
