using System.Globalization;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Paint;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class DashboardScreenTests
{
    private static readonly CampaignStanding Standing = SampleCampaign.Standing(48);

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Pages_look_as_kept(int width, int height)
    {
        using TestScreen screen = new(width, height, Standing);
        Golden.Match($"experiments-{width}x{height}", screen.Text);
        Golden.Match($"detail-{width}x{height}", screen.Press(Key.CursorDown, Key.Enter).Text);
        Golden.Match($"ranking-{width}x{height}", screen.Press(Key.Esc).Turn("Ranking").Text);
        Golden.Match($"help-{width}x{height}", screen.Press(Key.F1).Text);
    }

    [Fact]
    public void Ascii_screens_look_as_kept()
    {
        using TestScreen screen = new(80, 24, SampleCampaign.Standing(3), ascii: true);
        Golden.Match("experiments-80x24-ascii", screen.Text);
        Assert.DoesNotContain(screen.Turn("Ranking").Text, c => c > '~');
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Every_number_in_the_list_reads_back_as_the_models(int width, int height)
    {
        using TestScreen screen = new(width, height, Standing);
        int listWidth = width >= 110 ? width - 48 : width;
        int first = screen.Lines.ToList().FindIndex(line => line.StartsWith("experiment", StringComparison.Ordinal)) + 1;
        int checkedRows = 0;
        for (int row = 0; screen.CellsOf(first + row) is var cells && cells[0] == "E"; row++, checkedRows++)
        {
            ExperimentResult e = Standing.Experiments[row];
            foreach ((ExperimentColumn column, int x, int w) in new ListLayout(Standing.Experiments).Place(listWidth))
            {
                string shown = string.Concat(cells[x..(x + w)]).Trim();
                Check(e, column.Name, shown);
            }
        }

        Assert.True(checkedRows >= 10);
    }

    [Fact]
    public void Every_number_in_the_detail_reads_back_as_the_models()
    {
        using TestScreen screen = new(120, 200, Standing);
        ExperimentDetail detail = SampleCampaign.Detail(Standing.Experiments[1]);
        screen.Press(Key.CursorDown);
        string[] lines = [.. screen.Lines.Select(l => l.Contains('│', StringComparison.Ordinal) ? l[(l.IndexOf('│', StringComparison.Ordinal) + 1)..].Trim() : l)];
        foreach (GroupDetail group in detail.Groups)
        {
            double[] shown = Numbers(lines.Last(l => l.StartsWith(group.Label + " ", StringComparison.Ordinal))[group.Label.Length..]);
            double[] expected = [group.Summary.Count, group.Summary.Mean!.Value, group.Summary.Lower!.Value, group.Summary.Upper!.Value];
            Close(expected, shown);
        }

        VariationLinesAgree(lines, detail);
    }

    [Fact]
    public void Keys_move_sort_filter_and_open()
    {
        using TestScreen screen = new(80, 24, Standing);
        screen.Press(Key.CursorDown, Key.CursorDown);
        Assert.Equal("E3", screen.Model.Selected!.Plan.Code);
        screen.Press(Key.End, Key.CursorDown);
        Assert.Equal("E48", screen.Model.Selected!.Plan.Code);
        Assert.Contains(screen.Lines, l => l.StartsWith("E48 ", StringComparison.Ordinal));
        screen.Press(Key.Home, Key.CursorUp, Key.CursorLeft, Key.CursorRight);
        Assert.Equal("E1", screen.Model.Selected!.Plan.Code);
        screen.Press(Key.S, Key.S);
        Assert.Equal("title", screen.Model.SortColumn!.Name);
        screen.Press(Key.S.WithShift, Key.R);
        Assert.Equal(("experiment", true), (screen.Model.SortColumn!.Name, screen.Model.IsFalling));
        screen.Press(new Key('/')).Type("survives:yes q1?");
        Assert.Equal("survives:yes q1?", screen.Model.FilterText);
        screen.Press(Key.Esc, Key.Esc);
        Assert.Equal("", screen.Model.FilterText);
        screen.Press(Key.Enter);
        Assert.Contains("values by group", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.CursorRight);
        Assert.Contains("lines 1 to", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.PageDown, Key.Esc);
        Assert.Contains(screen.Lines, l => l.StartsWith("experiment▼", StringComparison.Ordinal));
        Assert.False(screen.IsStopped);
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Marked_experiments_carry_a_sign_and_their_bound_stands_below_the_list(int width, int height)
    {
        using TestScreen screen = new(width, height, Standing, colour: false);
        Assert.DoesNotContain("marked ", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.M, Key.CursorDown, Key.CursorDown, Key.M);
        Golden.Match($"marked-{width}x{height}", screen.Text);
        int first = screen.Lines.ToList().FindIndex(line => line.StartsWith("experiment", StringComparison.Ordinal)) + 1;
        Assert.Equal(["▪", " ", "▪"], new[] { 0, 1, 2 }.Select(row => screen.CellsOf(first + row)["experiment".Length]));
        MarkedBound bound = screen.Model.Marks.Bound;
        Assert.Equal(2, bound.Marked);
        Assert.Contains(FormattableString.Invariant($"marked 2: at least {bound.RealAtLeast} real, at most {bound.FalseAtMost} false (95 % confidence)"), screen.Text, StringComparison.Ordinal);

        // The last row can still be reached, and the text of the filter takes the key as a letter.
        screen.Press(Key.End);
        Assert.Contains(screen.Lines, l => l.StartsWith("E48 ", StringComparison.Ordinal));
        screen.Press(new Key('/'), Key.M, Key.Esc, Key.Esc);
        Assert.Equal(2, screen.Model.Marks.Count);
        screen.Press(Key.M.WithShift);
        Assert.Equal(48, screen.Model.Marks.Count);
        Assert.DoesNotContain("marked ", screen.Press(Key.M.WithShift).Text, StringComparison.Ordinal);
        screen.Press(Key.Enter, Key.M);
        Assert.Equal(1, screen.Model.Marks.Count);
    }

    [Fact]
    public void Escape_never_quits_and_q_does()
    {
        using TestScreen screen = new(80, 24, Standing);
        screen.Press(Key.Esc, Key.Esc).Turn("Ranking").Press(Key.Esc, Key.F1, Key.Esc, Key.Esc);
        Assert.False(screen.IsStopped);
        Assert.Equal(PageList.PlaceOf("Ranking"), screen.Model.Page);
        screen.Press(Key.Q);
        Assert.True(screen.IsStopped);
    }

    [Fact]
    public void Paging_past_slow_experiments_computes_none_until_the_list_stands_still()
    {
        CampaignStanding sample = SampleCampaign.Standing(12, withoutResult: 0), slow = sample with { Experiments = [.. sample.Experiments.Select(e => e with { Plan = e.Plan with { Test = "permutation" } })] };
        List<string> computed = [];
        using TestScreen screen = new(120, 40, new SampleSource(slow) { OnDetail = computed.Add });
        for (int i = 0; i < 9; i++)
        {
            screen.Press(Key.CursorDown).Wait(TimeSpan.FromMilliseconds(30));
        }

        Assert.Empty(computed);
        Assert.Contains("│ E10: ", screen.Text, StringComparison.Ordinal);
        Assert.Contains("takes a moment", screen.Text, StringComparison.Ordinal);
        Assert.Contains("values by group", screen.Wait(TimeSpan.FromSeconds(1)).Text, StringComparison.Ordinal);
        Assert.Equal(["E10"], computed);
        screen.Press(Key.CursorUp).Wait(TimeSpan.FromSeconds(1)).Press(Key.CursorDown);
        Assert.Equal(["E10", "E9"], computed);
        Assert.Contains("values by group", screen.Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData('q')]
    [InlineData('c')]
    public void Control_and_q_or_c_quit_even_from_the_filter(char letter)
    {
        using TestScreen screen = new(80, 24, Standing);
        screen.Press(Key.F3, Key.Q);
        Assert.False(screen.IsStopped);
        screen.Press(new Key(letter).WithCtrl);
        Assert.True(screen.IsStopped);
    }

    [Fact]
    public void The_ranking_walks_along_the_ranks_and_opens_the_experiment()
    {
        using TestScreen screen = new(80, 24, Standing);
        screen.Press(new Key('/')).Type("survives:no").Press(Key.Enter).Turn("Ranking").Press(Key.Home, Key.CursorRight);
        ExperimentResult second = screen.Model.Ranking.At(2);
        Assert.Same(second, screen.Model.Selected);
        Assert.Contains($"{second.Plan.Code} ◆ survives: rank 2, ", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.Z);
        Assert.Contains("20 of 48", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.Enter);
        Assert.Equal(PageList.PlaceOf("Experiments"), screen.Model.Page);
        Assert.Same(second, screen.Model.Selected);
    }

    [Fact]
    public void The_mouse_selects_sorts_scrolls_and_turns_pages()
    {
        using TestScreen screen = new(80, 24, Standing);
        int header = screen.Lines.ToList().FindIndex(l => l.StartsWith("experiment", StringComparison.Ordinal));
        screen.Click(3, header + 3);
        Assert.Equal(2, screen.Model.SelectedRow);
        screen.Click(screen.Lines[header].IndexOf("statistic", StringComparison.Ordinal) + 2, header);
        Assert.Equal("statistic", screen.Model.SortColumn!.Name);
        int before = screen.Model.SelectedRow;
        screen.Wheel(3, header + 4, down: before < 20);
        Assert.Equal(3, Math.Abs(screen.Model.SelectedRow - before));
        screen.Click(screen.Lines[header - 2].IndexOf("Ranking", StringComparison.Ordinal), header - 2);
        Assert.Equal(PageList.PlaceOf("Ranking"), screen.Model.Page);
    }

    [Fact]
    public void A_new_size_is_filled_at_once()
    {
        using TestScreen screen = new(80, 24, Standing);
        string small = screen.Text;
        string large = screen.Resize(120, 40).Text;
        using TestScreen fresh = new(120, 40, Standing);
        Assert.Equal(fresh.Text, large);
        Assert.Equal(small, screen.Resize(80, 24).Text);
        foreach ((int w, int h) in new[] { (1, 1), (20, 5), (300, 90), (80, 24) })
        {
            screen.Resize(w, h);
        }

        Assert.Equal(small, screen.Text);
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Hostile_names_are_shown_and_not_obeyed(int width, int height)
    {
        CampaignStanding hostile = Standing with { Campaign = Standing.Campaign with { Code = SampleCampaign.Hostile, Title = SampleCampaign.Hostile } };
        using TestScreen screen = new(width, height, hostile);
        screen.Press(Key.CursorDown, Key.CursorDown, Key.CursorDown, Key.Enter);
        Assert.Contains("evil\\u{1B}[31m\\u{202E}gpj_name", screen.Text, StringComparison.Ordinal);
        Assert.DoesNotContain("evil\u001b", screen.Sent, StringComparison.Ordinal);
        Assert.DoesNotContain('\u202e', screen.Sent);
        Assert.DoesNotContain("\u001b[31mgpj", screen.Sent, StringComparison.Ordinal);
    }

    [Fact]
    public void An_empty_campaign_says_so_on_every_page()
    {
        using TestScreen screen = new(80, 24, SampleCampaign.Standing(0) with { LastReview = null });
        Assert.Contains("No experiment is planned", screen.Text, StringComparison.Ordinal);
        Assert.Contains("0 of 0 planned tested", screen.Text, StringComparison.Ordinal);
        Assert.Contains("no review stored yet", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.CursorDown, Key.Enter, Key.End, Key.S).Turn("Ranking").Press(Key.CursorRight, Key.Z, Key.Enter, Key.F5, Key.F1);
        Assert.False(screen.IsStopped);
    }

    [Fact]
    public void A_campaign_with_nothing_tested_shows_its_plan()
    {
        using TestScreen screen = new(120, 40, SampleCampaign.Standing(12, status: _ => ExperimentStatus.Planned));
        Assert.Equal(12, screen.Lines.Count(l => l.Contains("○ –      planned", StringComparison.Ordinal)));
        Assert.Contains("registered, no values yet", screen.Text, StringComparison.Ordinal);
        Assert.Contains("Nothing is tested yet", screen.Turn("Ranking").Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Experiments_that_cannot_be_tested_stay_with_their_reason()
    {
        using TestScreen screen = new(80, 24, SampleCampaign.Standing(9, status: i => (ExperimentStatus)((int)ExperimentStatus.TooFewGroups + (i % 4))));
        Assert.Contains("fewer than two groups hold values", screen.Text, StringComparison.Ordinal);
        Assert.Contains("no group holds more than one value", screen.Press(Key.CursorDown).Text, StringComparison.Ordinal);
        Assert.Contains("all values are the same", screen.Press(Key.CursorDown).Text, StringComparison.Ordinal);
        Assert.Contains("too coarse", screen.Press(Key.CursorDown, Key.Enter).Text, StringComparison.Ordinal);
        screen.Press(Key.End);
        Assert.Contains("counts as p = 1", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Without_colour_no_colour_is_sent_and_with_it_only_the_sixteen()
    {
        using (TestScreen plain = new(120, 40, Standing, colour: false))
        {
            Assert.DoesNotMatch("\u001b\\[[0-9;]*(3[0-7]|4[0-7]|9[0-7]|10[0-7]|38;|48;)m", plain.Sent);
        }

        using TestScreen coloured = new(120, 40, Standing);
        Assert.Matches("\u001b\\[[0-9;]*3[0-7]m", coloured.Sent);
        Assert.DoesNotContain("38;2;", coloured.Sent, StringComparison.Ordinal);
    }

    private static void Check(ExperimentResult e, string column, string shown)
    {
        switch (column)
        {
            case "experiment":
                Assert.Equal(e.Plan.Code, shown);
                break;
            case "groups":
                Assert.Equal(e.GroupCount, int.Parse(shown, CultureInfo.InvariantCulture));
                break;
            case "n":
                Assert.Equal(e.ObservationCount, int.Parse(shown, CultureInfo.InvariantCulture));
                break;
            case "statistic":
                Assert.Equal(e.Statistic is null, shown == "–");
                if (e.Statistic is { } statistic)
                {
                    Close([statistic], Numbers(shown));
                }

                break;
            case "p":
                CheckP(e.P, shown);
                break;
            case "adjusted":
                CheckP(e.AdjustedP, shown);
                break;
            case "survives":
                Assert.Equal(e.Survives switch { true => "◆ yes", false => "◇ no", null => "○ –" }, shown);
                break;
        }
    }

    private static void CheckP(PValue? p, string shown)
    {
        Assert.Equal(p is null, shown == "–");
        if (p is { } value && shown.Contains('e', StringComparison.Ordinal))
        {
            string[] parts = shown.Split('e');
            double log = Math.Log(double.Parse(parts[0], CultureInfo.InvariantCulture)) + (int.Parse(parts[1], CultureInfo.InvariantCulture) * Math.Log(10));
            Assert.Equal(value.Log, log, 0.05);
        }
        else if (p is { } large)
        {
            Assert.True(large.Value >= 1e-4);
            Assert.Equal(large.Value, double.Parse(shown, CultureInfo.InvariantCulture), 0.5001e-4);
        }
    }

    private static void VariationLinesAgree(string[] lines, ExperimentDetail detail)
    {
        var table = detail.Variation!;
        Close([table.Between.DegreesOfFreedom, table.Between.SumOfSquares, table.Between.MeanSquare, table.F], Numbers(lines.Last(l => l.StartsWith("between ", StringComparison.Ordinal))[7..]));
        Close([table.Within.DegreesOfFreedom, table.Within.SumOfSquares, table.Within.MeanSquare], Numbers(lines.Last(l => l.StartsWith("within ", StringComparison.Ordinal))[6..]));
        Close([table.Total.DegreesOfFreedom, table.Total.SumOfSquares], Numbers(lines.Last(l => l.StartsWith("total ", StringComparison.Ordinal))[5..]));
    }

    private static double[] Numbers(string text) =>
        [.. text.Split(' ', StringSplitOptions.RemoveEmptyEntries).Select(t => double.Parse(t, CultureInfo.InvariantCulture))];

    // Four significant digits.
    private static void Close(double[] expected, double[] shown)
    {
        Assert.Equal(expected.Length, shown.Length);
        Assert.All(expected.Zip(shown), pair => Assert.Equal(pair.First, pair.Second, Math.Abs(pair.First) * 0.5001e-3));
    }
}
