using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Dashboard;

public sealed class RiskSparkTests
{
    private const string Blocks = "▁▂▃▄▅▆▇█";

    [Theory]
    [InlineData(1, 0.05, 10)]
    [InlineData(7, 0.05, 10)]
    [InlineData(40, 0.05, 10)]
    [InlineData(100_000, 0.001, 24)]
    public void Every_cell_is_the_risk_after_the_tests_that_it_stands_for(int tests, double level, int width)
    {
        string full = RiskSpark.Of(tests, new SignificanceLevel(level), width, GlyphSet.Full), plain = RiskSpark.Of(tests, new SignificanceLevel(level), width, GlyphSet.Ascii);
        int cells = Math.Min(tests, width);
        Assert.Equal((cells, cells), (full.Length, plain.Length));
        for (int cell = 1; cell <= cells; cell++)
        {
            int so = (int)Math.Ceiling((double)cell * tests / cells);
            double risk = 1 - Math.Exp(so * Math.Log(1 - level));
            Assert.Equal(Math.Min(7, Math.Floor(8 * risk)), Blocks.IndexOf(full[cell - 1], StringComparison.Ordinal));
            Assert.Equal(Math.Min(9, Math.Floor(10 * risk)), int.Parse(plain.AsSpan(cell - 1, 1), CultureInfo.InvariantCulture));
        }
    }

    [Theory]
    [InlineData(0, 10)]
    [InlineData(10, 0)]
    [InlineData(10, -3)]
    public void Without_tests_or_room_nothing_is_drawn(int tests, int width)
    {
        Assert.Equal("", RiskSpark.Of(tests, new SignificanceLevel(0.05), width, GlyphSet.Full));
        Assert.Equal("", RiskSpark.Held(tests, 0.05, width, GlyphSet.Full));
    }

    [Theory]
    [InlineData(80)]
    [InlineData(79)]
    [InlineData(120)]
    public void The_names_of_seven_pages_fit_eighty_cells_and_are_hit_where_they_stand(int width)
    {
        string[] names = ["Programme", "Experiments", "Ranking", "Risk", "Reviews", "Ledger", "Help"];
        PageStrip strip = new(names);
        string line = strip.Paint(6, width).ToString();
        Assert.Contains("[7 Help]", line, StringComparison.Ordinal);
        for (int i = 0; i < names.Length; i++)
        {
            Assert.Equal(i, strip.PageAt(line.IndexOf(names[i], StringComparison.Ordinal)));
        }

        Assert.Null(strip.PageAt(width));
    }
}
