using System.Globalization;
using System.Text.RegularExpressions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Effects;
using Campaigns.Statistics.FollowUps;

namespace Campaigns.App.Tests.Dashboard;

public sealed class DetailPainterTests
{
    private static readonly CampaignStanding Standing = SampleCampaign.Standing(SampleCampaign.Family);
    private static readonly ExperimentDetail Eventful = SampleCampaign.Eventful();

    [Theory]
    [InlineData(46)]
    [InlineData(78)]
    public void The_whole_detail_looks_as_kept(int width) => Golden.Match($"detail-whole-{width}", Text(Eventful, width));

    [Fact]
    public void Ascii_draws_the_whole_detail_in_ascii() => Assert.DoesNotContain(Text(Eventful, 78, GlyphSet.Ascii), c => c > '~');

    [Theory]
    [InlineData(78)]
    [InlineData(120)]
    public void Every_comparison_reads_back_from_its_row(int width)
    {
        string[] rows = [.. Lines(Eventful, width).SkipWhile(l => !l.StartsWith("pair ", StringComparison.Ordinal)).Skip(1)];
        Assert.Equal(6, Eventful.Comparisons.Count);
        for (int i = 0; i < Eventful.Comparisons.Count; i++)
        {
            ExperimentComparison c = Eventful.Comparisons[i];
            string name = $"{Sign(c)} {c.GroupB} - {c.GroupA} ";
            Assert.StartsWith(name, rows[i], StringComparison.Ordinal);
            Agree(c, Words(rows[i][name.Length..]));
        }
    }

    [Fact]
    public void Every_comparison_reads_back_from_two_rows_where_it_is_narrow()
    {
        string[] rows = [.. Lines(Eventful, 46).SkipWhile(l => !l.StartsWith("pair ", StringComparison.Ordinal)).Skip(2)];
        for (int i = 0; i < Eventful.Comparisons.Count; i++)
        {
            ExperimentComparison c = Eventful.Comparisons[i];
            string name = $"{Sign(c)} {c.GroupB} - {c.GroupA} ";
            Assert.StartsWith(name, rows[2 * i], StringComparison.Ordinal);
            string[] figures = Words(rows[(2 * i) + 1]);
            Agree(c, [.. figures[..3], rows[2 * i][name.Length..].Trim(), figures[3]]);
        }
    }

    [Theory]
    [InlineData(46)]
    [InlineData(78)]
    public void Intervals_are_drawn_to_scale_about_a_line_at_0(int width)
    {
        string[] rows = ComparisonPlot.Paint(Eventful.Comparisons, width, GlyphSet.Full).ToString().Split('\n');
        int zero = rows[Eventful.Comparisons.Count + 1] is var labels ? Regex.Match(labels, @"(?<![\d.-])0(\.0+)?(?!\.?\d)") is { } m ? m.Index + (m.Length / 2) : -1 : -1;
        double[] all = [.. Eventful.Comparisons.SelectMany(c => new[] { c.Comparison.Lower!.Value, c.Comparison.Upper!.Value }), 0];
        int start = rows[Eventful.Comparisons.Count].TakeWhile(c => c == ' ').Count(), cells = rows[Eventful.Comparisons.Count].Trim().Length;
        double perCell = (all.Max() - all.Min()) / (cells - 1);
        foreach ((ExperimentComparison c, string row) in Eventful.Comparisons.Zip(rows))
        {
            string drawn = row[start..];
            foreach ((char sign, double value) in new[] { ('├', c.Comparison.Lower!.Value), ('●', c.Comparison.Difference), ('┤', c.Comparison.Upper!.Value) })
            {
                Assert.Equal(value, (start + drawn.IndexOf(sign, StringComparison.Ordinal) - zero) * perCell, 1.5 * perCell);
            }

            bool holdsZero = c.Comparison.Lower <= 0 && c.Comparison.Upper >= 0;
            Assert.Equal(holdsZero, row.IndexOf('├', StringComparison.Ordinal) <= zero && row.IndexOf('┤', StringComparison.Ordinal) >= zero);
            Assert.True(holdsZero || row[zero] == '│');
        }
    }

    [Theory]
    [InlineData(1e-9, 1, 100)]
    [InlineData(-1, -1e-9, 100)]
    public void An_interval_that_leaves_out_0_never_seems_to_reach_it(double lower, double upper, double far)
    {
        ExperimentComparison near = Eventful.Comparisons[0] with { Comparison = new GroupComparison(0, 1, (lower + upper) * 25) { Lower = lower * 50, Upper = upper * 50 } };
        ExperimentComparison wide = Eventful.Comparisons[0] with { Comparison = new GroupComparison(0, 1, 0) { Lower = -far, Upper = far } };
        string[] rows = ComparisonPlot.Paint([near, wide], 78, GlyphSet.Full).ToString().Split('\n');
        int zero = rows[0].IndexOf('│', StringComparison.Ordinal);
        Assert.True(zero > 0);
        Assert.True(lower > 0 ? rows[0].IndexOf('├', StringComparison.Ordinal) > zero : rows[0].IndexOf('┤', StringComparison.Ordinal) < zero);
    }

