using Campaigns.App.Figures;
using Campaigns.App.Tests.Dashboard;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Tests.Figures;

public sealed class ObservationsFigureTests
{
    // Two decimals of a drawing 400 units wide.
    private const double Hair = 1e-3;

    [Fact]
    public void Every_value_stands_at_its_place_along_the_axis()
    {
        (Figure figure, ExperimentDetail detail) = Sample(6);
        Drawing drawing = new(FigureSvg.Write(figure, "f"));
        double[] values = [.. detail.Groups.SelectMany(g => g.Values).Order()];
        double[] read = [.. drawing.Marks("value").Select(m => drawing.ValueAtX(m.X)).Order()];
        Assert.Equal(values.Length, read.Length);
        double spread = values[^1] - values[0];
        Assert.All(values.Zip(read), pair => Assert.Equal(pair.First, pair.Second, Hair * spread * 2));
    }

    [Fact]
    public void Every_value_stands_in_the_row_of_its_group()
    {
        (Figure figure, ExperimentDetail detail) = Sample(6);
        Drawing drawing = new(FigureSvg.Write(figure, "f"));
        IReadOnlyDictionary<string, double> rows = drawing.Names();
        double row = Math.Abs(rows[detail.Groups[1].Label] - rows[detail.Groups[0].Label]);
        foreach (GroupDetail group in detail.Groups)
        {
            int near = drawing.Marks("value").Count(m => Math.Abs(m.Y - rows[group.Label]) < row / 2);
            Assert.Equal(group.Values.Count, near);
        }
    }

    [Fact]
    public void Means_and_intervals_read_back()
    {
        (Figure figure, ExperimentDetail detail) = Sample(6);
        Drawing drawing = new(FigureSvg.Write(figure, "f"));
        double[] means = [.. detail.Groups.Where(g => !g.IsControl).Select(g => g.Summary.Mean!.Value).Order()];
        Assert.All(means.Zip(drawing.Marks("mean with interval").Select(m => drawing.ValueAtX(m.X)).Order()), pair => Assert.Equal(pair.First, pair.Second, 0.02));
        Assert.Equal(detail.Groups.Single(g => g.IsControl).Summary.Mean!.Value, drawing.ValueAtX(Assert.Single(drawing.Marks("mean of the control")).X), 0.02);
        double[] ends = [.. drawing.Lines("interval").Where(l => l[0].Y == l[1].Y).SelectMany(l => new[] { drawing.ValueAtX(l[0].X), drawing.ValueAtX(l[1].X) }).Order()];
        double[] expected = [.. detail.Groups.SelectMany(g => new[] { g.Summary.Lower!.Value, g.Summary.Upper!.Value }).Order()];
        Assert.Equal(expected.Length, ends.Length);
        Assert.All(expected.Zip(ends), pair => Assert.Equal(pair.First, pair.Second, 0.02));
    }

    [Fact]
    public void An_excluded_value_is_drawn_apart_and_told()
    {
        CampaignStanding standing = SampleCampaign.Standing(8, "bh");
        ExperimentDetail detail = SampleCampaign.Detail(standing.Experiments[0]);
        List<TracedObservation> observations = [.. Observations(detail)];
        observations.Add(new TracedObservation("zinc", "14.2", "oven.csv", 9, null, null, null, true) { Number = 14.2 });
        Figure figure = ObservationsFigure.Of(standing, detail, observations);
        Drawing drawing = new(FigureSvg.Write(figure, "f"));
        Assert.Equal(14.2, drawing.ValueAtX(Assert.Single(drawing.Marks("excluded value")).X), 0.02);
        Assert.Contains("and 1 excluded", figure.Alternative, StringComparison.Ordinal);
    }

    [Fact]
    public void An_experiment_without_values_has_no_picture_but_a_sentence()
    {
        CampaignStanding standing = SampleCampaign.Standing(8, "bh", status: i => i == 0 ? ExperimentStatus.Planned : ExperimentStatus.Tested);
        Figure figure = ObservationsFigure.Of(standing, SampleCampaign.Detail(standing.Experiments[0]), []);
        Assert.False(figure.HasPicture);
        Assert.Equal("No picture: E1 has no values yet.", figure.Alternative);
        Assert.Throws<InvalidOperationException>(() => FigureSvg.Write(figure, "f"));
    }

