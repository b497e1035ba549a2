using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class NothingCutTests
{
    private const string Cut = "…";

    [Theory]
    [InlineData(20, "the whole of it")]
    [InlineData(15, "the whole of it")]
    [InlineData(14, "all of it")]
    [InlineData(9, "all of it")]
    [InlineData(8, "all")]
    [InlineData(2, "a…")]
    public void Of_several_ways_to_say_it_the_fullest_that_fits_is_taken(int width, string expected) =>
        Assert.Equal(expected, CellText.FirstThatFits(width, Cut, "the whole of it", "all of it", "all"));

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void The_name_of_the_sorted_column_is_whole_beside_its_arrow(int width, int height)
    {
        using TestScreen screen = new(width, height, SampleCampaign.Standing(48));
        int header = screen.Lines.ToList().FindIndex(l => l.StartsWith("experiment ", StringComparison.Ordinal));
        string[] names = screen.Lines[header].Split(' ', StringSplitOptions.RemoveEmptyEntries);
        foreach (ExperimentColumn column in ExperimentColumn.All.Where(c => names.Contains(c.Name)))
        {
            screen.Model.SortBy(column);
            string shown = screen.Press(Key.Home).Lines[header];
            Assert.Contains(column.IsRightAligned ? "▲" + column.Name : column.Name + "▲", shown, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void No_status_is_cut(int width, int height)
    {
        using TestScreen screen = new(width, height, SampleCampaign.Standing(48));
        int header = screen.Lines.ToList().FindIndex(l => l.StartsWith("experiment ", StringComparison.Ordinal));
        int status = screen.Lines[header].IndexOf("status", StringComparison.Ordinal);
        string[] shown = [.. screen.Lines.Skip(header + 1).Take(14).Select(l => l.Length > status ? l[status..].Split('│')[0].Trim() : "")];
        Assert.All(shown, s => Assert.DoesNotContain(Cut, s, StringComparison.Ordinal));
        Assert.Contains("tested !", shown);
        Assert.Contains("incomplete", shown);
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void The_page_of_the_ranking_cuts_nothing_also_while_a_level_is_explored(int width, int height)
    {
        using TestScreen screen = new(width, height, SampleCampaigns.Source(SampleCampaigns.By("bh")));
        screen.Turn("Ranking").Press(Key.Home);
        Assert.DoesNotContain(Cut, screen.Text, StringComparison.Ordinal);
        screen.Press(new Key('+'), new Key('+'), new Key('+'));
        Assert.Contains("explored", screen.Text, StringComparison.Ordinal);
        Assert.DoesNotContain(Cut, screen.Text, StringComparison.Ordinal);
        if (width < 110)
        {
            Assert.DoesNotContain(Cut, screen.Press(Key.N).Text + screen.Press(Key.N).Text, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData(58)]
    [InlineData(79)]
    public void The_picture_of_the_risk_says_whole_why_families_have_no_corrected_curve(int width)
    {
        CampaignStanding families = SampleCampaigns.InFamilies();
        IReadOnlyList<RiskPoint> curve = RiskCurve.Of(families, families.Experiments.ToDictionary(e => e.Plan.Code, e => 1L));
        Assert.Null(curve[^1].Corrected);
        Assert.Contains("corrected: none over several families", RiskCurvePlot.Paint(curve, 1, width, 30, GlyphSet.Full).ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void A_step_has_a_name_in_the_shell_and_one_in_the_dashboard()
    {
        StepNames keys = StepNames.Keys("A");
        Assert.Equal(("'campaigns test A'", "key t"), (StepNames.Commands.Test("A"), keys.Test("A")));
        Assert.Equal(("'campaigns review A'", "key v"), (StepNames.Commands.Review("A"), keys.Review("A")));
        Assert.Equal("key t (Enter first, which opens the campaign)", keys.Test("B"));
    }

    [Fact]
    public void Pictures_of_plain_signs_tell_a_curve_from_its_bounds()
    {
        using TestScreen screen = new(80, 24, SampleCampaigns.Source(SampleCampaigns.By("bh")), ascii: true, page: "Risk");
        string zero = screen.Lines.First(l => l.StartsWith("    0+", StringComparison.Ordinal));
        Assert.DoesNotContain("-", zero, StringComparison.Ordinal);
    }

    [Fact]
    public void A_list_of_columns_keeps_a_cell_before_the_divider()
    {
        DashboardModel model = new(SampleCampaign.Source(SampleCampaign.Standing(48)), SampleCampaign.Code, SampleCampaign.Find);
        ListLayout layout = new(model.Standing.Experiments);
        (ExperimentColumn column, int x, int width) = layout.Place(71)[^1];
        Assert.Equal("status", column.Name);
        Assert.True(x + width <= 71);
    }
}
