using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.FollowUps;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the comparisons inside an experiment: a picture of all intervals on one axis, the figures, what is claimed and why the rest is not.</summary>
internal static class ComparisonsPainter
{
    private const int NumberWidth = 11;
    private const int OneRowWidth = 70;
    private const int SelectedWidth = OneRowWidth + (2 * NumberWidth);
    private const int TwoRowsWidth = 4 * NumberWidth;

    /// <summary>Adds the comparisons; nothing where the plan names no follow-up.</summary>
    public static void Paint(DetailSheet sheet, ExperimentDetail detail, CampaignStanding standing)
    {
        ExperimentResult result = detail.Result;
        if (result.Plan.FollowUp == FollowUpRegistry.None)
        {
            return;
        }

        string unit = result.Plan.Unit.Length > 0 ? $" ({result.Plan.Unit})" : "";
        sheet.Title($"comparisons, {FollowUpRegistry.Find(result.Plan.FollowUp)?.Name ?? result.Plan.FollowUp}: differences of means{unit}");
        if (detail.Comparisons.Count == 0)
        {
            sheet.Line(result.P is null ? "none without a result" : "these values allow none", Ink.Open);
            return;
        }

        sheet.Insert(ComparisonPlot.Paint(detail.Comparisons, sheet.Width, sheet.Glyphs));
        sheet.Blank();
        Figures(sheet, detail.Comparisons);
        Verdicts(sheet, detail.Comparisons);
        if (HasSelected(detail.Comparisons) && sheet.Width < SelectedWidth)
        {
            Selected(sheet, detail.Comparisons);
        }

        foreach (string note in ExperimentWording.Comparisons(standing.Overview, [result.Plan.FollowUp]))
        {
            sheet.Line(note, Ink.Quiet);
        }
    }

    /// <summary>The sign of a comparison, told by shape.</summary>
    public static string Sign(ExperimentComparison c, GlyphSet glyphs) => c.Survives switch { true => glyphs.Survivor, false => glyphs.Other, null => glyphs.Open };

    /// <summary>The ink of a comparison.</summary>
    public static Ink InkOf(ExperimentComparison c) => c.Survives switch { true => Ink.Survivor, false => Ink.Text, null => Ink.Open };

    /// <summary>"b - a" cut to a width, the room shared between the two.</summary>
    public static string PairText(ExperimentComparison c, int width, GlyphSet glyphs)
    {
        const string less = " - ";
        int room = Math.Max(2, width - less.Length), b = CellText.Width(c.GroupB), a = CellText.Width(c.GroupA);
        int forB = Math.Min(b, Math.Max((room + 1) / 2, room - a));
        return CellText.Fit(c.GroupB, forB, glyphs.Cut) + less + CellText.Fit(c.GroupA, room - forB, glyphs.Cut);
    }

