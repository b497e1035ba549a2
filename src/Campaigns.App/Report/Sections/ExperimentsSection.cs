using Campaigns.App.Commands;
using Campaigns.App.Figures;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.FollowUps;

namespace Campaigns.App.Report.Sections;

/// <summary>Experiments in full: values, variation, tests, effects, checks, comparisons.</summary>
internal sealed class ExperimentsSection : ReportSection
{
    public override string Anchor => "in-full";

    public override string Title => "Experiments in full";

    public override bool Concerns(ReportData data) => data.InFull.Count > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        yield return new Paragraph(Which(data), Tone.Note);
        foreach (ReportExperiment experiment in data.InFull)
        {
            yield return new Panel([.. Of(data.Standing, data.Overview, experiment)]);
        }
    }

    private static string Which(ReportData data)
    {
        int all = data.Standing.Experiments.Count, shown = data.InFull.Count;
        int survivors = data.InFull.Count(e => e.Detail.Result.Survives == true);
        return shown == all ? "Every experiment of the campaign, in the plan's order."
            : FormattableString.Invariant($"{shown} of {all} experiments, in the plan's order, among them {survivors} of {data.Overview.SurvivorCount} survivors. 'campaigns report {data.Standing.Campaign.Code} --experiment CODE' shows others, --most N more; 'campaigns show {data.Standing.Campaign.Code} CODE' shows any of them.");
    }

    private static IEnumerable<Block> Of(CampaignStanding standing, CampaignOverview overview, ReportExperiment experiment)
    {
        ExperimentDetail detail = experiment.Detail;
        ExperimentResult result = detail.Result;
        string code = result.Plan.Code;
        yield return new Heading(1, Anchors.Of(result), result.Plan.Title.Length > 0 ? $"{code}: {result.Plan.Title}" : code);
        foreach (string sentence in ExperimentNotes.Opening(detail))
        {
            yield return new Paragraph(sentence);
        }

        yield return new FigureBlock(ObservationsFigure.Of(standing, detail, experiment.Observations));
        yield return TableBlock.Of($"{code}: groups{InUnit(result)}", ExperimentSections.Groups(detail) with { Below = [.. ExperimentNotes.Groups(detail)] }).WithoutEmptyColumns();
        foreach (TableBlock table in Tables(standing, detail, code).Where(t => t.Rows.Count > 0))
        {
            yield return table.WithoutEmptyColumns();
        }

        foreach (Block block in Effects(standing, detail, code))
        {
            yield return block;
        }

        if (detail.Analysis.Checks.Count > 0)
        {
            yield return new Paragraph($"{code}: checks of the assumptions ({ExperimentWording.ChecksAreAdvice}; what a quiet one cannot see stands under Methods)");
            yield return new BulletList([.. ExperimentNotes.Checks(detail, isBrief: true)]);
        }

        foreach (Block block in Comparisons(standing, overview, detail))
        {
            yield return block;
        }

        if (detail.Exclusions.Count > 0)
        {
            yield return TableBlock.Of($"{code}: observations left out, and taken in again", ExperimentSections.Exclusions(detail));
        }
    }

    private static IEnumerable<TableBlock> Tables(CampaignStanding standing, ExperimentDetail detail, string code) =>
    [
        TableBlock.Of($"{code}: table of variation{InUnit(detail.Result, "mean squares in the square of ")}", ExperimentSections.Variation(detail)) with { MaySort = false },
        TableBlock.Of($"{code}: specimens and their readings", ExperimentSections.Specimens(detail) with { Below = [.. ExperimentNotes.Specimens(detail)] }) with { MaySort = false },
        TableBlock.Of($"{code}: test", ExperimentSections.Tests(detail) with { Below = [.. ExperimentNotes.Tests(standing, detail)] }) with { MaySort = false },
    ];

    /// <summary>The picture of the comparisons comes before the table of effects, so that the two stand side by side where there is room.</summary>
    private static IEnumerable<Block> Effects(CampaignStanding standing, ExperimentDetail detail, string code)
    {
        if (detail.Comparisons.Count > 0)
        {
            yield return new FigureBlock(ComparisonsFigure.Of(standing, detail));
        }

        TableBlock effects = TableBlock.Of($"{code}: effects", EffectSection.Table(detail) with { Below = [.. ExperimentWording.Effects(standing, detail)] }) with { MaySort = false };
        if (effects.Rows.Count > 0)
        {
            yield return effects.WithoutEmptyColumns();
        }
    }

    private static IEnumerable<Block> Comparisons(CampaignStanding standing, CampaignOverview overview, ExperimentDetail detail)
    {
        if (detail.Comparisons.Count > 0)
        {
            string followUp = FollowUpRegistry.Find(detail.Result.Plan.FollowUp)?.Name ?? detail.Result.Plan.FollowUp;
            yield return TableBlock.Of($"{detail.Result.Plan.Code}: comparisons{InUnit(detail.Result)}, {followUp}", ExperimentSections.Comparisons(detail) with
            {
                Below = [.. ExperimentWording.Comparisons(overview, [detail.Result.Plan.FollowUp]).Take(1), .. SelectedWording.WithoutInterval(detail.Comparisons), "What is claimed, and what the selected intervals hold, stands below the figure and under Methods."],
            }).WithoutEmptyColumns();
        }
    }

    private static string InUnit(ExperimentResult result, string what = "in ") => result.Plan.Unit.Length > 0 ? $", {what}{result.Plan.Unit}" : "";
}
