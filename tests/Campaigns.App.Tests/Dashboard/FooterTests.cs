using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class FooterTests
{
    [Theory]
    [InlineData(1, "Left")]
    [InlineData(5, "Left")]
    [InlineData(6, "Right")]
    [InlineData(13, "Right")]
    [InlineData(18, "+")]
    [InlineData(20, "-")]
    [InlineData(24, "+")]
    [InlineData(29, "/")]
    [InlineData(33, "/")]
    [InlineData(39, "Shift+m")]
    [InlineData(16, null)]
    [InlineData(79, null)]
    public void A_cell_stands_for_the_one_key_that_is_named_there(int at, string? name) =>
        Assert.Equal(name, KeysPainter.NameAt([("Left/Right", "rank"), ("+ -", "level"), ("/", "filter"), ("Shift+m", "all")], 80, at));

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Every_name_in_every_footer_is_a_key(int width, int height)
    {
        using TestScreen screen = new(width, height, SampleCampaigns.Source(SampleCampaigns.InFamilies()));
        foreach ((string name, _) in PageList.All)
        {
            screen.Turn(name);
            string footer = screen.Lines[height - 1];
            Assert.All(screen.Footer.Where(k => k != DashboardPage.TurnKeys), k => Assert.All(k.Key.Length > 1 ? k.Key.Split('/', ' ') : [k.Key], part => Assert.NotNull(KeyNames.Of(part))));
            Assert.Contains(screen.Footer[0].Key, footer, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void A_click_on_a_word_does_what_its_key_does()
    {
        using TestScreen screen = new(120, 40, SampleCampaigns.Source(SampleCampaigns.By("bh")));
        Click("sort");
        Assert.Equal("experiment", screen.Model.SortColumn!.Name);
        Click("reverse");
        Assert.True(screen.Model.IsFalling);
        Click("mark");
        Assert.Equal(1, screen.Model.Marks.Count);
        Click("filter");
        screen.Type("p<0.01");
        Assert.Equal("p<0.01", screen.Model.FilterText);

        // A letter that is clicked is not typed into the filter.
        Click("mark");
        Assert.Equal("p<0.01", screen.Model.FilterText);
        screen.Turn("Ranking").Press(Key.Home);
        Click("Right");
        Assert.Equal(2, screen.Model.Ranking.RankOf(screen.Model.SelectedPosition));
        Click("Left");
        Assert.Equal(1, screen.Model.Ranking.RankOf(screen.Model.SelectedPosition));
        Click("page");
        Assert.Equal(PageList.PlaceOf("Risk"), screen.Model.Page);
        Click("help");
        Assert.Equal(PageList.PlaceOf("Help"), screen.Model.Page);
        Click("back");
        Assert.Equal(PageList.PlaceOf("Risk"), screen.Model.Page);
        Click("quit");
        Assert.True(screen.IsStopped);

        void Click(string word)
        {
            int y = screen.Lines.Count - 1;
            screen.Click(screen.Lines[y].IndexOf(word, StringComparison.Ordinal), y);
        }
    }
}
