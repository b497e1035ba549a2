using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the values of every group, their figures, and the letters that groups share.</summary>
internal static class GroupsPainter
{
    private const int CountWidth = 5;
    private const int ShortestLabel = 12;

    /// <summary>Adds the picture and the table.</summary>
    public static void Paint(DetailSheet sheet, ExperimentDetail detail)
    {
        string unit = detail.Result.Plan.Unit.Length > 0 ? $" ({detail.Result.Plan.Unit})" : "";
        sheet.Title($"values by group{unit}, mean and " + NumberText.RoundTrip(Math.Round(detail.Confidence * 100, 6)) + " % interval");
        sheet.Insert(ObservationPlot.Paint(detail.Groups, sheet.Width, sheet.Glyphs));
        sheet.Title("groups" + unit);
        string[]? letters = detail.Analysis.Letters is { } given ? [.. given] : null;
        bool isLettersColumn = Table(sheet, detail.Groups, letters);
        if (detail.Groups.FirstOrDefault(g => g.IsControl) is { } control)
        {
            sheet.Line("control: " + control.Label, Ink.Quiet);
        }

        if (letters is not null && !isLettersColumn)
        {
            sheet.Line("letters: " + string.Join(", ", detail.Groups.Select((g, i) => $"{g.Label} {letters[i]}")));
        }

        if (letters is not null)
        {
            sheet.Line(ExperimentWording.Letters, Ink.Quiet);
        }

        if (ExperimentWording.MeanIntervals(detail) is { } intervals)
        {
            sheet.Line(intervals, Ink.Quiet);
        }
    }

    /// <summary>The table, the letters beside it where they have room.</summary>
    /// <returns>Whether they have.</returns>
    private static bool Table(DetailSheet sheet, IReadOnlyList<GroupDetail> groups, string[]? letters)
    {
        bool isWide = sheet.Width >= 60;
        int number = Math.Clamp((sheet.Width - 15) / (isWide ? 5 : 4), 10, 12);
        int label = sheet.Width - CountWidth - (number * (isWide ? 4 : 3));
        int lettersWidth = letters is null ? 0 : Math.Max("letters".Length, letters.Max(l => l.Length)) + 2;
        bool isLettersColumn = letters is not null && label - lettersWidth >= ShortestLabel;
        label -= isLettersColumn ? lettersWidth : 0;
        string[] names = isWide ? ["mean", "st. dev.", "lower", "upper"] : ["mean", "lower", "upper"];
        Row("group", "n", names, "letters", Ink.Heading);
        for (int i = 0; i < groups.Count; i++)
        {
            GroupSummary s = groups[i].Summary;
            double?[] numbers = isWide ? [s.Mean, s.StandardDeviation, s.Lower, s.Upper] : [s.Mean, s.Lower, s.Upper];
            Row(groups[i].Label, DetailSheet.Whole(s.Count), numbers.Select(sheet.Number), letters?[i], Ink.Text);
        }

        return isLettersColumn;

        void Row(string name, string count, IEnumerable<string> numbers, string? letter, Ink ink) =>
            sheet.Row(label, name, [(count, CountWidth), .. numbers.Select(n => (n, number)), .. isLettersColumn ? [(letter ?? "", lettersWidth)] : Array.Empty<(string, int)>()], ink);
    }
}
