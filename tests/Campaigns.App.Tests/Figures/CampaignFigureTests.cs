using Campaigns.App.Figures;
using Campaigns.App.Tests.Dashboard;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.App.Tests.Figures;

public sealed class CampaignFigureTests
{
    private static readonly CampaignStanding Fifty = SampleCampaign.Standing(50, "bh");

    [Fact]
    public void Every_ranked_p_stands_at_its_rank_and_height()
    {
        Drawing drawing = Draw(RankingFigure.Of(Fifty));
        ExperimentResult[] ranked = [.. Fifty.Experiments.Where(e => e.P is not null).OrderBy(e => e.P!.Value)];
        foreach ((string series, bool survives) in new[] { ("survives", true), ("does not survive", false) })
        {
            (double Rank, double Log)[] read = [.. drawing.Marks(series).Select(m => (drawing.ValueAtX(m.X), drawing.LogAtY(m.Y))).OrderBy(m => m.Item1)];
            (int Rank, double Log)[] expected = [.. ranked.Select((e, i) => (i + 1, e.P!.Value.Log / Math.Log(10), e.Survives)).Where(e => e.Survives == survives && e.Item2 > -1000).Select(e => (e.Item1, e.Item2))];
            Assert.Equal(expected.Length, read.Length);
            Assert.All(expected.Zip(read), pair =>
            {
                Assert.Equal(pair.First.Rank, pair.Second.Rank, 0.05);
                Assert.Equal(pair.First.Log, pair.Second.Log, 0.05);
            });
        }
    }

    [Fact]
    public void A_p_far_below_the_boundary_is_marked_as_below_the_scale()
    {
        Drawing drawing = Draw(RankingFigure.Of(Fifty));
        Assert.Single(drawing.Marks("survives, below the scale"));
        Assert.Equal(1, drawing.ValueAtX(drawing.Marks("survives, below the scale")[0].X), 0.05);
    }

    [Fact]
    public void Untested_experiments_are_drawn_as_p_of_one()
    {
        Drawing drawing = Draw(RankingFigure.Of(Fifty));
        (double X, double Y)[] marks = [.. drawing.Marks("no result, counted as p = 1")];
        Assert.Equal(Fifty.FamilySize - Fifty.TestedCount, marks.Length / 2);
        Assert.All(marks, m => Assert.Equal(0, drawing.LogAtY(m.Y), 0.05));
    }

    [Fact]
    public void The_boundary_of_the_sealed_correction_is_drawn_from_rank_to_rank()
    {
        Drawing drawing = Draw(RankingFigure.Of(Fifty));
        (double X, double Y)[] line = Assert.Single(drawing.Lines("Benjamini-Hochberg, sealed"));
        Assert.Equal(Math.Log10(0.05 / 50), drawing.LogAtY(line[0].Y), 0.05);
        Assert.Equal(Math.Log10(0.05), drawing.LogAtY(line[^1].Y), 0.05);
        Assert.Contains("Holm", drawing.SeriesNames);
        Assert.Contains("No correction", drawing.SeriesNames);
    }

    [Fact]
    public void A_hundred_thousand_ranks_give_a_file_that_a_browser_takes_and_keep_the_survivors()
    {
        CampaignStanding many = SampleCampaign.Standing(100_000, "bh", withoutResult: 0);
        string svg = FigureSvg.Write(RankingFigure.Of(many), "f");
        Assert.InRange(svg.Length, 10_000, 400_000);
        Drawing drawing = new(svg);
        Assert.Equal(0, drawing.LogAtX(drawing.Marks("survives, below the scale").Min(m => m.X)), 0.05);
        Assert.Equal(Math.Log10(many.SurvivorCount), drawing.LogAtX(drawing.Marks("survives").Max(m => m.X)), 0.05);
    }

