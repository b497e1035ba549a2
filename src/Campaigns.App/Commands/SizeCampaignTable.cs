using Campaigns.App.Output;
using Campaigns.Statistics.Planning;

namespace Campaigns.App.Commands;

/// <summary>What corrections bring over a whole campaign, as rows.</summary>
internal static class SizeCampaignTable
{
    public static RowTable Of(SizeCampaignQuestion question, IReadOnlyList<SizeCampaignAnswer> answers) => new(Columns(question, answers), answers.Select(a => Row(question, a)))
    {
        Above = [.. SizeCampaignText.Above(question, answers)],
        Below = [.. SizeCampaignText.Below(question, answers)],
    };

    /// <summary>People see of what was typed only what differs between rows.</summary>
    private static IReadOnlyList<Column> Columns(SizeCampaignQuestion question, IReadOnlyList<SizeCampaignAnswer> answers)
    {
        bool drawn = answers.Any(a => !a.Expected.IsExact);
        return
        [
            new("correction", "correction"), new("method", drawn ? "how" : null, GivesWay: 3),
            new("experiments", null, true),
            new("share_real", Varying("real", a => a.Campaign.ShareReal), true), new("real", null, true), new("real_model", null),
            new("groups", null, true),
            new("replicates", question.AsksReplicates ? "replicates" : Varying("replicates", a => a.Replicates ?? 0), true),
            new("observations", null, true), new("campaign_observations", question.AsksReplicates ? "in all" : null, true, 2),
            new("level", Varying("level", a => a.Level.Value), true), new("effect", Varying("effect f", a => a.Effect), true), new("noncentrality", null, true),
            new("largest_difference", answers[0].LargestDifference is null ? null : Varying("difference", a => a.LargestDifference ?? 0), true),
            new("wanted", Varying("wanted", a => a.Wanted ?? 0), true),
            new("survivors", "survivors", true), new("survivors_se", null, true),
            new("true_survivors", "true", true, 2), new("true_survivors_se", null, true),
            new("false_survivors", "false", true), new("false_survivors_se", null, true),
            new("share_found", "found", true), new("share_found_se", drawn ? "+-" : null, true, 1, NotWithout: "share_found"),
            new("any_true", "any true", true, 1), new("any_true_se", null, true),
            new("any_false", "any false", true, 1), new("any_false_se", null, true),
            new("false_share", "false share", true), new("false_share_se", null, true),
            new("large_campaign_true", answers.Any(a => a.LargeCampaignTrue is not null) ? "if vast" : null, true, 3), new("large_campaign_shortfall", null, true),
            new("draws", null, true), new("seed", null, true),
        ];

        string? Varying(string heading, Func<SizeCampaignAnswer, double> of) => answers.Select(of).Distinct().Count() > 1 ? heading : null;
    }

    private static Cell[] Row(SizeCampaignQuestion question, SizeCampaignAnswer a)
    {
        CampaignDesign campaign = a.Campaign;
        CampaignExpectation expected = a.Expected;
        CampaignErrors? errors = expected.Errors;
        string Probability(double p) => SizeCampaignText.Probability(p, errors?.Draws);
        return
        [
            Cell.Text(a.Correction.Key), Cell.Text(expected.IsExact ? "exact" : "simulated"),
            Cell.Whole(campaign.Experiments),
            Cell.Setting(campaign.ShareReal), Cell.Setting(campaign.ExpectedReal), Cell.Text(campaign.Real.Number is null ? "share" : "number"),
            Cell.Whole(campaign.Experiment.GroupCount),
            Cell.Whole(a.Replicates),
            Cell.Whole(campaign.Experiment.Observations), Cell.Whole(campaign.Experiment.Observations * campaign.Experiments),
            Cell.Setting(a.Level.Value), Cell.Number(a.Effect), Cell.Number(campaign.Noncentrality),
            Cell.Number(a.LargestDifference),
            a.Wanted is { } wanted ? Cell.Setting(wanted) : Cell.Empty,
            Cell.Number(expected.Survivors), Cell.Number(errors?.Survivors),
            Cell.Number(expected.TrueSurvivors), Cell.Number(errors?.TrueSurvivors),
            Cell.Number(expected.FalseSurvivors), Cell.Number(errors?.FalseSurvivors),
            Cell.Shown(expected.ShareFound, Probability), Cell.Number(errors?.ShareFound),
            Cell.Shown(expected.AnyTrue, Probability), Cell.Number(errors?.AnyTrue),
            Cell.Shown(expected.AnyFalse, Probability), Cell.Number(errors?.AnyFalse),
            Cell.Shown(expected.FalseShare, Probability), Cell.Number(errors?.FalseShare),
            Cell.Number(a.LargeCampaignTrue), Cell.Number(expected.TrueSurvivors - a.LargeCampaignTrue),
            Cell.Whole(errors?.Draws), errors is null ? Cell.Empty : Cell.Whole(question.Campaign.Seed),
        ];
    }
}
