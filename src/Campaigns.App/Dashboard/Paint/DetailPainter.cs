using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints one experiment in full, as high as it needs.</summary>
public static class DetailPainter
{
    private const int Digits = 4;

    /// <summary>Paints an experiment.</summary>
    /// <param name="detail">The experiment.</param>
    /// <param name="heading">What its campaign holds.</param>
    /// <param name="width">Cells across, at least 20.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(ExperimentDetail detail, CampaignHeading heading, int width, GlyphSet glyphs)
    {
        Page page = new(width, glyphs);
        Result(page, detail.Result, heading);
        page.Title("values by group, with mean and " + Percent(detail.Confidence) + " interval");
        page.Insert(ObservationPlot.Paint(detail.Groups, width, glyphs));
        GroupTable(page, detail);
        if (detail.Variation is { } variation)
        {
            VariationLines(page, variation);
            page.Title("effect size");
            page.Line($"eta squared {Number(variation.EtaSquared)}, omega squared {Number(variation.OmegaSquared)}");
            page.Line($"residual standard deviation {Number(variation.ResidualStandardDeviation)} {detail.Result.Plan.Unit}".TrimEnd());
        }

        if (GroupTestRegistry.Find(detail.Result.Plan.Test) is { } test)
        {
            page.Title("what the test assumes");
            page.Line(test.Assumes, Ink.Quiet);
        }

        Notes(page, detail);
        return page.Painted();
    }

    private static void Result(Page page, ExperimentResult result, CampaignHeading heading)
    {
        PlannedExperiment plan = result.Plan;
        page.Line(plan.Title.Length > 0 ? $"{plan.Code}: {plan.Title}" : plan.Code, Ink.Heading);
        string unit = plan.Unit.Length > 0 ? $" ({plan.Unit})" : "";
        if (plan.Response.Length > 0)
        {
            page.Line("response: " + plan.Response + unit, Ink.Quiet);
        }

        page.Line($"test: {GroupTestRegistry.Find(plan.Test)?.Name ?? plan.Test}; follow-up: {plan.FollowUp}", Ink.Quiet);
        if (result is { Statistic: { } statistic, P: { } p })
        {
            string df = result switch
            {
                { Df1: { } df1, Df2: { } df2 } => $" on {Freedom(df1)} and {Freedom(df2)} degrees of freedom",
                { Df1: { } df1 } => $" on {Freedom(df1)} degrees of freedom",
                _ => "",
            };
            page.Line($"statistic {Number(statistic)}{df}");
            page.Line($"p {NumberText.P(p)}" + (result.AdjustedP is { } adjusted ? $", adjusted {NumberText.P(adjusted)}" : ""));
        }

        string held = string.Join(", ", heading.Held);
        (string sentence, Ink ink) = result.Survives switch
        {
            true => ($"{page.Glyphs.Survivor} survives ({held})", Ink.Survivor),
            false => ($"{page.Glyphs.Other} does not survive ({held})", Ink.Text),
            null => ($"{page.Glyphs.Open} {result.Status.Sentence()}", Ink.Open),
        };
        page.Line(sentence, ink);
    }

    private static void GroupTable(Page page, ExperimentDetail detail)
    {
        bool isWide = page.Width >= 60;
        int number = Math.Clamp((page.Width - 15) / (isWide ? 5 : 4), 10, 12);
        page.Title("groups");
        int label = page.Width - 5 - (number * (isWide ? 4 : 3));
        string[] names = isWide ? ["mean", "st. dev.", "lower", "upper"] : ["mean", "lower", "upper"];
        page.Row(label, ["n", .. names], 5, number, "group", Ink.Heading);
        foreach (GroupDetail group in detail.Groups)
        {
            GroupSummary s = group.Summary;
            double?[] numbers = isWide ? [s.Mean, s.StandardDeviation, s.Lower, s.Upper] : [s.Mean, s.Lower, s.Upper];
            string[] cells = [s.Count.ToString(CultureInfo.InvariantCulture), .. numbers.Select(v => v is { } x ? Number(x) : page.Glyphs.None)];
            page.Row(label, cells, 5, number, group.Label, Ink.Text);
        }

        if (detail.Groups.FirstOrDefault(g => g.IsControl) is { } control)
        {
            page.Line("control: " + control.Label, Ink.Quiet);
        }
    }

