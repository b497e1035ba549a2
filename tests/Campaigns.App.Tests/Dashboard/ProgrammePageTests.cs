using System.Globalization;
using System.Text.RegularExpressions;
using Campaigns.App.Dashboard.Pages;
using Campaigns.Catalog;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed partial class ProgrammePageTests
{
    private const string Gloss = "GLOSS-7", Feed = "FEED-PELLETS-2026";

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void The_programme_looks_as_kept(int width, int height)
    {
        using TestScreen screen = new(width, height, Source(), page: "Programme");
        Golden.Match($"programme-{width}x{height}", screen.Text);
        Golden.Match($"programme-waiting-{width}x{height}", screen.Press(Key.CursorDown).Text);
        Golden.Match($"programme-help-{width}x{height}", screen.Press(Key.F1).Text);
    }

    [Fact]
    public void In_plain_signs_the_risk_is_shown_as_digits()
    {
        using TestScreen screen = new(80, 24, Source(), ascii: true, colour: false, page: "Programme");
        Golden.Match("programme-80x24-ascii", screen.Text);
        Assert.DoesNotContain(screen.Text, c => c > '~');
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    [InlineData(200, 50)]
    public void Every_figure_of_a_campaign_reads_back_as_the_models(int width, int height)
    {
        SampleSource source = Source();
        using TestScreen screen = new(width, height, source, page: "Programme");
        IReadOnlyDictionary<string, WaitingData> waiting = source.Waiting();
        int first = screen.Lines.ToList().FindIndex(l => l.StartsWith("campaign", StringComparison.Ordinal)) + 1;
        foreach ((CampaignOverview c, int row) in source.Campaigns().Select((c, i) => (c, i)))
        {
            string line = screen.Lines[first + row];
            Assert.StartsWith(c.Campaign.Code[..7], line, StringComparison.Ordinal);
            Match figures = Figures().Match(line);
            Assert.True(figures.Success, line);
            Assert.Equal(c.Campaign.Level.Value, double.Parse(figures.Groups["level"].Value, CultureInfo.InvariantCulture));
            Assert.Equal(c.Campaign.Correction, figures.Groups["by"].Value);
            Assert.Equal(
                [c.TestedCount, waiting[c.Campaign.Code].Planned, c.UncorrectedCount, c.SurvivorCount],
                new[] { "tested", "planned", "hits", "survive" }.Select(g => int.Parse(figures.Groups[g].Value, CultureInfo.InvariantCulture)));
            double risk = 1 - Math.Pow(1 - c.Campaign.Level.Value, c.TestedCount);
            if (c.TestedCount > 0)
            {
                Assert.Equal(100 * risk, double.Parse(figures.Groups["risk"].Value, CultureInfo.InvariantCulture), 0.051);
            }
        }
    }

    [Fact]
    public void Enter_opens_the_campaign_and_turns_to_its_experiments()
    {
        using TestScreen screen = new(80, 24, Source(), page: "Programme");
        screen.Press(Key.End, Key.CursorUp, Key.Enter);
        Assert.Equal((Gloss, PageList.PlaceOf("Experiments")), (screen.Model.Standing.Campaign.Code, screen.Model.Page));
        screen.Turn("Programme");
        Assert.Contains(screen.Lines, l => l.StartsWith(Gloss + " ", StringComparison.Ordinal) && l.Contains('▪', StringComparison.Ordinal));
    }

    [Fact]
    public void The_mouse_opens_a_campaign_that_is_clicked_twice()
    {
        using TestScreen screen = new(80, 24, Source(), page: "Programme");
        int row = screen.Lines.ToList().FindIndex(l => l.StartsWith(Gloss, StringComparison.Ordinal));
        screen.Click(3, row);
        Assert.Equal(PageList.PlaceOf("Programme"), screen.Model.Page);
        screen.Click(3, row);
        Assert.Equal(Gloss, screen.Model.Standing.Campaign.Code);
    }

    [Fact]
    public void What_waits_is_said_for_the_programme_and_for_each_campaign()
    {
        using TestScreen screen = new(120, 40, Source(), page: "Programme");
        string all = Flat(screen.Text);
        Assert.Contains("2 of 3 campaigns need attention: data not tested in 1 (5 experiments), new test awaited in 1 (2 experiments), review out of date in 1, plan still open in 1. To know: 3 withdrawn, 1 plan amendment.", all, StringComparison.Ordinal);
        Assert.Contains("Nothing waits: what has data is tested", all, StringComparison.Ordinal);
        string gloss = Flat(screen.Press(Key.CursorDown).Text);
        Assert.Contains("! The plan is still open", gloss, StringComparison.Ordinal);
        Assert.Contains("! Data not tested: 5 experiments with data and no test, 4 of them with at least as many values as planned", gloss, StringComparison.Ordinal);
        string feed = Flat(screen.Press(Key.CursorDown).Text);
        Assert.Contains("is out of date: 2 experiments await a new test", feed, StringComparison.Ordinal);
        Assert.Contains("Withdrawn after their data came: 2 experiment", feed, StringComparison.Ordinal);
    }

    [Fact]
    public void Checks_are_made_for_the_survivors_of_the_open_campaign_when_asked_and_on_the_side()
    {
        using ManualResetEventSlim go = new();
        SampleSource source = Source((progress, stop) =>
        {
            progress(new WorkProgress("checking", 3, 8, "survivors"));
            go.Wait(stop);
        });
        using TestScreen screen = new(120, 40, source, page: "Programme");
        Assert.Contains("Key c makes them for the 8 survivors of PRIMER-26", Flat(screen.Text), StringComparison.Ordinal);
        screen.Press(Key.C);
        Until(screen, "checking: 3 of 8 survivors; Esc stops");
        Assert.Contains("Esc stop the checks", screen.Lines[^1], StringComparison.Ordinal);

        // The screen obeys meanwhile.
        screen.Press(Key.CursorDown);
        Assert.Contains("GLOSS-7: ", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.CursorUp);
        go.Set();
        Until(screen, "Checks made for the 8 survivors of PRIMER-26 and for no other experiment");
    }

    [Fact]
    public void Checks_that_are_stopped_say_nothing()
    {
        SampleSource source = Source((_, stop) => stop.WaitHandle.WaitOne());
        using TestScreen screen = new(120, 40, source, page: "Programme");
        screen.Press(Key.C);
        Assert.Contains("stop the checks", screen.Lines[^1], StringComparison.Ordinal);
        screen.Press(Key.Esc);
        Until(screen, "Key c makes them");
        Assert.DoesNotContain("Checks made", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_programme_that_is_not_looked_at_is_not_read()
    {
        int reads = 0;
        SampleSource source = Source();
        using TestScreen screen = new(80, 24, new CountingSource(source, () => reads++));
        int before = reads;
        screen.Press(Key.CursorDown, Key.F5).Turn("Ranking");
        Assert.Equal(before, reads);
        screen.Turn("Programme").Press(Key.CursorDown, Key.CursorUp);
        Assert.Equal(before + 1, reads);
        screen.Press(Key.F5);
        Assert.Equal(before + 2, reads);
    }

    [Theory]
    [InlineData(1, 1)]
    [InlineData(20, 5)]
    [InlineData(41, 9)]
    [InlineData(79, 23)]
    [InlineData(300, 90)]
    public void No_size_stops_it(int width, int height)
    {
        using TestScreen screen = new(80, 24, Source(), page: "Programme");
        string before = screen.Text;
        screen.Resize(width, height).Press(Key.CursorDown, Key.PageDown, Key.Space, Key.Tab, Key.End, Key.Esc, Key.Home);
        Assert.Contains("PRIMER-26", screen.Resize(80, 24).Text, StringComparison.Ordinal);
        Assert.Equal(before.Split('\n').Length, screen.Lines.Count + 1);
    }

    [Fact]
    public void Hostile_names_are_shown_and_not_obeyed()
    {
        CampaignStanding hostile = Named(SampleCampaign.Standing(4, "holm"), SampleCampaign.Hostile, SampleCampaign.Hostile);
        using TestScreen screen = new(120, 40, new SampleSource(hostile), page: "Programme");
        Assert.Contains("evil\\u{1B}[31m\\u{202E}gpj_name", screen.Text, StringComparison.Ordinal);
        Assert.DoesNotContain("evil\u001b", screen.Sent, StringComparison.Ordinal);
        Assert.DoesNotContain('\u202e', screen.Sent);
    }

    internal static string Flat(string text) => Blanks().Replace(text, " ");

    /// <summary>The text beside the list in one line; of the whole screen where nothing stands beside it.</summary>
    internal static string Side(TestScreen screen)
    {
        string[] beside = [.. screen.Lines.Where(l => l.Contains('│', StringComparison.Ordinal)).Select(l => l[(l.IndexOf('│', StringComparison.Ordinal) + 1)..])];
        return Flat(beside.Length > 5 ? string.Join(' ', beside) : screen.Text);
    }

    /// <summary>Lets the other thread work until a text is seen.</summary>
    internal static void Until(TestScreen screen, string text)
    {
        for (int i = 0; i < 500; i++)
        {
            screen.Wait(TimeSpan.FromMilliseconds(120));
            if (Side(screen).Contains(text, StringComparison.Ordinal))
            {
                return;
            }

            Thread.Sleep(10);
        }

        Assert.Fail($"'{text}' never came.\n{screen.Text}");
    }

    private static CampaignStanding Named(CampaignStanding standing, string code, string title) =>
        standing with { Campaign = standing.Campaign with { Code = code, Title = title } };

    private static SampleSource Source(Action<Action<WorkProgress>, CancellationToken>? onChecks = null)
    {
        CampaignStanding gloss = Named(SampleCampaign.Standing(20, "holm", status: _ => ExperimentStatus.Ready), Gloss, "Gloss of the spring varnishes, a hundred days out of doors");
        CampaignStanding feed = Named(SampleCampaign.Standing(120, "hommel"), Feed, "飼料 pellets, hardness");
        return new SampleSource(SampleCampaign.Standing(48, "bh"))
        {
            OnChecks = onChecks,
            Unseen = new Dictionary<string, WaitingData> { [Gloss] = new(20, 5, 4) },
            Others =
            [
                gloss with { LastReview = null, Campaign = gloss.Campaign with { SealedAt = null, ErrorRate = Campaigns.Statistics.Corrections.ErrorRate.Familywise } },
                feed with
                {
                    AwaitingNewTest = 2,
                    Withdrawn = new WithdrawnCounts(2, 1, 0),
                    AmendedPlan = new AmendedPlan(1, 2, 1),
                    Campaign = feed.Campaign with { ErrorRate = Campaigns.Statistics.Corrections.ErrorRate.Familywise, Level = new SignificanceLevel(0.025) },
                },
            ],
        };
    }

    [GeneratedRegex(@"(familywise|false-discovery) +(?<level>[0-9.]+) +(?<by>[a-z-]+) +(?<tested>[0-9]+)/(?<planned>[0-9]+) +(?<hits>[0-9]+) +(?<survive>[0-9]+)( +[▁-█]+)? *>?(?<risk>[0-9.]+)?")]
    private static partial Regex Figures();

    [GeneratedRegex(@"\s+")]
    private static partial Regex Blanks();
}
