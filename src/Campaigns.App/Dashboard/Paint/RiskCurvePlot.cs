using System.Globalization;
using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The risk of at least one false positive over the order of testing: without correction between its bounds, and with it.</summary>
public static class RiskCurvePlot
{
    private const int Left = 6;
    private const int Narrowest = 30;
    private const int Lowest = 6;
    private const int LegendRows = 2;
    private const int RoomyWidth = 70;

    /// <summary>Paints the picture and its notes.</summary>
    /// <param name="points">The risk test by test; null while it is reckoned.</param>
    /// <param name="test">The test pointed at, from 1; 0 for none.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(IReadOnlyList<RiskPoint>? points, int test, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        canvas.Write(1, 0, CellText.Fit("risk of a false positive in %, if nothing is real", width - 1, glyphs.Cut), Ink.Heading);
        int pointedRows = width < RoomyWidth ? 3 : 2;
        string? words = points is null ? "The risk test by test is reckoned; it takes a moment."
            : points.Count == 0 ? "Nothing is tested yet: nothing is risked."
            : width < Narrowest || height < Lowest + LegendRows + pointedRows + 1 ? "too small to draw"
            : null;
        if (words is not null)
        {
            canvas.Write(1, 1, CellText.Fit(words, width - 1, glyphs.Cut), Ink.Open);
            return canvas;
        }

        int rows = height - LegendRows - pointedRows - 3, columns = width - Left - 1;
        Axes(canvas, points!.Count, test, rows, columns, glyphs);
        Curves(canvas, points, rows, columns, glyphs);
        IReadOnlyList<string> legend = CellText.Wrap(Legend(points, glyphs), width - 2);
        for (int i = 0; i < Math.Min(LegendRows, legend.Count); i++)
        {
            canvas.Write(1, rows + 3 + i, legend[i], Ink.Quiet);
        }

        IReadOnlyList<string> pointed = test == 0 ? ["The selected experiment has no result; Right goes to the first test."] : CellText.Wrap(PointText(points[test - 1], points.Count), width - 2);
        for (int i = 0; i < Math.Min(pointedRows, pointed.Count); i++)
        {
            bool isCut = i == pointedRows - 1 && pointed.Count > pointedRows;
            canvas.Write(1, rows + 3 + LegendRows + i, isCut ? CellText.Fit(pointed[i] + " " + pointed[i + 1], width - 2, glyphs.Cut) : pointed[i], Ink.Heading);
        }

