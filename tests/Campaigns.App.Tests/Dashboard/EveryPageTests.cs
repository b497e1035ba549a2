using Campaigns.App.Dashboard.Pages;
using Campaigns.Domain;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>What holds on every page, whichever there are.</summary>
[Collection(ScreenTests.Name)]
public sealed class EveryPageTests
{
    public static TheoryData<string> Campaigns => ["bh", "families", "stream"];

    [Theory]
    [MemberData(nameof(Campaigns))]
    public void Pages_are_filled_anew_at_every_size_and_back(string kind)
    {
        CampaignStanding standing = Standing(kind);
        using TestScreen screen = new(200, 60, SampleCampaigns.Source(standing));
        foreach ((string name, _) in PageList.All)
        {
            screen.Resize(200, 60).Turn(name).Press(Key.M);
            string large = screen.Text;
            foreach ((int width, int height) in new[] { (160, 50), (120, 40), (110, 30), (109, 31), (80, 24), (60, 16), (40, 10), (20, 4), (1, 1), (40, 10), (80, 24), (120, 40) })
            {
                screen.Resize(width, height);
                Assert.Equal(height, screen.Lines.Count);
                Assert.All(screen.Lines, line => Assert.True(line.Length <= width));
            }

            Assert.Equal(large, screen.Resize(200, 60).Text);
        }
    }

    [Theory]
    [MemberData(nameof(Campaigns))]
    public void Pages_of_ascii_signs_hold_nothing_else(string kind)
    {
        foreach ((int width, int height) in new[] { (80, 24), (120, 40) })
        {
            using TestScreen screen = new(width, height, SampleCampaigns.Source(Plain(Standing(kind))), ascii: true);
            foreach ((string name, _) in PageList.All)
            {
                screen.Turn(name).Press(Key.M, new Key('+'));
                for (int view = 0; view < 4; view++)
                {
                    Assert.DoesNotContain(screen.Text, c => c > '~');
                    screen.Press(Key.N);
                }

                screen.Press(Key.Esc);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Campaigns))]
    public void Pages_send_only_the_sixteen_colours_and_none_where_none_are_wanted(string kind)
    {
        CampaignStanding standing = Standing(kind);
        using (TestScreen plain = new(120, 40, SampleCampaigns.Source(standing), colour: false))
        {
            foreach ((string name, _) in PageList.All)
            {
                plain.Turn(name).Press(new Key('+'));
                Assert.DoesNotMatch("\u001b\\[[0-9;]*(3[0-7]|4[0-7]|9[0-7]|10[0-7]|38;|48;)m", plain.Sent);
                plain.Press(Key.Esc);
            }
        }

        using TestScreen coloured = new(120, 40, SampleCampaigns.Source(standing));
        foreach ((string name, _) in PageList.All)
        {
            coloured.Turn(name);
            Assert.DoesNotMatch("\u001b\\[[0-9;]*[34]8;", coloured.Sent);
        }
    }

    [Fact]
    public void The_same_page_says_the_same_with_and_without_colour()
    {
        CampaignStanding standing = SampleCampaigns.InFamilies();
        using TestScreen coloured = new(120, 40, SampleCampaigns.Source(standing));
        List<string> screens = [.. PageList.All.Select(p => coloured.Turn(p.Name).Text)];
        using TestScreen plain = new(120, 40, SampleCampaigns.Source(standing), colour: false);
        Assert.Equal(screens, PageList.All.Select(p => plain.Turn(p.Name).Text));
    }

    private static CampaignStanding Standing(string kind) => kind switch
    {
        "families" => SampleCampaigns.InFamilies(),
        "stream" => SampleCampaigns.InStream(),
        _ => SampleCampaigns.By(kind),
    };

    // Titles are the user's, in any script.
    private static CampaignStanding Plain(CampaignStanding standing) =>
        standing with { Experiments = [.. standing.Experiments.Select(e => e with { Plan = e.Plan with { Title = "Blend" } })] };
}
