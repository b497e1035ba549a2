using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

/// <summary>A campaign put together from p-values, judged as its plan says.</summary>
internal static class JudgedCampaign
{
    public static CampaignStanding Of(ErrorRate rate, string correction, params double?[] p)
    {
        Campaign campaign = new() { Code = "C", ErrorRate = rate, Level = new SignificanceLevel(0.05), Correction = correction, OpenedAt = DateTimeOffset.UnixEpoch };
        ExperimentResult[] experiments = [.. p.Select((value, i) => Experiment($"E{i + 1}", value, i + 1))];
        CampaignVerdict verdict = FamilyVerdict.Judge(campaign, FamilyMembers.Of(campaign, experiments));
        return new CampaignStanding(campaign, FamilyVerdict.Apply(experiments, verdict), experiments.Length, null, 0) { Families = verdict.Families };
    }

    public static ExperimentResult Experiment(string code, double? p, int position = 1) => new()
    {
        Plan = new PlannedExperiment { Code = code, Test = "f", FollowUp = "none" },
        Position = position,
        Status = p is null ? ExperimentStatus.Planned : ExperimentStatus.Tested,
        P = p is { } value ? PValue.FromValue(value) : null,
    };
}
