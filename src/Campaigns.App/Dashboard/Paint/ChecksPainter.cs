using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Wording;
using Campaigns.Statistics.Checks;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the checks: those that warn first and in full, the others in a sentence.</summary>
internal static class ChecksPainter
{
    /// <summary>Adds the checks.</summary>
    public static void Paint(DetailSheet sheet, IReadOnlyList<CheckLine> checks)
    {
        if (checks.Count == 0)
        {
            return;
        }

        int warned = checks.Count(c => c.Finding.Verdict == CheckVerdict.Warns);
        sheet.Title($"checks ({ExperimentWording.ChecksAreAdvice}): {DetailSheet.Whole(warned)} of {DetailSheet.Whole(checks.Count)} warn");
        foreach (CheckLine line in checks.OrderBy(c => c.Finding.Verdict switch { CheckVerdict.Warns => 0, CheckVerdict.Quiet => 1, _ => 2 }))
        {
            string word = ExperimentWording.Word(line.Finding.Verdict);
            if (line.Finding.Verdict == CheckVerdict.Warns)
            {
                ExperimentCheck check = CheckRegistry.Find(line.Key)!;
                sheet.Marked(sheet.Glyphs.Warns, $"{word}: {line.Name}", Ink.Warning);
                sheet.Line($"{line.Finding.Saw} {check.Advice}", indent: 2);
                sheet.Line(check.CannotSee, Ink.Quiet, indent: 2);
            }
            else
            {
                bool isQuiet = line.Finding.Verdict == CheckVerdict.Quiet;
                sheet.Marked(isQuiet ? sheet.Glyphs.Between : sheet.Glyphs.None, $"{word}: {line.Name}. {line.Finding.Saw}", isQuiet ? Ink.Text : Ink.Quiet);
            }
        }

        if (checks.Any(c => c.Finding.Verdict == CheckVerdict.Quiet))
        {
            sheet.Line("A quiet check gives no warning; it does not show that all is well.", Ink.Quiet);
        }
    }
}
