using Campaigns.App.Figures;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.Domain;

namespace Campaigns.App.Report.Sections;

/// <summary>The p-values in rank order, and what their distribution says of how many nulls are true.</summary>
internal sealed class RankingSection : ReportSection
{
    public override string Anchor => "ranking";

    public override string Title => "Ranking of the p-values";

    public override bool Concerns(ReportData data) => data.Overview.TestedCount > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        CampaignRisk risk = data.Risk;
        yield return new FigureBlock(RankingFigure.Of(data.Standing));
        yield return new FactList(
        [
            new("Experiments with a p-value", Cell.Whole(data.Overview.TestedCount)),
            new("Their own p at most the level", Cell.Whole(data.Overview.UncorrectedCount)),
            new("Survive the correction", Cell.Whole(data.Overview.SurvivorCount)),
            new("Largest p that survives", Cell.P(risk.LargestSurvivingP)),
            new("Estimated share of true nulls", Cell.Number(risk.TrueNulls.Share)),
        ]);
        yield return new FigureBlock(HistogramFigure.Of(data.Standing));
        if (risk.TrueNulls.Reason is { } reason)
        {
            yield return new Paragraph($"No estimate of the share of true nulls: {reason}", Tone.Note);
        }
    }
}