    [Theory]
    [InlineData(-1.7e308, 1.7e308)]
    [InlineData(double.NegativeInfinity, double.PositiveInfinity)]
    [InlineData(0, 0)]
    [InlineData(5e-324, 1e-320)]
    public void The_whole_range_of_doubles_can_be_compared(double lower, double upper)
    {
        ExperimentComparison c = Eventful.Comparisons[0] with { Comparison = new GroupComparison(0, 1, (lower / 2) + (upper / 2)) { Lower = lower, Upper = upper } };
        string text = double.IsInfinity(lower) ? ComparisonPlot.Paint([c with { Comparison = c.Comparison with { Difference = 1 } }], 78, GlyphSet.Full).ToString() : Text(Eventful with { Comparisons = [c] }, 78);
        Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
        Assert.DoesNotContain("∞", text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(46)]
    [InlineData(78)]
    public void Every_effect_reads_back_as_the_models(int width)
    {
        string[] lines = Lines(Eventful, width);
        EffectSizes e = Eventful.Analysis.Effects!;
        Close([e.EtaSquared, e.EtaSquaredInterval.Lower, e.EtaSquaredInterval.Upper], Words(Single("eta squared ")));
        Close([e.CohenF, e.CohenFInterval.Lower, e.CohenFInterval.Upper], Words(Single("Cohen's f ")));
        Assert.Equal(["–", "–"], Words(Single("omega squared "))[1..]);
        Close([e.OmegaSquared], Words(Single("omega squared "))[..1]);
        Close([e.EpsilonSquared], Words(Single("epsilon squared "))[..1]);
        Match found = Regex.Match(Flat(Eventful, width), @"smallest detectable difference: (\S+) MPa at level 0\.05 alone, (\S+) MPa at the strictest threshold 0\.05/48");
        Close([Eventful.Analysis.Detectable!.Value, Eventful.Analysis.DetectableAtStrictest!.Value], [found.Groups[1].Value, found.Groups[2].Value]);

        string Single(string name) => Assert.Single(lines, l => l.StartsWith(name, StringComparison.Ordinal))[name.Length..];
    }

    [Fact]
    public void Specimens_and_blocks_have_their_lines()
    {
        string[] lines = Lines(Eventful, 78);
        var s = Eventful.Analysis.Specimens!;
        Close([s.BetweenSpecimens.DegreesOfFreedom, s.BetweenSpecimens.SumOfSquares, s.BetweenSpecimens.MeanSquare, s.Component!.Value], Words(Assert.Single(lines, l => l.StartsWith("specimen  ", StringComparison.Ordinal))[9..]));
        Close([s.WithinSpecimens.DegreesOfFreedom, s.WithinSpecimens.SumOfSquares, s.WithinSpecimens.MeanSquare, s.ReadingComponent], Words(Assert.Single(lines, l => l.StartsWith("reading  ", StringComparison.Ordinal))[8..]));
        Close([3, 2.5, 2.5 / 3], Words(Assert.Single(lines, l => l.StartsWith("blocks  ", StringComparison.Ordinal))[7..]));
        Assert.Contains(Eventful.Analysis.UnitsNote!, Flat(Eventful, 78), StringComparison.Ordinal);
    }

    [Fact]
    public void Checks_that_warn_come_first_with_a_sign_and_a_word()
    {
        string[] lines = [.. Lines(Eventful, 78).SkipWhile(l => !l.StartsWith("checks (", StringComparison.Ordinal))];
        int warned = Eventful.Analysis.Checks.Count(c => c.Finding.Verdict == CheckVerdict.Warns);
        int[] warns = At("! warns: "), quiet = At("· quiet: "), not = At("– not possible: ");
        Assert.True(warned > 0);
        Assert.Equal(warned, warns.Length);
        Assert.Equal(Eventful.Analysis.Checks.Count, warns.Length + quiet.Length + not.Length);
        Assert.True(warns.Max() < quiet.Min() && quiet.Max() < not.Min());
        Assert.All(Eventful.Analysis.Checks, c => Assert.Contains(c.Finding.Saw, Flat(Eventful, 78), StringComparison.Ordinal));

        int[] At(string start) => [.. lines.Index().Where(l => l.Item.StartsWith(start, StringComparison.Ordinal)).Select(l => l.Index)];
    }

    [Fact]
    public void The_test_beside_the_exclusions_and_the_arrangements_are_told()
    {
        string text = Flat(Eventful, 78);
        Assert.Contains("Welch's F: statistic ", text, StringComparison.Ordinal);
        Assert.Contains("with the excluded, for comparison: statistic 1.250 on 3 and 12 degrees of freedom, p 0.3125", text, StringComparison.Ordinal);
        Assert.Contains("! 2026-04-20 excluded: value 91.0 of group zinc (line 14 of oven-7.csv), by M. Ferrer: the film had blistered", text, StringComparison.Ordinal);
        Assert.Contains("· 2026-04-21 taken in again after an exclusion: value 13.1", text, StringComparison.Ordinal);
        Assert.Contains("Monte Carlo: 4 of 999 random arrangements (seed 20260501)", text, StringComparison.Ordinal);
        Assert.Contains("Warning: the smallest p these arrangements can show", Text(Eventful with { Result = Eventful.Result with { Resampling = new(20, 1, null) } }, 200), StringComparison.Ordinal);
        Assert.Contains("! Deviation from the plan: values came in after the test: oven run 7 was repeated after a power cut.", text, StringComparison.Ordinal);
    }

    [Fact]
    public void What_is_not_claimed_says_why()
    {
        int claimed = Eventful.Comparisons.Count(c => c.Survives == true);
        Assert.InRange(claimed, 1, 5);
        string text = Flat(Eventful, 78);
        Assert.Contains($"◆ {claimed} of 6 comparisons claimed", text, StringComparison.Ordinal);
        Assert.Contains($"◆ {claimed} claimed", text, StringComparison.Ordinal);
        Assert.Contains($"◇ {6 - claimed} not claimed, each because its adjusted p is above the level", text, StringComparison.Ordinal);
        ExperimentComparison open = Eventful.Comparisons[0] with { Survives = null, AdjustedP = null, NotClaimedBecause = "a group holds a single value", Comparison = new GroupComparison(0, 1, 2) };
        string none = Flat(Eventful with { Comparisons = [open] }, 78);
        Assert.Contains("○ 1 not possible, because a group holds a single value: zinc - base", none, StringComparison.Ordinal);
        Assert.Contains("none without a result", Flat(SampleCampaign.Detail(Eventful.Result with { P = null, AdjustedP = null, Survives = null, Statistic = null }), 78), StringComparison.Ordinal);
    }

    [Fact]
    public void Letters_stand_beside_their_groups()
    {
        string[] letters = [.. Eventful.Analysis.Letters!];
        string[] lines = Lines(Eventful, 78);
        for (int i = 0; i < letters.Length; i++)
        {
            Assert.EndsWith(" " + letters[i], lines.Last(l => l.StartsWith(Eventful.Groups[i].Label + " ", StringComparison.Ordinal)), StringComparison.Ordinal);
        }

        Assert.Contains($"letters: base {letters[0]}, zinc {letters[1]}, resin 2 {letters[2]}, resin 3 {letters[3]}", Flat(Eventful, 46), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(20)]
    [InlineData(30)]
    [InlineData(45)]
    [InlineData(300)]
    public void Every_width_shows_every_difference(int width)
    {
        string text = Flat(Eventful, width);
        Assert.All(Eventful.Comparisons, c => Assert.Contains(DetailSheet.Number(c.Comparison.Difference), text, StringComparison.Ordinal));
    }

    private static void Agree(ExperimentComparison c, string[] shown)
    {
        Close([c.Comparison.Difference, c.Comparison.Lower!.Value, c.Comparison.Upper!.Value], shown[..3]);
        CloseP(c.Comparison.P!.Value.Value, shown[3]);
        CloseP(c.AdjustedP!.Value.Value, shown[4]);
    }

    // Four decimals, and two digits below 0.0001.
    private static void CloseP(double expected, string shown) =>
        Assert.Equal(expected, Read(shown), expected < 1e-4 ? expected * 0.0501 : 0.5001e-4);

    // Four significant digits.
    private static void Close(double[] expected, string[] shown)
    {
        Assert.Equal(expected.Length, shown.Length);
        Assert.All(expected.Zip(shown), pair => Assert.Equal(pair.First, Read(pair.Second), Math.Abs(pair.First) * 0.5001e-3));
    }

    private static double Read(string shown) => double.Parse(shown, CultureInfo.InvariantCulture);

    private static string[] Words(string text) => text.Split(' ', StringSplitOptions.RemoveEmptyEntries);

    private static string Sign(ExperimentComparison c) => c.Survives == true ? "◆" : "◇";

    private static string Text(ExperimentDetail detail, int width, GlyphSet? glyphs = null) =>
        DetailPainter.Paint(detail, Standing, new CampaignHeading(Standing, SampleCampaign.Find("rising")), width, glyphs ?? GlyphSet.Full).ToString();

    private static string[] Lines(ExperimentDetail detail, int width) => [.. Text(detail, width).Split('\n').Select(l => l.TrimEnd())];

    // Line breaks and indents undone.
    private static string Flat(ExperimentDetail detail, int width) => Regex.Replace(Text(detail, width), @"\s+", " ");
}