    private static void Figures(DetailSheet sheet, IReadOnlyList<ExperimentComparison> comparisons)
    {
        if (sheet.Width >= SelectedWidth && HasSelected(comparisons))
        {
            int label = sheet.Width - (7 * NumberWidth);
            sheet.Row(label, "pair", Columns("difference", "lower", "upper", "p", "adjusted p", "sel. lower", "sel. upper"), Ink.Heading);
            foreach (ExperimentComparison c in comparisons)
            {
                string[] numbers = [.. Numbers(sheet, c), sheet.Number(c.SelectedInterval?.Lower), sheet.Number(c.SelectedInterval?.Upper)];
                sheet.Row(label, $"{Sign(c, sheet.Glyphs)} {PairText(c, label - 2, sheet.Glyphs)}", Columns(numbers), InkOf(c));
            }
        }
        else if (sheet.Width >= OneRowWidth)
        {
            int label = sheet.Width - (5 * NumberWidth);
            sheet.Row(label, "pair", Columns("difference", "lower", "upper", "p", "adjusted p"), Ink.Heading);
            foreach (ExperimentComparison c in comparisons)
            {
                sheet.Row(label, $"{Sign(c, sheet.Glyphs)} {PairText(c, label - 2, sheet.Glyphs)}", Columns(Numbers(sheet, c)), InkOf(c));
            }
        }
        else if (sheet.Width >= TwoRowsWidth)
        {
            int label = sheet.Width - TwoRowsWidth;
            sheet.Row(sheet.Width - NumberWidth, "pair", Columns("p"), Ink.Heading);
            sheet.Row(label, "", Columns("difference", "lower", "upper", "adjusted p"), Ink.Heading);
            foreach (ExperimentComparison c in comparisons)
            {
                string[] numbers = Numbers(sheet, c);
                int pair = sheet.Width - NumberWidth;
                sheet.Row(pair, $"{Sign(c, sheet.Glyphs)} {PairText(c, pair - 2, sheet.Glyphs)}", Columns(numbers[3]), InkOf(c));
                sheet.Row(label, "", Columns(numbers[0], numbers[1], numbers[2], numbers[4]));
            }
        }
        else
        {
            foreach (ExperimentComparison c in comparisons)
            {
                string[] numbers = Numbers(sheet, c);
                sheet.Marked(Sign(c, sheet.Glyphs), $"{c.GroupB} - {c.GroupA}: {numbers[0]}, from {numbers[1]} to {numbers[2]}, p {numbers[3]}, adjusted {numbers[4]}", InkOf(c));
            }
        }
    }

    private static bool HasSelected(IReadOnlyList<ExperimentComparison> comparisons) => comparisons.Any(c => c.SelectedInterval is not null);

    /// <summary>A table of their own for the intervals that pay for the selection, where they find no room beside the others.</summary>
    private static void Selected(DetailSheet sheet, IReadOnlyList<ExperimentComparison> comparisons)
    {
        int label = Math.Max(4, sheet.Width - (2 * NumberWidth));
        sheet.Blank();
        sheet.Row(label, "selected intervals", Columns("lower", "upper"), Ink.Heading);
        foreach (ExperimentComparison c in comparisons.Where(c => c.SelectedInterval is not null))
        {
            sheet.Row(label, $"{Sign(c, sheet.Glyphs)} {PairText(c, label - 2, sheet.Glyphs)}", Columns(sheet.Number(c.SelectedInterval?.Lower), sheet.Number(c.SelectedInterval?.Upper)), InkOf(c));
        }
    }

    private static (string, int)[] Columns(params string[] texts) => [.. texts.Select(text => (text, NumberWidth))];

    private static string[] Numbers(DetailSheet sheet, ExperimentComparison c) =>
    [
        DetailSheet.Number(c.Comparison.Difference), sheet.Number(c.Comparison.Lower), sheet.Number(c.Comparison.Upper),
        c.Comparison.P is { } p ? NumberText.P(p) : sheet.Glyphs.None, c.AdjustedP is { } adjusted ? NumberText.P(adjusted) : sheet.Glyphs.None,
    ];

    private static void Verdicts(DetailSheet sheet, IReadOnlyList<ExperimentComparison> comparisons)
    {
        foreach (var alike in comparisons.GroupBy(c => (c.Survives, c.NotClaimedBecause)).OrderBy(g => g.Key.Survives switch { true => 0, false => 1, null => 2 }))
        {
            ExperimentComparison first = alike.First();
            string count = DetailSheet.Whole(alike.Count());
            string because = alike.Key.NotClaimedBecause is { } reason ? $", {(count == "1" ? "" : "each ")}because {reason}" : "";
            string sentence = alike.Key.Survives switch
            {
                true => $"{count} claimed",
                false => $"{count} not claimed{because}",
                null => $"{count} not possible{because}: {string.Join(", ", alike.Select(c => $"{c.GroupB} - {c.GroupA}"))}",
            };
            sheet.Marked(Sign(first, sheet.Glyphs), sentence, InkOf(first));
        }
    }
}
