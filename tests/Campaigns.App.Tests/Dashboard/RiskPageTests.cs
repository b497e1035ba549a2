using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Output;
using Campaigns.Domain;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class RiskPageTests
{
    private readonly CampaignStanding _standing = SampleCampaigns.By("bh");

    [Fact]
    public void Risk_words_and_bounds_stand_together_on_a_large_screen_and_follow_each_other_on_a_small_one()
    {
        using TestScreen large = new(120, 40, SampleCampaigns.Source(_standing));
        Golden.Match("risk-together-120x40", large.Turn("Risk").Press(Key.M.WithShift).Text);
        using TestScreen small = new(80, 24, SampleCampaigns.Source(_standing));
        Golden.Match("risk-curve-80x24", small.Turn("Risk").Press(Key.End).Text);
        Golden.Match("risk-marked-80x24", small.Press(Key.M, Key.N).Text);
        Golden.Match("risk-words-80x24", small.Press(Key.N).Text);
        Assert.Contains("lines 2 to", small.Press(Key.CursorDown).Text, StringComparison.Ordinal);
        Assert.Contains("if nothing is real", small.Press(Key.N).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void The_test_pointed_at_reads_back_as_the_models()
    {
        SampleSource source = SampleCampaigns.Source(_standing);
        using TestScreen screen = new(120, 40, source);
        screen.Turn("Risk").Press(Key.Home);
        foreach (RiskPoint point in source.Risk)
        {
            string text = string.Join(" ", screen.Lines.Select(l => l.Length > 57 ? l[..57].Trim() : l.Trim()));
            Assert.Contains(FormattableString.Invariant($"Test {point.Tests} of {source.Risk.Count}, {point.Experiment.Plan.Code} (p {NumberText.P(point.Experiment.P!.Value)}): risk "), text, StringComparison.Ordinal);
            double shown = double.Parse(text[(text.IndexOf("): risk ", StringComparison.Ordinal) + 8)..].Split(' ')[0], CultureInfo.InvariantCulture);
            Assert.Equal(100 * (1 - Math.Pow(0.95, point.Tests)), shown, 0.0501);
            Assert.Contains(FormattableString.Invariant($"{point.Hits} {(point.Hits == 1 ? "hit" : "hits")} so far, {point.Survivors} surviv"), text, StringComparison.Ordinal);
            screen.Press(Key.CursorRight);
        }
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Marks_change_the_bound_at_once(int width, int height)
    {
        using TestScreen screen = new(width, height, SampleCampaigns.Source(_standing), colour: false);
        screen.Turn("Risk").Press(Key.Home);
        if (width < 110)
        {
            screen.Press(Key.N);
        }

        Assert.Contains("Nothing is marked", screen.Text, StringComparison.Ordinal);
        for (int i = 1; i <= 6; i++)
        {
            screen.Press(Key.M);
            MarkedBound bound = screen.Model.Marks.Bound;
            Assert.Equal(i, bound.Marked);
            Assert.Contains(FormattableString.Invariant($"marked {i}: at least {bound.RealAtLeast} real, at most {bound.FalseAtMost} false"), screen.Text, StringComparison.Ordinal);
            Assert.Contains("▪ " + string.Join(" ", screen.Model.Marks.Positions.Order().Select(p => _standing.Experiments[p].Plan.Code)), screen.Text, StringComparison.Ordinal);
            screen.Press(Key.CursorRight);
        }

        string notes = string.Join(' ', screen.Lines.Select(l => width < 110 ? l.Trim() : l.Length > 58 ? l[58..].Trim() : ""));
        Assert.Contains("inequality holds for the true nulls", notes, StringComparison.Ordinal);
    }

    [Fact]
    public void The_picture_of_the_marked_names_the_experiment_pointed_at_where_no_other_picture_does()
    {
        using TestScreen screen = new(80, 24, SampleCampaigns.Source(_standing));
        screen.Turn("Risk").Press(Key.Home, Key.N);
        for (int i = 0; i < 8; i++)
        {
            ExperimentResult e = screen.Model.Selected!;
            int rank = screen.Model.Ranking.RankOf(screen.Model.SelectedPosition);
            Assert.Contains(FormattableString.Invariant($"▲ {e.Plan.Code}: rank {rank} of 40{(rank > 20 ? " (z shows it)" : "")}, p {NumberText.P(e.P!.Value)}; not marked, m marks it"), screen.Text, StringComparison.Ordinal);
            Assert.Equal(rank <= 20, screen.Lines.Any(l => l.Contains("└─", StringComparison.Ordinal) && l.Contains('▲', StringComparison.Ordinal)));
            screen.Press(Key.CursorRight);
        }

        Assert.Contains("; marked, m takes the mark off", screen.Press(Key.M).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Between_tests_the_risk_is_drawn_as_it_stays()
    {
        RiskPoint[] few = [.. SampleCampaigns.Source(_standing).Risk.Take(3)];
        TextCanvas canvas = RiskCurvePlot.Paint(few, 1, 80, 24, GlyphSet.Full);
        string[] rows = canvas.ToString().Split('\n');
        for (int x = 6; x < 79; x++)
        {
            Assert.Contains(Enumerable.Range(1, 18), y => canvas.InkAt(x, y) == Ink.Mean);
        }

        Assert.Equal(3, rows.Take(19).Sum(r => r.Count(c => c == '●')));
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Decisions_stand_with_the_level_that_each_was_given(int width, int height)
    {
        CampaignStanding stream = SampleCampaigns.InStream();
        using TestScreen screen = new(width, height, SampleCampaigns.Source(stream));
        screen.Turn("Risk");
        if (width < 110)
        {
            screen.Press(Key.N, Key.N, Key.N);
        }

        Golden.Match($"risk-stream-{width}x{height}", screen.Text);
        int shown = 0;
        foreach (ExperimentResult e in stream.Experiments)
        {
            string p = e.Entry!.P is { } known ? NumberText.P(known) : "–";
            string verdict = e.Entry.Survives switch { true => "◆ survives", false => "◇ does not", null => "○ runs" };
            string row = $" {e.Plan.Code} ";
            if (screen.Lines.FirstOrDefault(l => l.Contains(row, StringComparison.Ordinal) && l.Contains(verdict, StringComparison.Ordinal)) is { } line)
            {
                Assert.Contains($"{NumberText.Screen(e.Entry.Level, 4)}", line, StringComparison.Ordinal);
                Assert.Contains(p, line, StringComparison.Ordinal);
                shown++;
            }
        }

        Assert.True(shown >= 8, screen.Text);
        Assert.Contains(FormattableString.Invariant($"24 given a level, 20 decided, {stream.SurvivorCount} survive"), screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void The_mouse_points_at_tests_and_decisions()
    {
        SampleSource source = SampleCampaigns.Source(SampleCampaigns.InStream());
        using TestScreen screen = new(120, 40, source);
        screen.Turn("Risk");
        int axis = screen.Lines.ToList().FindIndex(l => l.Contains("tests  ", StringComparison.Ordinal) && l.TrimStart().StartsWith("1 ", StringComparison.Ordinal));
        screen.Click(6, axis - 3);
        Assert.Same(source.Risk[0].Experiment, screen.Model.Selected);
        screen.Wheel(10, axis - 3, down: true);
        Assert.Same(source.Risk[3].Experiment, screen.Model.Selected);
        screen.Press(Key.Home);
        int decisions = screen.Lines.ToList().FindIndex(l => l.Contains("place experiment", StringComparison.Ordinal));
        string code = screen.Lines[decisions + 1][60..].Split(' ', StringSplitOptions.RemoveEmptyEntries)[1];
        screen.Click(90, decisions + 1);
        Assert.Equal(code, screen.Model.Selected!.Plan.Code);
        screen.Press(Key.Enter);
        Assert.Equal(PageList.PlaceOf("Experiments"), screen.Model.Page);
    }

    [Fact]
    public void Nothing_tested_and_nothing_planned_are_said_in_words()
    {
        using TestScreen untested = new(120, 40, SampleCampaigns.Source(SampleCampaign.Standing(12, "bh", status: _ => ExperimentStatus.Planned)));
        untested.Turn("Risk").Press(Key.CursorRight, Key.M, Key.M.WithShift, Key.Z);
        Assert.Contains("Nothing is tested yet: nothing is risked.", untested.Text, StringComparison.Ordinal);
        Assert.Contains("marked 1: at least 0 real, at most 1 false", untested.Text, StringComparison.Ordinal);
        using TestScreen empty = new(80, 24, SampleCampaigns.Source(SampleCampaign.Standing(0, "bh")));
        empty.Turn("Risk").Press(Key.CursorRight, Key.M, Key.N, Key.M.WithShift, Key.N, Key.N, Key.End, Key.Enter);
        Assert.False(empty.IsStopped);
    }

    [Theory]
    [InlineData(1, 0, 10, 1)]
    [InlineData(100, 6, 107, 1)]
    [InlineData(100, 105, 107, 100)]
    [InlineData(100, 300, 107, 100)]
    [InlineData(0, 5, 107, 0)]
    public void A_column_stands_for_the_nearest_test(int tests, int x, int width, int test) => Assert.Equal(test, RiskCurvePlot.TestAt(tests, width, x));
}
