using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>What was risked, what the correction holds, and what is left open, in sentences.</summary>
public static class RiskWordsPainter
{
    /// <summary>Paints the sentences, as high as they need.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="risk">Its risk.</param>
    /// <param name="width">Cells across.</param>
    public static TextCanvas Paint(CampaignStanding standing, CampaignRisk risk, int width)
    {
        ArgumentNullException.ThrowIfNull(standing);
        List<string> lines = [.. Sentences(standing, risk).SelectMany(s => CellText.Wrap(s, Math.Max(20, width - 2)))];
        TextCanvas canvas = new(width, lines.Count);
        for (int y = 0; y < lines.Count; y++)
        {
            canvas.Write(1, y, lines[y]);
        }

        return canvas;
    }

    private static IEnumerable<string> Sentences(CampaignStanding standing, CampaignRisk risk)
    {
        CampaignOverview overview = risk.Overview;
        IReadOnlyList<string> cumulative = RiskTable.Sentences(overview);
        return
        [
            .. cumulative, .. RiskTable.MayBeFalse(risk),
            .. overview.TestedCount > 0 ? [RiskTable.CorrectedMeans(risk.Corrected is { } corrected ? [corrected] : [])] : (string[])[],
            .. FamilyVerdict.ProcedureOf(standing.Campaign) is OnlineProcedure procedure ? Online(standing, procedure) : [],
            .. CampaignText.Deviations(overview, StepNames.Keys(overview.Campaign.Code)),
        ];
    }

    private static IEnumerable<string> Online(CampaignStanding standing, OnlineProcedure procedure)
    {
        IEnumerable<string?> late = [OnlineText.WithoutLevel(standing.Experiments.Where(e => e.Entry is not null).Select(e => e.Entry!))];
        string? overlaps = standing.Experiments.Any(e => e.Entry?.Overlaps == true) ? OnlineText.Overlaps : null;
        return [.. OnlineText.Lines(standing.Overview, procedure, StepNames.Keys(standing.Campaign.Code)), .. late.Append(overlaps).OfType<string>(), .. OnlineText.OnOtherData(standing.Experiments)];
    }
}
