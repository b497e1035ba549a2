using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints how large the differences are, and how large they would have had to be to be seen.</summary>
internal static class EffectsPainter
{
    private const int LongestName = 16;

    /// <summary>Adds the effect sizes; nothing without a table of variation.</summary>
    public static void Paint(DetailSheet sheet, ExperimentDetail detail, CampaignStanding standing)
    {
        if (detail.Variation is not { } variation)
        {
            return;
        }

        sheet.Title("effect size");
        if (detail.Analysis.Effects is { } effects)
        {
            Row(sheet, "", "value", "lower", "upper", Ink.Heading);
            Row(sheet, "eta squared", effects.EtaSquared, effects.EtaSquaredInterval);
            Row(sheet, "omega squared", effects.OmegaSquared, null);
            Row(sheet, "epsilon squared", effects.EpsilonSquared, null);
            Row(sheet, "Cohen's f", effects.CohenF, effects.CohenFInterval);
        }
        else
        {
            sheet.Line($"eta squared {DetailSheet.Number(variation.EtaSquared)}, omega squared {DetailSheet.Number(variation.OmegaSquared)}");
        }

        Detectable(sheet, detail, standing);
        foreach (string note in ExperimentWording.Effects(standing, detail))
        {
            sheet.Line(note, Ink.Quiet);
        }
    }

    private static void Detectable(DetailSheet sheet, ExperimentDetail detail, CampaignStanding standing)
    {
        string unit = detail.Result.Plan.Unit is { Length: > 0 } given ? " " + given : "";
        List<string> thresholds = [];
        if (detail.Analysis.Detectable is { } alone)
        {
            thresholds.Add($"{DetailSheet.Number(alone)}{unit} at level {standing.Campaign.Level} alone");
        }

        if (detail.Analysis.DetectableAtStrictest is { } strictest)
        {
            thresholds.Add($"{DetailSheet.Number(strictest)}{unit} at the strictest threshold {FamilyText.Level(standing.FamilyOf(detail.Result).Level)}/{DetailSheet.Whole(standing.FamilyOf(detail.Result).Size)}");
        }

        if (thresholds.Count > 0)
        {
            sheet.Line("smallest detectable difference: " + string.Join(", ", thresholds));
        }
    }

    private static void Row(DetailSheet sheet, string name, double value, Interval? interval) =>
        Row(sheet, name, DetailSheet.Number(value), sheet.Number(interval?.Lower), sheet.Number(interval?.Upper), Ink.Text);

    private static void Row(DetailSheet sheet, string name, string value, string lower, string upper, Ink ink)
    {
        int number = Math.Clamp((sheet.Width - LongestName) / 3, 7, 12);
        sheet.Row(Math.Min(LongestName, sheet.Width - (3 * number)), name, [(value, number), (lower, number), (upper, number)], ink);
    }
}