    [Fact]
    public void A_hundred_thousand_values_become_few_dots_that_keep_the_ends_and_the_count_is_told()
    {
        CampaignStanding standing = SampleCampaign.Standing(8, "bh");
        ExperimentDetail detail = SampleCampaign.Detail(standing.Experiments[0]);
        Random random = new(20_261_202);
        TracedObservation[] observations = [.. Enumerable.Range(0, 100_000).Select(i =>
            new TracedObservation(detail.Groups[i % 4].Label, "", "big.csv", i + 1, null, null, null, false) { Number = Math.Round(10 + (8 * random.NextDouble()) + (i % 4), 3) })];
        Figure figure = ObservationsFigure.Of(standing, detail, observations);
        string svg = FigureSvg.Write(figure, "f");
        Assert.InRange(svg.Length, 20_000, 600_000);
        Drawing drawing = new(svg);
        double[] read = [.. drawing.Marks("value").Select(m => drawing.ValueAtX(m.X)).Order()];
        Assert.InRange(read.Length, 500, 10_000);
        Assert.Equal(observations.Min(o => o.Number), read[0], 0.1);
        Assert.Equal(observations.Max(o => o.Number), read[^1], 0.1);
        Assert.Contains(figure.Notes, n => n.Contains("100000 values lie too close", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData(-1e308, 1e308)]
    [InlineData(1e15, 1e15 + 0.125)]
    [InlineData(1e-320, 3e-320)]
    public void Values_that_no_axis_can_show_are_told_instead(double low, double high)
    {
        CampaignStanding standing = SampleCampaign.Standing(8, "bh");
        ExperimentDetail detail = SampleCampaign.Detail(standing.Experiments[0] with { Plan = standing.Experiments[0].Plan with { Groups = ["zinc"] } });
        detail = detail with { Groups = [new GroupDetail("zinc", false, [low, high], new Statistics.GroupTests.GroupSummary(2, null, null, null, null, null))] };
        Figure figure = ObservationsFigure.Of(standing, detail, [At(low), At(high)]);
        Assert.False(figure.HasPicture);
        Assert.Contains("no axis can show to scale", figure.Alternative, StringComparison.Ordinal);

        static TracedObservation At(double value) => new("zinc", "", "f.csv", 2, null, null, null, false) { Number = value };
    }

    [Theory]
    [InlineData(5, 5)]
    [InlineData(0, 0)]
    [InlineData(1e200, 2e200)]
    [InlineData(1e-200, 2e-200)]
    [InlineData(123456789.25, 123456789.75)]
    public void Values_at_the_edge_of_what_an_axis_can_show_are_drawn(double low, double high)
    {
        CampaignStanding standing = SampleCampaign.Standing(8, "bh");
        ExperimentDetail detail = SampleCampaign.Detail(standing.Experiments[0]);
        detail = detail with { Groups = [new GroupDetail("zinc", false, [low, high], new Statistics.GroupTests.GroupSummary(2, null, null, null, null, null))] };
        Figure figure = ObservationsFigure.Of(standing, detail, [At(low), At(high)]);
        Drawing drawing = new(FigureSvg.Write(figure, "f"));
        double[] read = [.. drawing.Marks("value").Select(m => drawing.ValueAtX(m.X)).Order()];
        double spread = Math.Max(high - low, Math.Abs(high) / 10);
        Assert.Equal(low, read[0], spread == 0 ? 0.01 : spread / 100);
        Assert.Equal(high, read[1], spread == 0 ? 0.01 : spread / 100);

        static TracedObservation At(double value) => new("zinc", "", "f.csv", 2, null, null, null, false) { Number = value };
    }

    private static (Figure, ExperimentDetail) Sample(int experiment)
    {
        CampaignStanding standing = SampleCampaign.Standing(8, "bh", withoutResult: 0);
        ExperimentDetail detail = SampleCampaign.Detail(standing.Experiments[experiment]);
        return (ObservationsFigure.Of(standing, detail, Observations(detail)), detail);
    }

    private static TracedObservation[] Observations(ExperimentDetail detail) =>
        [.. detail.Groups.SelectMany(g => g.Values.Select((v, i) => new TracedObservation(g.Label, "", "oven.csv", i + 2, null, null, null, false) { Number = v }))];
}
