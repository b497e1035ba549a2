using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints one experiment in full, as high as it needs: what came out first, then what it rests on.</summary>
public static class DetailPainter
{
    /// <summary>Paints an experiment.</summary>
    /// <param name="detail">The experiment.</param>
    /// <param name="standing">Its campaign.</param>
    /// <param name="heading">What its campaign holds.</param>
    /// <param name="width">Cells across, at least 20.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(ExperimentDetail detail, CampaignStanding standing, CampaignHeading heading, int width, GlyphSet glyphs)
    {
        DetailSheet sheet = new(width, glyphs);
        ResultPainter.Result(sheet, detail.Result, heading);
        ResultPainter.Glance(sheet, detail, standing);
        GroupsPainter.Paint(sheet, detail);
        ComparisonsPainter.Paint(sheet, detail, standing);
        VariationPainter.Paint(sheet, detail);
        EffectsPainter.Paint(sheet, detail, standing);
        BesidePainter.Paint(sheet, detail);
        ChecksPainter.Paint(sheet, detail.Analysis.Checks);
        ExclusionsPainter.Paint(sheet, detail);
        if (GroupTestRegistry.Find(detail.Result.Plan.Test) is { } test)
        {
            sheet.Title("what the test assumes");
            sheet.Line(test.Assumes, Ink.Quiet);
        }

        Notes(sheet, detail);
        return sheet.Painted();
    }

    /// <summary>Paints what is known of an experiment before its detail is read.</summary>
    /// <param name="result">How the experiment stands.</param>
    /// <param name="heading">What its campaign holds.</param>
    /// <param name="width">Cells across, at least 20.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintBefore(ExperimentResult result, CampaignHeading heading, int width, GlyphSet glyphs)
    {
        DetailSheet sheet = new(width, glyphs);
        ResultPainter.Result(sheet, result, heading);
        sheet.Title("The rest takes a moment to compute; it follows once the list stands still.");
        return sheet.Painted();
    }

    private static void Notes(DetailSheet sheet, ExperimentDetail detail)
    {
        List<string> notes = [];
        if (detail.MissingCount > 0)
        {
            notes.Add($"{DetailSheet.Whole(detail.MissingCount)} {(detail.MissingCount == 1 ? "value is" : "values are")} reported missing in the loaded files.");
        }

        if (detail.Result.P is null)
        {
            notes.Add(ExperimentWording.WithoutResult(detail.Result));
        }

        if (notes.Count > 0)
        {
            sheet.Title("notes");
            notes.ForEach(note => sheet.Line(note, Ink.Warning));
        }
    }
}
