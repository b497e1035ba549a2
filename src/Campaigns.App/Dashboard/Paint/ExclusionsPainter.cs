using Campaigns.App.Dashboard.Canvas;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints which values were left out, by whom and why, and what the test says with and without them.</summary>
internal static class ExclusionsPainter
{
    /// <summary>Adds the decisions; nothing where there are none.</summary>
    public static void Paint(DetailSheet sheet, ExperimentDetail detail)
    {
        if (detail.Exclusions.Count == 0)
        {
            return;
        }

        sheet.Title("values left out, and taken in again");
        foreach (ExcludedObservation decision in detail.Exclusions)
        {
            sheet.Marked(
                decision.IsExcluded ? sheet.Glyphs.Warns : sheet.Glyphs.Between,
                $"{decision.At.UtcDateTime:yyyy-MM-dd} {decision.Sentence}",
                decision.IsExcluded ? Ink.Warning : Ink.Text);
        }

        if (detail is { OutcomeWithExcluded: { } with, Outcome: { } without })
        {
            sheet.Line("without the excluded, the result: " + ResultPainter.OutcomeText(without));
            sheet.Line("with the excluded, for comparison: " + ResultPainter.OutcomeText(with));
        }
    }
}
