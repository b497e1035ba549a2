using System.Globalization;
using Campaigns.App.Dashboard.Pages;
using Campaigns.Domain;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class ReviewsPageTests
{
    private const int CodeCells = 10, ColumnCells = 11;

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Reviews_look_as_kept(int width, int height)
    {
        using TestScreen screen = new(width, height, SamplePast.Source(3), page: "Reviews");
        Golden.Match($"reviews-{width}x{height}", screen.Text);
        Golden.Match($"reviews-many-{width}x{height}", Many(width, height));
        Golden.Match($"reviews-help-{width}x{height}", screen.Press(Key.F1).Text);

        static string Many(int width, int height)
        {
            using TestScreen many = new(width, height, SamplePast.Source(14), page: "Reviews");
            return many.Press(Key.C, Key.CursorLeft, Key.CursorLeft, Key.H, Key.CursorLeft, Key.CursorLeft, Key.CursorDown).Text;
        }
    }

    [Fact]
    public void In_plain_signs_nothing_is_lost()
    {
        using TestScreen screen = new(80, 24, SamplePast.Source(3), ascii: true, colour: false, page: "Reviews");
        Assert.DoesNotContain(screen.Text, c => c > '~');
        Assert.Contains("# yes", screen.Text, StringComparison.Ordinal);
        Assert.Contains("x no", screen.Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Every_cell_of_the_matrix_and_every_figure_above_reads_back_as_the_reviews(int width, int height)
    {
        SampleSource source = SamplePast.Source(3);
        using TestScreen screen = new(width, height, source, page: "Reviews");
        screen.Press(Key.C);
        List<string> lines = [.. screen.Lines];
        int head = lines.FindIndex(l => l.StartsWith("review ", StringComparison.Ordinal));
        for (int review = 0; review < 3; review++)
        {
            ReviewHead expected = source.Records[review].Head;
            Assert.Equal(expected.Number, int.Parse(Cell(head, review).Trim('[', ']'), CultureInfo.InvariantCulture));
            Assert.Equal(expected.At.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture), Cell(head + 1, review));
            Assert.Equal(
                [expected.SurvivorCount, expected.TestedCount, expected.FamilySize],
                new[] { 2, 3, 4 }.Select(row => int.Parse(Cell(head + row, review), CultureInfo.InvariantCulture)));
        }

        int rows = 0;
        for (; screen.CellsOf(head + 5 + rows)[0] == "E"; rows++)
        {
            ExperimentHistory experiment = source.Past.Experiments[rows];
            Assert.Equal(experiment.Code, string.Concat(screen.CellsOf(head + 5 + rows)[..CodeCells]).Trim());
            for (int review = 0; review < 3; review++)
            {
                Assert.Equal(experiment.Lines[review]?.Survives switch { true => "◆ yes", false => "◇ no", null => "○ –" }, Cell(head + 5 + rows, review));
            }
        }

        Assert.True(rows >= 4, screen.Text);

        string Cell(int row, int review)
        {
            int x = CodeCells + 1 + (review * ColumnCells);
            return string.Concat(screen.CellsOf(row)[x..(x + ColumnCells)]).Trim();
        }
    }

    [Fact]
    public void What_was_gained_and_lost_is_that_of_the_comparison_with_its_reason()
    {
        SampleSource source = SamplePast.Source(3);
        using TestScreen screen = new(120, 60, source, page: "Reviews");
        ReviewComparison comparison = source.Compare("", 2, 3).Comparison;
        string text = ProgrammePageTests.Side(screen);
        Assert.Contains(FormattableString.Invariant($"Between review 2 and review 3: {comparison.Differences.Count(d => d.IsGained)} gained, {comparison.Differences.Count(d => !d.IsGained)} lost"), text, StringComparison.Ordinal);
        Assert.NotEmpty(comparison.Differences);
        foreach (ReviewDifference d in comparison.Differences)
        {
            Assert.Contains(FormattableString.Invariant($"{(d.IsGained ? "+" : "-")} E{d.Key} {(d.IsGained ? "gained" : "lost")}: "), text, StringComparison.Ordinal);
        }

        Assert.Contains("E4 gained: its own p went from 0.3100 to 0.0004: a value left out (film blistered; run again\\u{1B}[31m\\u{202E})", text, StringComparison.Ordinal);
        Assert.Contains("It rests on the plan after amendment 1, and on 300 rows of measurements from 4 files. Taken by version 0.4.0 of the program; entry 12 of the ledger speaks for it.", text, StringComparison.Ordinal);
        Assert.DoesNotContain('\u202e', screen.Sent);
        Assert.DoesNotContain("again\u001b", screen.Sent, StringComparison.Ordinal);
    }

    [Fact]
    public void Any_two_reviews_can_be_compared()
    {
        using TestScreen screen = new(120, 60, SamplePast.Source(9), page: "Reviews");
        Assert.Contains("Between review 8 and review 9", ProgrammePageTests.Side(screen), StringComparison.Ordinal);
        screen.Press(Key.CursorLeft, Key.H, Key.CursorLeft, Key.CursorLeft, Key.CursorLeft);
        Assert.Contains("review 5 and review 8", ProgrammePageTests.Side(screen), StringComparison.Ordinal);
        screen.Press(Key.Esc);
        Assert.Contains("review 4 and review 5", ProgrammePageTests.Side(screen), StringComparison.Ordinal);
        for (int i = 0; i < 12; i++)
        {
            screen.Press(Key.CursorLeft);
        }

        Assert.Contains("The first review: there is none before it", ProgrammePageTests.Side(screen), StringComparison.Ordinal);
        screen.Press(Key.H);
        Assert.Contains("A review compared with itself", ProgrammePageTests.Side(screen), StringComparison.Ordinal);
    }

    [Fact]
    public void Changed_experiments_or_all_and_enter_turns_to_the_experiment()
    {
        SampleSource source = SamplePast.Source(3);
        using TestScreen screen = new(80, 24, source, page: "Reviews");
        int changed = source.Past.Experiments.Count(e => e.HasChanged);
        Assert.InRange(changed, 1, 11);
        Assert.Contains(FormattableString.Invariant($"{changed} of 12 experiments changed over the reviews"), screen.Text, StringComparison.Ordinal);
        screen.Press(Key.End);
        string last = source.Past.Experiments.Last(e => e.HasChanged).Code;
        Assert.Contains(last + " in review 3: ", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.C);
        Assert.Contains("all 12 experiments", screen.Text, StringComparison.Ordinal);
        Assert.Contains(last + " in review 3: ", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.Enter);
        Assert.Equal((PageList.PlaceOf("Experiments"), last), (screen.Model.Page, screen.Model.Selected!.Plan.Code));
    }

    [Fact]
    public void Without_a_review_the_page_says_how_to_take_one()
    {
        using TestScreen screen = new(80, 24, SampleCampaign.Standing(4));
        screen.Turn("Reviews").Press(Key.CursorLeft, Key.CursorDown, Key.H, Key.C, Key.Enter, Key.Tab, Key.End, Key.Esc);
        Assert.Contains("No review was taken yet; key v takes one.", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Walking_along_the_reviews_of_a_large_campaign_compares_only_where_the_keys_stand_still()
    {
        const int many = 6_000;
        int compared = 0;
        SampleSource plain = SamplePast.Source(6, planned: many);
        SampleSource source = new(plain.Standing(SampleCampaign.Code)) { Records = plain.Records, Past = plain.Past, Between = (a, b) => { compared++; return plain.Between!(a, b); } };
        using TestScreen screen = new(120, 40, source, page: "Reviews");
        screen.Press(Key.CursorLeft).Press(Key.CursorLeft).Press(Key.CursorLeft);
        Assert.Equal(0, compared);
        Assert.Contains("when the keys stand still", ProgrammePageTests.Side(screen), StringComparison.Ordinal);
        screen.Wait(TimeSpan.FromSeconds(1));
        Assert.Equal(1, compared);
        Assert.Contains("Between review 2 and review 3", ProgrammePageTests.Side(screen), StringComparison.Ordinal);
    }

    [Fact]
    public void A_click_on_a_column_goes_to_its_review()
    {
        using TestScreen screen = new(80, 24, SamplePast.Source(3), page: "Reviews");
        int head = screen.Lines.ToList().FindIndex(l => l.StartsWith("review ", StringComparison.Ordinal));
        screen.Click(CodeCells + 3, head + 1);
        Assert.Contains("[1]", screen.Lines[head], StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(1, 1)]
    [InlineData(20, 5)]
    [InlineData(79, 12)]
    [InlineData(300, 90)]
    public void No_size_stops_it(int width, int height)
    {
        using TestScreen screen = new(80, 24, SamplePast.Source(14), page: "Reviews");
        screen.Resize(width, height).Press(Key.CursorDown, Key.CursorLeft, Key.PageDown, Key.Space, Key.Tab, Key.End, Key.Esc, Key.Home);
        Assert.Contains("[13]", screen.Resize(80, 24).Text, StringComparison.Ordinal);
    }
}
