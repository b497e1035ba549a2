using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Tests.Dashboard;

public sealed class PictureTests
{
    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Observations_of_every_group_stand_on_one_axis(bool ascii)
    {
        ExperimentDetail detail = SampleCampaign.Detail(SampleCampaign.Standing(6).Experiments[1]);
        Golden.Match("observations-" + (ascii ? "ascii" : "full"), ObservationPlot.Paint(detail.Groups, 60, Glyphs(ascii)).ToString());
    }

    [Theory]
    [InlineData("rising", false, false)]
    [InlineData("rising", true, false)]
    [InlineData("rising", false, true)]
    [InlineData("unbounded", false, false)]
    public void Ranked_p_values_stand_beside_their_boundary(string correction, bool ascii, bool isNear)
    {
        Ranking ranking = new(SampleCampaign.Standing(48, correction), SampleCampaign.Find(correction));
        string name = $"ranking-{correction}{(ascii ? "-ascii" : "")}{(isNear ? "-near" : "")}";
        Golden.Match(name, RankingPlot.BoundaryText(ranking) + "\n" + RankingPlot.Paint(ranking, 3, isNear, 78, 18, Glyphs(ascii)));
    }

    [Fact]
    public void Every_observation_is_a_dot()
    {
        double[] values = [.. Enumerable.Range(0, 40).Select(i => (double)(i % 10))];
        TextCanvas canvas = ObservationPlot.Paint([Group("a", values)], 70, GlyphSet.Full);
        int dots = canvas.ToString().Where(c => c is >= '\u2800' and <= '\u28FF').Sum(c => System.Numerics.BitOperations.PopCount((uint)(c - '\u2800')));
        Assert.Equal(values.Length, dots);
        Assert.Contains("a dot is a value", canvas.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Heaps_higher_than_their_place_say_how_many_a_dot_stands_for()
    {
        string text = ObservationPlot.Paint([Group("a", [.. Enumerable.Repeat(5.0, 100), 7])], 70, GlyphSet.Full).ToString();
        Assert.Contains("a dot is up to 9 values", text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1e308)]
    [InlineData(5e-324)]
    [InlineData(-1e9)]
    public void Values_that_are_all_the_same_can_be_drawn(double value)
    {
        string text = ObservationPlot.Paint([Group("a", [value, value])], 60, GlyphSet.Full).ToString();
        Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
        Assert.DoesNotContain("∞", text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(-1.7e308, 1.7e308)]
    [InlineData(1e16, 10000000000000002)]
    [InlineData(0, 5e-324)]
    [InlineData(1e-320, 1e300)]
    public void The_whole_range_of_doubles_can_be_drawn(double low, double high)
    {
        string text = ObservationPlot.Paint([Group("a", [low, high])], 60, GlyphSet.Full).ToString();
        Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
        Assert.DoesNotContain("Infinity", text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(0, 0)]
    [InlineData(1, 1)]
    [InlineData(30, 6)]
    [InlineData(23, 40)]
    [InlineData(300, 100)]
    public void Every_size_can_be_painted(int width, int height)
    {
        CampaignStanding standing = SampleCampaign.Standing(48);
        DashboardModel model = new(SampleCampaign.Source(standing), SampleCampaign.Code, SampleCampaign.Find);
        Assert.Equal((width, height), Size(RankingPlot.Paint(model.Ranking, 1, false, width, height, GlyphSet.Full)));
        Assert.Equal((width, height), Size(ListPainter.Paint(model, new ListLayout(standing.Experiments), 0, width, height, GlyphSet.Full)));
        Assert.Equal(width, DetailPainter.Paint(model.SelectedDetail()!, model.Standing, model.Heading, width, GlyphSet.Full).Width);
        Assert.Equal(width, HeadingPainter.Paint(model.Heading, width, GlyphSet.Full).Width);
        Assert.Equal(width, HelpPainter.Paint(model, null, width).Width);
    }

    [Fact]
    public void Survivors_are_told_by_their_sign_and_not_by_ink_alone()
    {
        Ranking ranking = new(SampleCampaign.Standing(48), new RisingCorrection());
        string text = RankingPlot.Paint(ranking, 0, false, 110, 30, GlyphSet.Ascii).ToString();
        int below = text.Count(c => c == 'v'), survivors = text.Count(c => c == '#');
        Assert.Equal(ranking.SurvivorCount, survivors + below);
        Assert.Equal(ranking.Count - ranking.SurvivorCount, text.Split('\n')[..28].Sum(line => line.Count(c => c == 'x')));
    }

    [Fact]
    public void Ascii_pictures_hold_ascii_alone()
    {
        DashboardModel model = new(SampleCampaign.Source(SampleCampaign.Standing(3)), SampleCampaign.Code, SampleCampaign.Find);
        string all = RankingPlot.Paint(model.Ranking, 1, false, 80, 20, GlyphSet.Ascii) + string.Concat(RankingPlot.Key(model.Ranking, GlyphSet.Ascii))
            + DetailPainter.Paint(model.SelectedDetail()!, model.Standing, model.Heading, 80, GlyphSet.Ascii) + HelpPainter.Paint(model, null, 80)
            + ListPainter.Paint(model, new ListLayout(model.Standing.Experiments), 0, 80, 10, GlyphSet.Ascii);
        Assert.DoesNotContain(all, c => c > '~');
    }

    [Theory]
    [InlineData("plain", 5)]
    [InlineData("粘度", 4)]
    [InlineData("e\u0301", 1)]
    [InlineData("\u200B", 8)]
    [InlineData("a\u001b", 7)]
    public void Text_is_measured_in_cells(string text, int cells) => Assert.Equal(cells, CellText.Width(text));

    [Theory]
    [InlineData("abcdef", 4, "abc…")]
    [InlineData("粘度計", 4, "粘…")]
    [InlineData("abc", 3, "abc")]
    [InlineData("abc", 0, "")]
    public void A_cut_is_marked(string text, int width, string cut) => Assert.Equal(cut, CellText.Fit(text, width, "…"));

    [Theory]
    [InlineData(0, 5, 100, 10, 0)]
    [InlineData(0, 10, 100, 10, 1)]
    [InlineData(50, 20, 100, 10, 20)]
    [InlineData(95, 99, 100, 10, 90)]
    [InlineData(7, -1, 0, 10, 0)]
    public void The_selected_row_is_always_seen(int top, int row, int count, int height, int first) =>
        Assert.Equal(first, RowWindow.Follow(top, row, count, height));

    [Fact]
    public void Every_error_rate_and_dependence_has_words()
    {
        Assert.All(Enum.GetValues<ErrorRate>(), rate => Assert.NotEmpty(CampaignHeading.ErrorRateWords(rate)));
        Assert.All(Enum.GetValues<Dependence>(), dependence => Assert.NotEmpty(CampaignHeading.DependenceWords(dependence)));
    }

    private static GroupDetail Group(string label, double[] values) =>
        new(label, false, values, new GroupSummary(values.Length, values[0], null, null, null, null));

    private static GlyphSet Glyphs(bool ascii) => ascii ? GlyphSet.Ascii : GlyphSet.Full;

    private static (int, int) Size(TextCanvas canvas) => (canvas.Width, canvas.Height);
}
