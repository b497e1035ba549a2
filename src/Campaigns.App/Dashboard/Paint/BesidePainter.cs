using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints Welch's F beside the planned test, where spreads differ.</summary>
internal static class BesidePainter
{
    /// <summary>Adds the two tests; nothing where spreads do not differ.</summary>
    public static void Paint(DetailSheet sheet, ExperimentDetail detail)
    {
        if (detail.Analysis.Beside is not { } beside)
        {
            return;
        }

        sheet.Title("beside the planned test, because spreads differ");
        if (detail.Outcome is { } outcome)
        {
            sheet.Line("planned: " + ResultPainter.OutcomeText(outcome));
        }

        sheet.Line("Welch's F: " + ResultPainter.OutcomeText(beside));
        sheet.Line(ExperimentWording.Beside, Ink.Quiet);
    }
}