    private static void VariationLines(Page page, VariationTable table)
    {
        page.Title("table of variation");
        int number = Math.Clamp((page.Width - 13) / 3, 11, 12);
        int label = page.Width - 5 - (number * 3);
        page.Row(label, ["df", "sum of sq.", "mean sq.", "F"], 5, number, "source", Ink.Heading);
        VariationRow("between", table.Between, Number(table.Between.MeanSquare), Number(table.F));
        VariationRow("within", table.Within, Number(table.Within.MeanSquare), "");
        VariationRow("total", table.Total, "", "");

        void VariationRow(string name, VariationLine line, string meanSquare, string f) =>
            page.Row(label, [line.DegreesOfFreedom.ToString(CultureInfo.InvariantCulture), Number(line.SumOfSquares), meanSquare, f], 5, number, name, Ink.Text);
    }

    private static void Notes(Page page, ExperimentDetail detail)
    {
        List<string> notes = [.. detail.Result.Amendments.Select(reason => "Values came in after the test, as a recorded amendment: " + reason)];
        if (detail.MissingCount > 0)
        {
            notes.Add($"{detail.MissingCount.ToString(CultureInfo.InvariantCulture)} {(detail.MissingCount == 1 ? "value is" : "values are")} reported missing in the loaded files.");
        }

        if (detail.Result.P is null)
        {
            notes.Add("Without a result it counts as p = 1 in the family.");
        }

        if (notes.Count > 0)
        {
            page.Title("notes");
            foreach (string note in notes)
            {
                page.Line(note, Ink.Warning);
            }
        }
    }

    private static string Number(double value) => NumberText.Screen(value, Digits);

    private static string Freedom(double df) => df == Math.Floor(df) ? NumberText.RoundTrip(df) : Number(df);

    private static string Percent(double confidence) => NumberText.RoundTrip(Math.Round(confidence * 100, 6)) + "%";

    /// <summary>Grows line by line; painted when complete.</summary>
    private sealed class Page(int width, GlyphSet glyphs)
    {
        private readonly List<Action<TextCanvas, int>> _rows = [];

        public int Width => width;

        public GlyphSet Glyphs => glyphs;

        public void Line(string text, Ink ink = Ink.Text)
        {
            foreach (string line in CellText.Wrap(text, width))
            {
                _rows.Add((canvas, y) => canvas.Write(0, y, line, ink));
            }
        }

        public void Title(string text)
        {
            _rows.Add((_, _) => { });
            Line(text, Ink.Heading);
        }

        public void Row(int label, string[] cells, int firstWidth, int otherWidth, string name, Ink ink)
        {
            _rows.Add((canvas, y) =>
            {
                canvas.Write(0, y, CellText.Fit(name, label, glyphs.Cut), ink);
                int end = label + firstWidth - 1;
                foreach (string cell in cells)
                {
                    canvas.WriteRight(end, y, cell, ink);
                    end += otherWidth;
                }
            });
        }

        public void Insert(TextCanvas picture)
        {
            for (int row = 0; row < picture.Height; row++)
            {
                int line = row;
                _rows.Add((canvas, y) =>
                {
                    for (int x = 0; x < picture.Width; x++)
                    {
                        canvas.Put(x, y, picture.SignAt(x, line), picture.InkAt(x, line));
                    }
                });
            }
        }

        public TextCanvas Painted()
        {
            TextCanvas canvas = new(width, _rows.Count);
            for (int y = 0; y < _rows.Count; y++)
            {
                _rows[y](canvas, y);
            }

            return canvas;
        }
    }
}
