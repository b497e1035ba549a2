using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The risk of at least one false positive growing with the tests, in one row of cells: from the count of tests alone, for independent tests if nothing is real.</summary>
public static class RiskSpark
{
    private const string Blocks = "▁▂▃▄▅▆▇█";

    /// <summary>What a cell says.</summary>
    /// <param name="glyphs">The signs.</param>
    public static string Key(GlyphSet glyphs) => IsFull(glyphs)
        ? "a cell is a count of tests, its height the risk after them, from none to 100 %"
        : "a cell is a count of tests, its digit the tenths of the risk after them: 0 below 10 %, 9 from 90 % on";

    /// <summary>The picture without correction.</summary>
    /// <param name="tests">Tests so far, 0 or more.</param>
    /// <param name="level">The level of each.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    /// <returns>At most <paramref name="width"/> cells, no more than there are tests; the last one stands for all of them.</returns>
    public static string Of(int tests, SignificanceLevel level, int width, GlyphSet glyphs)
    {
        int cells = Math.Clamp(width, 0, Math.Max(0, tests));
        return string.Concat(Enumerable.Range(1, cells).Select(cell => Sign(FamilyRisk.AtLeastOneIfIndependent(TestsAt(cell, cells, tests), level), glyphs)));
    }

    /// <summary>The picture of a risk that does not grow.</summary>
    /// <param name="tests">Tests so far, 0 or more.</param>
    /// <param name="risk">The risk, from 0 to 1.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static string Held(int tests, double risk, int width, GlyphSet glyphs) =>
        string.Concat(Enumerable.Repeat(Sign(risk, glyphs), Math.Clamp(width, 0, Math.Max(0, tests))));

    /// <summary>The tests for which a cell stands.</summary>
    private static int TestsAt(int cell, int cells, int tests) => (int)Math.Ceiling((double)cell * tests / cells);

    private static string Sign(double risk, GlyphSet glyphs) => IsFull(glyphs)
        ? Blocks[Math.Min(Blocks.Length - 1, (int)(risk * Blocks.Length))].ToString()
        : Math.Min(9, (int)(risk * 10)).ToString(CultureInfo.InvariantCulture);

    private static bool IsFull(GlyphSet glyphs) => glyphs.HasDots;
}