    [Fact]
    public void The_bars_hold_the_p_values_and_the_line_the_estimate()
    {
        Drawing drawing = Draw(HistogramFigure.Of(Fifty));
        PValue[] tested = [.. Fifty.Experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        int bar = 0;
        foreach ((double left, double right, double top, double bottom) in drawing.Bars("experiments").OrderBy(b => b.Left))
        {
            double from = bar / 20.0, to = (bar + 1) / 20.0;
            Assert.Equal(from, drawing.ValueAtX(left), 0.003);
            Assert.Equal(to, drawing.ValueAtX(right), 0.003);
            int expected = tested.Count(p => p.Value <= to && (p.Value > from || bar == 0));
            Assert.Equal(expected, drawing.ValueAtY(top), 0.05);
            Assert.Equal(0, drawing.ValueAtY(bottom), 0.05);
            bar++;
        }

        Assert.Equal(20, bar);
        double share = TrueNullShare.Estimate(tested).Share!.Value;
        Assert.Equal(share * tested.Length / 20, drawing.ValueAtY(drawing.Lines("true nulls, by the estimate")[0][0].Y), 0.05);
    }

    [Fact]
    public void A_p_at_the_edge_of_two_bars_counts_with_the_smaller_ones()
    {
        int[] counts = HistogramFigure.Count([.. Enumerable.Range(0, 21).Select(k => PValue.FromValue(k / 20.0)), PValue.FromValue(Math.BitIncrement(0.05)), PValue.FromLog(-5000)]);
        Assert.Equal(23, counts.Sum());
        Assert.Equal(3, counts[0]);
        Assert.Equal(2, counts[1]);
        Assert.All(counts[2..], c => Assert.Equal(1, c));
    }

    [Fact]
    public void The_risk_reads_back_at_the_last_test()
    {
        CampaignStanding standing = SampleCampaign.Standing(60, "bh", withoutResult: 0);
        IReadOnlyList<RiskPoint> curve = RiskCurve.Of(standing, standing.Experiments.ToDictionary(e => e.Plan.Code, e => 1L));
        Drawing drawing = Draw(RiskFigure.Of(standing, curve));
        Assert.Equal(1 - Math.Pow(0.95, 60), drawing.ValueAtY(Assert.Single(drawing.Lines("without correction, independent tests"))[^1].Y), 0.005);

        // With every null true, Benjamini and Hochberg's procedure on the whole family rejects something with probability 0.05.
        Assert.Equal(0.05, drawing.ValueAtY(Assert.Single(drawing.Lines("with the correction"))[^1].Y), 0.005);
        Assert.Equal(60, drawing.ValueAtX(drawing.Lines("with the correction")[0][^1].X), 0.3);
    }

    [Fact]
    public void A_hundred_thousand_tests_are_drawn_as_a_line_of_few_points()
    {
        CampaignStanding standing = SampleCampaign.Standing(100_000, "bonferroni", withoutResult: 0);
        IReadOnlyList<RiskPoint> curve = RiskCurve.Of(standing, standing.Experiments.ToDictionary(e => e.Plan.Code, e => 1L));
        string svg = FigureSvg.Write(RiskFigure.Of(standing, curve), "f");
        Assert.InRange(svg.Length, 4_000, 40_000);
        Drawing drawing = new(svg);
        Assert.Equal(5, drawing.LogAtX(drawing.Lines("with the correction")[0][^1].X), 0.02);
    }

    [Fact]
    public void Each_correction_has_a_mark_at_its_survivors()
    {
        Drawing drawing = Draw(CorrectionsFigure.Of(Fifty));
        IReadOnlyDictionary<string, double> rows = drawing.Names();
        foreach (CorrectionOutcome outcome in CorrectionsBeside.Of(Fifty))
        {
            string name = rows.Keys.Single(k => k == outcome.Procedure.Name || (k.EndsWith('\u2026') && outcome.Procedure.Name.StartsWith(k[..^1], StringComparison.Ordinal)));
            (double X, double Y) = drawing.Marks(outcome.IsSealed ? "sealed" : "for comparison").MinBy(m => Math.Abs(m.Y - rows[name]));
            Assert.Equal(outcome.IsSealed ? Fifty.SurvivorCount : outcome.SurvivorCount, drawing.ValueAtX(X), 0.1);
        }
    }

    [Fact]
    public void Survivors_stand_with_their_effect_the_smallest_p_first()
    {
        Drawing drawing = Draw(SurvivorsFigure.Of(Fifty));
        double[] expected = [.. Fifty.Experiments.Where(e => e.Survives == true).OrderBy(e => e.P!.Value).ThenBy(e => e.Position).Select(e => e.EtaSquared!.Value)];
        double[] read = [.. drawing.Marks("eta squared of the sample").OrderBy(m => m.Y).Select(m => drawing.ValueAtX(m.X))];
        Assert.Equal(expected.Length, read.Length);
        Assert.All(expected.Zip(read), pair => Assert.Equal(pair.First, pair.Second, 0.005));
    }

    [Fact]
    public void Many_survivors_are_cut_and_the_cut_is_told()
    {
        CampaignStanding many = SampleCampaign.Standing(1000, "bh", withoutResult: 0);
        Figure figure = SurvivorsFigure.Of(many);
        Assert.Equal(SurvivorsFigure.MostSurvivors, Draw(figure).Marks("eta squared of the sample").Count);
        Assert.Contains($"The {SurvivorsFigure.MostSurvivors} survivors with the smallest p of {many.SurvivorCount} are drawn.", figure.Notes);
    }

    [Fact]
    public void Reviews_stand_in_their_order_with_survivors_and_tested()
    {
        ReviewHead[] reviews = [.. Enumerable.Range(1, 4).Select(i => Fifty.LastReview! with { Number = i, SurvivorCount = 3 * i, TestedCount = 10 * i, IsInterim = i == 2 })];
        Drawing drawing = Draw(ReviewsFigure.Of(Fifty, reviews));
        Assert.Equal([3.0, 6, 9, 12], drawing.Marks("survivors").OrderBy(m => m.X).Select(m => Math.Round(drawing.ValueAtY(m.Y), 1)));
        Assert.Equal([10.0, 20, 30, 40], drawing.Marks("tested").OrderBy(m => m.X).Select(m => Math.Round(drawing.ValueAtY(m.Y), 1)));
        Assert.Single(drawing.Marks("interim: tested experiments alone counted"));
    }

    [Fact]
    public void Comparisons_read_back_with_their_intervals()
    {
        CampaignStanding standing = SampleCampaign.Standing(SampleCampaign.Family, "bh", withoutResult: 0);
        ExperimentDetail detail = SampleCampaign.Detail(standing.Experiments[1]);
        Assert.NotEmpty(detail.Comparisons);
        Drawing drawing = Draw(ComparisonsFigure.Of(standing, detail));
        double[] differences = [.. drawing.Marks("claimed").Concat(drawing.Marks("not claimed")).OrderBy(m => m.Y).Select(m => drawing.ValueAtX(m.X))];
        double scale = detail.Comparisons.Max(c => c.Comparison.Upper!.Value) - detail.Comparisons.Min(c => c.Comparison.Lower!.Value);
        Assert.Equal(detail.Comparisons.Count, differences.Length);
        Assert.All(detail.Comparisons.Zip(differences), pair => Assert.Equal(pair.First.Comparison.Difference, pair.Second, scale / 200));
        (double, double)[] intervals = [.. drawing.Lines("simultaneous interval").Where(l => l[0].Y == l[1].Y).OrderBy(l => l[0].Y).Select(l => (drawing.ValueAtX(l[0].X), drawing.ValueAtX(l[1].X)))];
        Assert.All(detail.Comparisons.Zip(intervals), pair =>
        {
            Assert.Equal(pair.First.Comparison.Lower!.Value, pair.Second.Item1, scale / 200);
            Assert.Equal(pair.First.Comparison.Upper!.Value, pair.Second.Item2, scale / 200);
        });
        Assert.Equal(0, drawing.ValueAtX(drawing.Lines("no difference")[0][0].X), scale / 200);
    }

    [Fact]
    public void Lines_of_comparisons_differ_in_form_in_the_legend()
    {
        CampaignStanding standing = SampleCampaign.Standing(SampleCampaign.Family, "bh", withoutResult: 0);
        Strokes[] lines = [.. ComparisonsFigure.Of(standing, SampleCampaign.Detail(standing.Experiments[1])).Plot!.Series.OfType<Strokes>()];
        Assert.Equal(LegendForm.Upright, lines.Single(l => l.Title == "no difference").Form);
        Assert.Equal(LegendForm.Capped, lines.Single(l => l.Title == "simultaneous interval").Form);
        Assert.Equal(lines.Length, lines.Select(l => l.Form).Distinct().Count());
    }

    [Fact]
    public void A_campaign_without_results_has_sentences_in_place_of_pictures()
    {
        CampaignStanding none = SampleCampaign.Standing(5, "bh", status: _ => ExperimentStatus.Planned);
        Figure[] figures = [SurvivorsFigure.Of(none), RankingFigure.Of(none), HistogramFigure.Of(none), RiskFigure.Of(none, []), CorrectionsFigure.Of(none), ReviewsFigure.Of(none, [])];
        Assert.All(figures, f =>
        {
            Assert.False(f.HasPicture);
            Assert.StartsWith("No picture", f.Alternative, StringComparison.Ordinal);
        });
    }

    [Fact]
    public void Every_figure_of_a_family_of_one_is_drawn()
    {
        CampaignStanding one = SampleCampaign.Standing(1, "bh", withoutResult: 0);
        IReadOnlyList<RiskPoint> curve = RiskCurve.Of(one, one.Experiments.ToDictionary(e => e.Plan.Code, e => 1L));
        Assert.All(new[] { SurvivorsFigure.Of(one), RankingFigure.Of(one), HistogramFigure.Of(one), RiskFigure.Of(one, curve), CorrectionsFigure.Of(one), ReviewsFigure.Of(one, [one.LastReview!]) }, f => Assert.NotEmpty(Draw(f).SeriesNames));
    }

    [Fact]
    public void Colours_can_be_read_on_white()
    {
        foreach (OxyPlot.OxyColor colour in new[] { FigureStyle.Text, FigureStyle.Quiet, FigureStyle.Survivor, FigureStyle.Other, FigureStyle.Control, FigureStyle.Boundary, FigureStyle.Second, FigureStyle.Third, FigureStyle.Axis })
        {
            Assert.True(Contrast(colour) >= 4.5, $"{colour}: {Contrast(colour)}");
        }

        // Web Content Accessibility Guidelines 2.2, relative luminance.
        static double Contrast(OxyPlot.OxyColor c) => 1.05 / ((0.2126 * Linear(c.R)) + (0.7152 * Linear(c.G)) + (0.0722 * Linear(c.B)) + 0.05);
        static double Linear(byte part) => part / 255.0 is var s && s <= 0.04045 ? s / 12.92 : Math.Pow((s + 0.055) / 1.055, 2.4);
    }

    private static Drawing Draw(Figure figure) => new(FigureSvg.Write(figure, "f"));
}
