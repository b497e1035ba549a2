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
            new("Correction", Cell.Text(Correction(campaign))),
            new("Usual test", Cell.Text(KeyWording.Test(campaign.DefaultTest))),
            new("Usual follow-up", Cell.Text(KeyWording.FollowUp(campaign.DefaultFollowUp))),
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

    private static string Correction(Campaign campaign) => campaign.JudgedFamilies.Count == 0
        ? KeyWording.Named(FamilyText.Procedures(campaign), FamilyVerdict.ProcedureOf(campaign).Key)
        : FamilyText.Procedures(campaign);

    /// <summary>People read the names of procedures; the key stands behind for who types it.</summary>
    private static RowTable Named(RowTable plan) => plan with
    {
        Rows = plan.Rows.Select(row => (Cell[])[.. row.Select((cell, c) => cell.Kind != CellKind.Text ? cell : plan.Columns[c].Name switch
        {
            "test" => Cell.Text(KeyWording.Test(cell.AsText)),
            "follow_up" => Cell.Text(KeyWording.FollowUp(cell.AsText)),
            _ => cell,
        })]),
    };

    /// <summary>A procedure that all experiments share is named once, below the table, and takes no room in it.</summary>
    private static IEnumerable<(string Column, string Sentence)> Shared(ReportData data)
    {
        if (data.Plan.Experiments.Count > 1)
        {
            if (data.Plan.Experiments.Select(e => e.Test).Distinct().ToArray() is [string test])
            {
                yield return ("test", $"Test of every experiment: {KeyWording.Test(test)}.");
            }

            if (data.Plan.Experiments.Select(e => e.FollowUp).Distinct().ToArray() is [string followUp])
            {
                yield return ("follow_up", $"Follow-up of every experiment: {KeyWording.FollowUp(followUp)}.");
            }
        }
    }

    private static TableBlock Plan(ReportData data, Campaign campaign)
    {
        (string Column, string Sentence)[] shared = [.. Shared(data)];
        TableBlock plan = TableBlock.Of(data.Plan.Amendments.Count > 0 ? "The plan as it stands, amendments included" : "The plan", Named(PlanHistory.Plan(data.Plan.Experiments))).WithoutEmptyColumns();
        plan = plan.Only([.. plan.Columns.Select(c => c.Name).Where(name => !shared.Any(s => s.Column == name))]);
        return plan with
        {
            Links = Anchors.InFull(data),
            Below = [.. shared.Select(s => s.Sentence), .. Notes(data, campaign)],
        };
    }

    private static string[] Notes(ReportData data, Campaign campaign) =>
        data.Plan.Experiments.Count > TableBlock.MostRows ? [ResultsSection.Cut(data.Plan.Experiments.Count, "first in the plan")]
        : campaign.IsExploratory || data.Plan.Experiments.Count == 0 ? []
        : ["Empty: the plan says nothing of it. Replicates are values in each group, or specimens where these are recorded."];

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
            // On a terminal what stands right is never cut; here nothing is cut, and a time is text.
            TableBlock withdrawn = TableBlock.Of("Experiments withdrawn, and taken in again", WithdrawVerb.Rows(data.Plan.Withdrawals));
            yield return withdrawn with { Columns = [.. withdrawn.Columns.Select(c => c.Name == "at" ? c with { IsNumeric = false } : c)] };
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
