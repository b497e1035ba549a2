using Campaigns.App.Commands;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Report.Sections;

/// <summary>What was planned, and every deviation from it.</summary>
internal sealed class PlanSection : ReportSection
{
    public override string Anchor => "plan";

    public override string Title => "Plan and deviations";

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        Campaign campaign = data.Standing.Campaign;
        if (campaign.Purpose.Length > 0)
        {
            yield return new Paragraph(campaign.Purpose);
        }

        yield return new FactList(
        [
            new("Goal", Cell.Text(CampaignText.Goal(campaign))),
            new("Level", Cell.Setting(campaign.Level.Value)),
            new("Correction", Cell.Text(FamilyText.Procedures(campaign))),
            new("Usual test", Cell.Text(campaign.DefaultTest)),
            new("Usual follow-up", Cell.Text(campaign.DefaultFollowUp)),
            new("Experiments planned", Cell.Whole(data.Plan.Experiments.Count)),
            new("Opened", Cell.Text(Words.Instant(campaign.OpenedAt))),
            new("Sealed", Cell.Text(campaign.SealedAt is { } at ? Words.Instant(at) : "not sealed")),
            new("Amendments of the sealed plan", Cell.Whole(data.Plan.Amendments.Count)),
        ]);
        if (campaign.IsExploratory)
        {
            yield return new Caution(CampaignText.Exploratory);
        }
        else if (campaign.IsSealed)
        {
            yield return new Paragraph($"The plan as it was sealed: {PlanHistory.DigestSentence(campaign, data.Plan.DigestOfSealed)}", Tone.Note);
        }

        yield return Plan(data, campaign);
        foreach (Block block in Deviations(data))
        {
            yield return block;
        }
    }

    private static TableBlock Plan(ReportData data, Campaign campaign) =>
        TableBlock.Of(data.Plan.Amendments.Count > 0 ? "The plan as it stands, amendments included" : "The plan", PlanHistory.Plan(data.Plan.Experiments)).WithoutEmptyColumns() with
        {
            Links = Anchors.InFull(data),
            Below = data.Plan.Experiments.Count > TableBlock.MostRows ? [ResultsSection.Cut(data.Plan.Experiments.Count, "first in the plan")]
                : campaign.IsExploratory || data.Plan.Experiments.Count == 0 ? []
                : ["Empty: the plan says nothing of it. Replicates are values in each group, or specimens where these are recorded."],
        };

    private static IEnumerable<Block> Deviations(ReportData data)
    {
        yield return new Heading(1, "deviations", "Deviations");
        string[] sentences = [.. CampaignText.Deviations(data.Overview)];
        yield return sentences.Length > 0 ? new BulletList(sentences) : new Paragraph("Nothing deviates from the plan.");
        if (data.Plan.Amendments.Count > 0)
        {
            RowTable amendments = PlanHistory.Amendments(data.Plan.Amendments);
            yield return TableBlock.Of("Amendments of the sealed plan", amendments with { Above = [.. amendments.Above.Skip(1)] });
        }

        if (data.Plan.Withdrawals.Count > 0)
        {
            yield return TableBlock.Of("Experiments withdrawn, and taken in again", WithdrawVerb.Rows(data.Plan.Withdrawals));
        }

        if (data.Plan.Exclusions.Count > 0)
        {
            yield return TableBlock.Of("Observations left out, and taken in again", Exclusions(data.Plan.Exclusions)) with { Links = Anchors.InFull(data) };
        }

        ExperimentResult[] deviating = [.. data.Standing.Experiments.Where(e => e.Amendments.Count > 0)];
        if (deviating.Length > 0)
        {
            yield return TableBlock.Of("Deviations by experiment", ByExperiment(deviating)) with { Links = Anchors.InFull(data) };
        }
    }

    private static RowTable ByExperiment(IEnumerable<ExperimentResult> deviating) => new(
        [new("experiment", "experiment"), new("deviation", "deviation")],
        deviating.SelectMany(e => e.Amendments.Select(a => (Cell[])[Cell.Text(e.Plan.Code), Cell.Text(a)])));

    private static RowTable Exclusions(IReadOnlyList<ExcludedObservation> decisions) => new(
        [
            new("experiment", "experiment"), new("file", "file"), new("line", "line", true), new("group", "group"), new("value", "value", true), new("excluded", "excluded"), new("reason", "reason"), new("by", "by"), new("at", "at"),
        ],
        decisions.Select(x => (Cell[])
        [
            Cell.Text(x.Experiment), Cell.Text(x.File), Cell.Whole(x.Line), Cell.Text(x.Group), Cell.Text(x.Value), Cell.Truth(x.IsExcluded), Cell.Text(x.Reason), Cell.Text(x.NamedBy), Cell.Text(Words.Instant(x.At)),
        ]));
}
