using Campaigns.App.Dashboard.Canvas;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the table of variation, and how specimens and their readings vary.</summary>
internal static class VariationPainter
{
    private const int FreedomWidth = 5;

    /// <summary>Adds the tables that there are.</summary>
    public static void Paint(DetailSheet sheet, ExperimentDetail detail)
    {
        if (detail.Variation is { } table)
        {
            Table(sheet, table);
        }

        if (detail.Analysis.Specimens is { } specimens)
        {
            Specimens(sheet, specimens);
        }
    }

    private static void Table(DetailSheet sheet, VariationTable table)
    {
        sheet.Title("table of variation");
        Row(sheet, "source", ["df", "sum of sq.", "mean sq.", "F"], Ink.Heading);
        if (table.Blocks is { } blocks)
        {
            Row(sheet, "blocks", Figures(blocks), Ink.Text);
        }

        Row(sheet, table.Blocks is null ? "between" : "groups", [.. Figures(table.Between), DetailSheet.Number(table.F)], Ink.Text);
        Row(sheet, table.Blocks is null ? "within" : "residual", Figures(table.Within), Ink.Text);
        Row(sheet, "total", Figures(table.Total)[..2], Ink.Text);
        if (table.Blocks is not null)
        {
            sheet.Line("blocks: groups disregarded; groups: adjusted for blocks", Ink.Quiet);
        }
    }

    private static void Specimens(DetailSheet sheet, SpecimenVariation s)
    {
        sheet.Title("specimens and their readings, inside groups");
        Row(sheet, "between", ["df", "sum of sq.", "mean sq.", "variance"], Ink.Heading);
        Row(sheet, "specimen", [.. Figures(s.BetweenSpecimens), sheet.Number(s.Component)], Ink.Text);
        Row(sheet, "reading", [.. Figures(s.WithinSpecimens), sheet.Number(s.ReadingComponent)], Ink.Text);
    }

    private static string[] Figures(VariationLine line) => [DetailSheet.Whole(line.DegreesOfFreedom), DetailSheet.Number(line.SumOfSquares), DetailSheet.Number(line.MeanSquare)];

    private static void Row(DetailSheet sheet, string name, IReadOnlyList<string> cells, Ink ink)
    {
        int number = Math.Clamp((sheet.Width - 13) / 3, 10, 12);
        int label = sheet.Width - FreedomWidth - (number * 3);
        sheet.Row(label, name, [.. cells.Select((c, i) => (c, i == 0 ? FreedomWidth : number))], ink);
    }
}
