using System.Globalization;
using System.Text.RegularExpressions;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Output;
using Campaigns.Domain;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed partial class RankingPageTests
{
    private static readonly Key Plus = new('+');
    private readonly CampaignStanding _standing = SampleCampaigns.By("bh");

    [Fact]
    public void The_pictures_stand_together_on_a_large_screen_and_follow_each_other_on_a_small_one()
    {
        using TestScreen large = new(120, 40, _standing);
        Golden.Match("ranking-together-120x40", large.Turn("Ranking").Text);
        Assert.Equal(large.Text, large.Press(Key.N).Text);
        using TestScreen small = new(80, 24, _standing);
        Golden.Match("ranking-boundaries-80x24", small.Turn("Ranking").Text);
        Golden.Match("ranking-bars-80x24", small.Press(Key.N).Text);
        Golden.Match("ranking-corrections-80x24", small.Press(Key.N).Text);
        Assert.Contains("rank of p", small.Press(Key.N).Text, StringComparison.Ordinal);
        Assert.Contains("under every correction", small.Press(Key.N.WithShift).Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void A_level_that_is_looked_at_says_what_it_would_change_and_that_nothing_is_stored(int width, int height)
    {
        using TestScreen screen = new(width, height, _standing);
        screen.Turn("Ranking").Press(Plus, Plus, Plus, Plus);
        Golden.Match($"ranking-explored-{width}x{height}", screen.Text);
        int would = _standing.Experiments.Count(e => e.AdjustedP is { Value: <= 0.15 });
        string words = Joined(screen, width);
        Match said = Exploration().Match(words);
        Assert.True(said.Success, words);
        Assert.Equal(would, int.Parse(said.Groups["would"].Value, CultureInfo.InvariantCulture));
        Assert.Equal(_standing.SurvivorCount, int.Parse(said.Groups["sealed"].Value, CultureInfo.InvariantCulture));
        Assert.Equal(would - _standing.SurvivorCount, int.Parse(said.Groups["gained"].Value, CultureInfo.InvariantCulture));
        Assert.Contains("│ sealed 0.05  ● explored 0.15", screen.Text, StringComparison.Ordinal);
        Assert.Contains($"{_standing.SurvivorCount} survivors", screen.Text, StringComparison.Ordinal);

        // The sealed one comes back, and Esc quits nothing.
        screen.Press(Key.Esc);
        Assert.DoesNotContain("exploration", screen.Text, StringComparison.Ordinal);
        Assert.False(screen.IsStopped);
    }

    [Fact]
    public void Every_rank_that_is_pointed_at_reads_back_as_the_models()
    {
        using TestScreen screen = new(128, 40, _standing);
        screen.Turn("Ranking").Press(Key.Home);
        for (int rank = 1; rank <= 12; rank++)
        {
            ExperimentResult e = screen.Model.Ranking.At(rank);
            string boundary = NumberText.Screen(0.05 * rank / 48, 3);
            Assert.Contains(FormattableString.Invariant($"{e.Plan.Code} {(e.Survives == true ? "◆ survives" : "◇ does not survive")}: rank {rank}, p {NumberText.P(e.P!.Value)}, adjusted {NumberText.P(e.AdjustedP!.Value)}, boundary {boundary}"), screen.Text, StringComparison.Ordinal);
            screen.Press(Key.CursorRight);
        }
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Survivors_under_every_correction_read_back_as_the_commands(int width, int height)
    {
        using TestScreen screen = new(width, height, _standing);
        screen.Turn("Ranking");
        if (width < 110)
        {
            screen.Press(Key.N, Key.N);
        }

        foreach (CorrectionOutcome outcome in CorrectionsBeside.Of(_standing))
        {
            string name = outcome.IsSealed ? outcome.Key + " (sealed)" : outcome.Key;
            string line = screen.Lines.Single(l => Regex.IsMatch(l, $"[ ▪]{Regex.Escape(name)} +[0-9]+ "));
            Assert.Equal(outcome.SurvivorCount, int.Parse(Regex.Match(line, $"{Regex.Escape(name)} +([0-9]+)").Groups[1].Value, CultureInfo.InvariantCulture));
        }
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Families_are_named_walked_through_and_a_closed_gate_stands_on_its_row(int width, int height)
    {
        using TestScreen screen = new(width, height, SampleCampaigns.InFamilies());
        screen.Turn("Ranking");
        Assert.Contains("Family 1 of 3, films, level 0.03.", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.F, Key.F);
        Assert.Contains("Family 3 of 3, late (! closed: none survives)", screen.Text, StringComparison.Ordinal);
        Golden.Match($"ranking-families-{width}x{height}", screen.Text);
        if (width < 110)
        {
            screen.Press(Key.N, Key.N, Key.N);
            Golden.Match("ranking-gates-80x24", screen.Text);
        }

        Assert.Contains(width < 110 ? "late: ! closed, holm at 0.03, 6 of 12 tested, 0 survive" : "late: ! closed, 6/12 tested, 0 survive", screen.Text, StringComparison.Ordinal);
        Assert.Contains(width < 110 ? "films: open, holm at 0.03" : "films: open, 12/12 tested, 3 survive", screen.Text, StringComparison.Ordinal);
        Assert.Contains("Family 2 of 3, inks", screen.Press(Key.F.WithShift, Key.N).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_stream_shows_the_level_that_each_experiment_was_given()
    {
        CampaignStanding stream = SampleCampaigns.InStream();
        using TestScreen screen = new(130, 40, stream);
        Golden.Match("ranking-stream-130x40", screen.Turn("Ranking").Press(Key.Home).Text);
        ExperimentResult first = screen.Model.Ranking.At(1);
        Assert.Contains($"adjusted {NumberText.P(first.AdjustedP!.Value)}, level given {NumberText.Screen(first.GivenLevel!.Value, 3)}", screen.Text, StringComparison.Ordinal);
        Assert.Equal(screen.Text, screen.Press(Plus).Text);
    }

    [Fact]
    public void The_mouse_points_at_ranks_levels_and_corrections()
    {
        using TestScreen screen = new(120, 40, _standing);
        screen.Turn("Ranking");
        int axis = screen.Lines.ToList().FindIndex(l => l.Contains("rank of p", StringComparison.Ordinal));
        int ruler = screen.Lines.ToList().FindIndex(l => l.Contains("│ sealed 0.05", StringComparison.Ordinal));
        screen.Click(9, axis - 3);
        Assert.Equal(1, screen.Model.Ranking.RankOf(screen.Model.SelectedPosition));
        screen.Wheel(20, axis - 3, down: true);
        Assert.Equal(4, screen.Model.Ranking.RankOf(screen.Model.SelectedPosition));
        screen.Click(7, ruler);
        Assert.Contains("● explored 0.0001", screen.Text, StringComparison.Ordinal);
        screen.Click(screen.Lines[ruler].IndexOf('│', StringComparison.Ordinal), ruler);
        Assert.DoesNotContain("explored", screen.Text, StringComparison.Ordinal);
        int hochberg = screen.Lines.ToList().FindIndex(l => l.Contains("  hochberg ", StringComparison.Ordinal));
        screen.Click(80, hochberg);
        Assert.Contains("f hochberg", screen.Text, StringComparison.Ordinal);
        Assert.Contains("f▪ hochberg", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Keys_draw_boundaries_and_mark_experiments()
    {
        using TestScreen screen = new(80, 24, _standing);
        screen.Turn("Ranking").Press(Key.Home, Key.M);
        Assert.True(screen.Model.Marks.Has(screen.Model.SelectedPosition));
        Assert.Contains("a none, b bonferroni, d holm", screen.Text, StringComparison.Ordinal);

        // c opens the table on a small screen, and points from then on.
        screen.Press(Key.C, Key.C, Key.B, Key.N);
        Assert.Contains("deciding nothing: b bonferroni, d holm", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.Enter);
        Assert.Equal(PageList.PlaceOf("Experiments"), screen.Model.Page);
    }

    [Fact]
    public void A_correction_of_a_newer_program_is_said_to_be_unknown()
    {
        using TestScreen screen = new(120, 40, SampleCampaign.Standing(12, "newer"));
        screen.Turn("Ranking").Press(Plus, Key.C, Key.B, Key.F);
        Assert.Contains("knows no correction named newer", screen.Text, StringComparison.Ordinal);
    }

    private static string Joined(TestScreen screen, int width) => string.Join(" ", screen.Lines.Select(l => width > 110 && l.Length > 71 ? l[..71].Trim() : l.Trim()).Where(l => l.Length > 0));

    [GeneratedRegex("exploration, nothing is stored: at 0\\.15 (?<would>[0-9]+) would survive \\(sealed: (?<sealed>[0-9]+) at 0\\.05\\); \\+ gained (?<gained>[0-9]+): ")]
    private static partial Regex Exploration();
}