        return canvas;
    }

    /// <summary>The test that stands nearest to a column; 0 where nothing is tested.</summary>
    /// <param name="tests">Tests in all.</param>
    /// <param name="width">As it was painted.</param>
    /// <param name="x">Column from 0.</param>
    public static int TestAt(int tests, int width, int x)
    {
        int columns = width - Left - 1;
        int test = tests < 2 || columns < 2 ? 1 : 1 + (int)Math.Round((double)(x - Left) * (tests - 1) / (columns - 1));
        return Math.Clamp(test, Math.Min(1, tests), tests);
    }

    /// <summary>What was risked when one more experiment had been tested, in words.</summary>
    /// <param name="point">The test.</param>
    /// <param name="tests">Tests in all.</param>
    public static string PointText(RiskPoint point, int tests)
    {
        ArgumentNullException.ThrowIfNull(point);
        string corrected = point.Corrected is { } c ? $", corrected {(c.IsExact ? "" : "at most ")}{Words.Percent(c.AtLeastOne)}" : "";
        return string.Create(CultureInfo.InvariantCulture,
            $"Test {point.Tests} of {tests}, {point.Experiment.Plan.Code} (p {NumberText.P(point.Experiment.P!.Value)}): risk {Words.Percent(point.Independent)}{corrected}; {NumberText.Screen(point.ExpectedFalse, 3)} false to expect; {Counted.Of(point.Hits, "hit")} so far, {point.Survivors} {(point.Survivors == 1 ? "survives" : "survive")}");
    }

    private static void Axes(TextCanvas canvas, int tests, int test, int rows, int columns, GlyphSet glyphs)
    {
        for (int y = 0; y < rows; y++)
        {
            canvas.Put(Left - 1, 1 + y, glyphs.Upright, Ink.Axis);
        }

        int step = rows >= 9 ? 25 : 50;
        for (int percent = 0; percent <= 100; percent += step)
        {
            int y = 1 + RowOf(percent / 100.0, rows);
            canvas.Put(Left - 1, y, glyphs.TickLeft, Ink.Axis);
            canvas.WriteRight(Left - 2, y, percent.ToString(CultureInfo.InvariantCulture), Ink.Axis);
        }

        canvas.Put(Left - 1, rows + 1, glyphs.Corner, Ink.Axis);
        canvas.Repeat(Left, rows + 1, columns, glyphs.Across, Ink.Axis);
        canvas.Write(Left, rows + 2, "1", Ink.Axis);
        if (tests > 1)
        {
            canvas.WriteRight(Left + columns - 1, rows + 2, tests.ToString(CultureInfo.InvariantCulture), Ink.Axis);
        }

        canvas.Write(Left + (columns / 2) - 2, rows + 2, "tests", Ink.Axis);
        if (test > 0)
        {
            canvas.Put(ColumnOf(test, tests, columns), rows + 1, glyphs.Here, Ink.Selected);
        }
    }

    // The risk stays as it is from one test to the next: every curve is a line of steps, and where tests stand apart a mark of the curve stands at each of them.
    private static void Curves(TextCanvas canvas, IReadOnlyList<RiskPoint> points, int rows, int columns, GlyphSet glyphs)
    {
        Steps(canvas, points, p => p.AtMost, rows, columns, glyphs, glyphs.Explored, glyphs.Explored, Ink.Axis);
        Steps(canvas, points, p => p.AtLeast, rows, columns, glyphs, glyphs.Explored, glyphs.Explored, Ink.Axis);
        // In plain signs the lines of the curves and of the bounds would look alike.
        bool isTold = glyphs.Across != glyphs.Explored;
        Steps(canvas, points, p => p.Independent, rows, columns, glyphs, isTold ? glyphs.Across : glyphs.Mean, glyphs.Mean, Ink.Mean);
        if (points.All(p => p.Corrected is not null))
        {
            Steps(canvas, points, p => p.Corrected!.Value.AtLeastOne, rows, columns, glyphs, isTold ? glyphs.Across : glyphs.Survivor, glyphs.Survivor, Ink.Survivor);
        }
    }

    private static void Steps(TextCanvas canvas, IReadOnlyList<RiskPoint> points, Func<RiskPoint, double> risk, int rows, int columns, GlyphSet glyphs, string line, string mark, Ink ink)
    {
        int before = -1, test = 0;
        for (int x = Left; x < Left + columns; x++)
        {
            bool isTest = false;
            while (test < points.Count && ColumnOf(test + 1, points.Count, columns) <= x)
            {
                test++;
                isTest = true;
            }

            int y = 1 + RowOf(risk(points[test - 1]), rows);
            int from = before < 0 ? y : Math.Min(y, before) + 1, to = before < 0 ? y : Math.Max(y, before) - 1;
            for (int rise = from; rise <= to; rise++)
            {
                canvas.Put(x, rise, glyphs.Upright, ink);
            }

            canvas.Put(x, y, isTest ? mark : line, ink);
            before = y;
        }
    }

    private static string Legend(IReadOnlyList<RiskPoint> points, GlyphSet glyphs) =>
        $"{glyphs.Mean} without correction (independent tests)  {glyphs.Explored} its bounds (any dependence)"
        + (points[^1].Corrected is { } corrected ? $"  {glyphs.Survivor} with the correction, {(corrected.IsExact ? "exactly" : "at most")}" : "  corrected: none over several families");

    private static int ColumnOf(int test, int tests, int columns) => Left + (tests == 1 ? 0 : (int)Math.Round((test - 1.0) * (columns - 1) / (tests - 1)));

    private static int RowOf(double risk, int rows) => (int)Math.Round((1 - Math.Clamp(risk, 0, 1)) * (rows - 1));
}
