using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints what is said about the selected campaign, and then about the whole programme.</summary>
public static class ProgrammeSheet
{
    /// <summary>Rows for what needs attention over all campaigns, above the list.</summary>
    public const int CaptionRows = 2;

    private const int Label = 21;
    private const int WidestSpark = 40;
    private const int HeldWords = 36;

    /// <summary>Paints the sheet, as high as it needs.</summary>
    /// <param name="programme">The campaigns.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(ProgrammeModel programme, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(programme);
        DetailSheet sheet = new(width, glyphs);
        if (programme.Selected is { } selected)
        {
            Campaign campaign = selected.Overview.Campaign;
            sheet.Line(campaign.Title.Length > 0 ? $"{campaign.Code}: {campaign.Title}" : campaign.Code, Ink.Heading);
            Attention(sheet, selected, StepNames.Keys(programme.OpenCampaign));
            Checks(sheet, programme, selected.Overview);
            foreach (string sentence in AttentionText.ToKnow(selected.Overview, StepNames.Keys(programme.OpenCampaign)))
            {
                sheet.Marked(glyphs.Between, sentence, Ink.Text);
            }

            Risk(sheet, selected.Overview);
        }

        sheet.Title("the whole programme");
        string total = AttentionText.Total(programme.Campaigns, programme.OpenCampaign, programme.Checks);
        if (CellText.Wrap(total, width).Count > CaptionRows)
        {
            // Above the list there is no room for all of it.
            sheet.Line(total);
        }

        CampaignOverview[] all = [.. programme.Campaigns.Select(c => c.Overview)];
        foreach (string sentence in RiskTable.Programme(all))
        {
            sheet.Line(sentence);
        }

        sheet.Line(CampaignText.Caution, Ink.Quiet);
        return sheet.Painted();
    }

    /// <summary>The checks under way as a line, for example "checking: 32 of 120 survivors".</summary>
    /// <param name="progress">How far they are.</param>
    public static string Progress(WorkProgress progress) => FormattableString.Invariant($"{progress.What}: {progress.Done} of {progress.Total} {progress.Unit}; Esc stops");

    private static void Attention(DetailSheet sheet, CampaignAttention selected, StepNames steps)
    {
        string[] needs = [.. AttentionText.Needs(selected, steps)];
        foreach (string sentence in needs)
        {
            sheet.Marked(sheet.Glyphs.Warns, sentence, Ink.Warning);
        }

        if (needs.Length == 0)
        {
            sheet.Line(AttentionText.Nothing(selected.Overview), Ink.Quiet);
        }
    }

    private static void Checks(DetailSheet sheet, ProgrammeModel programme, CampaignOverview overview)
    {
        if (!programme.IsOpenSelected)
        {
            sheet.Marked(sheet.Glyphs.Between, "Checks are made for the survivors of the open campaign alone; key c opens this one and makes them.", Ink.Quiet);
            return;
        }

        if (programme.Checking is { } progress)
        {
            sheet.Marked(sheet.Glyphs.Between, Progress(progress), Ink.Heading);
        }
        else if (programme.Problem is { } problem)
        {
            sheet.Marked(sheet.Glyphs.Warns, "The checks could not be made: " + problem, Ink.Warning);
        }
        else
        {
            bool warns = programme.Checks is { Warning.Count: > 0 };
            string[] lines = [.. AttentionText.Checks(overview.Campaign.Code, overview.SurvivorCount, programme.Checks)];
            foreach (string line in lines.Take(1))
            {
                sheet.Marked(warns ? sheet.Glyphs.Warns : sheet.Glyphs.Between, line, warns ? Ink.Warning : programme.Checks is null ? Ink.Quiet : Ink.Text);
            }

            foreach (string line in lines.Skip(1))
            {
                sheet.Line(line, Ink.Text, indent: 4);
            }
        }
    }

    private static void Risk(DetailSheet sheet, CampaignOverview overview)
    {
        sheet.Blank();
        int tests = overview.TestedCount;
        Campaign campaign = overview.Campaign;
        ErrorProcedure? procedure = (ErrorProcedure?)CorrectionRegistry.Find(campaign.Correction) ?? OnlineRegistry.Find(campaign.Correction);
        if (tests > 0)
        {
            int cells = Math.Clamp(sheet.Width - Label - HeldWords, 8, WidestSpark);
            string risk = Words.Percent(FamilyRisk.AtLeastOneIfIndependent(tests, campaign.Level));
            sheet.Row(Label, "without correction", [(Padded(RiskSpark.Of(tests, campaign.Level, cells, sheet.Glyphs), cells), cells), ("  " + risk, 2 + risk.Length)], Ink.Mean);
            if (procedure is not null && Holds(campaign) is { } held)
            {
                sheet.Row(Label, "the correction holds", [(Padded(RiskSpark.Held(tests, campaign.Level.Value, cells, sheet.Glyphs), cells), cells), ("  " + held, 2 + held.Length)], Ink.Survivor);
            }

            sheet.Line(FormattableString.Invariant($"Risk of at least one false positive after 1 to {tests} tests, if nothing is real and the tests are independent; {RiskSpark.Key(sheet.Glyphs)}."), Ink.Quiet);
        }

        if (procedure is null)
        {
            sheet.Line($"This program knows no correction named {campaign.Correction}: what it holds cannot be said here.", Ink.Warning);
            return;
        }

        foreach (string sentence in RiskTable.Sentences(overview))
        {
            sheet.Line(sentence);
        }
    }

    /// <summary>What is held over the campaign, as a level and its name; null where nothing is.</summary>
    private static string? Holds(Campaign campaign) => !CampaignText.Holds(campaign) ? null
        : $"{FamilyText.Level(campaign.Level)} {(campaign.ErrorRate == ErrorRate.FalseDiscovery ? "(false discovery rate)" : "(familywise)")}";

    private static string Padded(string cells, int width) => cells + new string(' ', Math.Max(0, width - cells.Length));
}
