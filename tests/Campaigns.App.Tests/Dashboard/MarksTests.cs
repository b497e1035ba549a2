using System.Globalization;
using System.Text.RegularExpressions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Dashboard;

public sealed partial class MarksTests
{
    private readonly DashboardModel _model = new(SampleCampaign.Source(SampleCampaign.Standing(48)), SampleCampaign.Code, SampleCampaign.Find);

    [Fact]
    public void A_mark_is_put_and_taken_off_and_says_that_something_changed()
    {
        int changes = 0;
        _model.Changed += () => changes++;
        _model.MarkSelected();
        Assert.True(_model.Marks.Has(0));
        Assert.Equal((1, 1), (_model.Marks.Count, changes));
        _model.MarkSelected();
        Assert.Equal((0, 2), (_model.Marks.Count, changes));
    }

    [Fact]
    public void All_rows_shown_are_marked_at_once_and_what_the_filter_hides_stays_as_it_was()
    {
        _model.Select(5);
        _model.MarkSelected();
        _model.SetFilter("survives:yes");
        _model.MarkShown();
        Assert.Equal(_model.RowCount + 1, _model.Marks.Count);
        _model.MarkShown();
        Assert.Equal(1, _model.Marks.Count);
        Assert.True(_model.Marks.Has(5));
    }

    [Fact]
    public void Single_marks_are_real_exactly_where_Hommels_correction_rejects()
    {
        // Closed testing with Simes' tests on single hypotheses is Hommel's procedure (1988).
        ExperimentResult[] experiments = [.. _model.Standing.Experiments];
        PValue[] p = [.. experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        PValue[] hommel = CorrectionRegistry.Find("hommel")!.Adjust(RankedFamily.Of(p, experiments.Length));
        int next = 0;
        int real = 0;
        for (int i = 0; i < experiments.Length; i++)
        {
            _model.Marks.Turn(i);
            bool expected = experiments[i].P is not null && hommel[next++].Value <= 0.05;
            Assert.Equal(expected ? 1 : 0, _model.Marks.Bound.RealAtLeast);
            Assert.Equal(experiments[i].P is null ? 1 : 0, _model.Marks.Bound.Untested);
            _model.Marks.Turn(i);
            real += expected ? 1 : 0;
        }

        Assert.InRange(real, 1, 47);
    }

    [Fact]
    public void After_a_reload_marks_stay_with_their_experiments_and_the_bound_follows_the_new_results()
    {
        CampaignStanding before = SampleCampaign.Standing(12, withoutResult: 0);
        CampaignStanding after = before with
        {
            Experiments = [.. before.Experiments.Reverse().Skip(1).Select(e => e with { P = PValue.FromValue(e.Plan.Code == "E2" ? 1e-9 : 0.9) })],
        };
        DashboardModel model = new(new SampleSource(before, after), SampleCampaign.Code, SampleCampaign.Find);
        model.Marks.TurnAll([1, 4, 11]);
        model.Reload();
        Assert.Equal(["E5", "E2"], after.Experiments.Where((_, i) => model.Marks.Has(i)).Select(e => e.Plan.Code));
        Assert.Equal(new MarkedBound(2, 1, 0), model.Marks.Bound);
    }

    [Theory]
    [InlineData(40)]
    [InlineData(80)]
    public void The_numbers_of_the_line_read_back_as_the_models(int width)
    {
        _model.Marks.TurnAll([0, 1, 2, 3, 5, 8, 13]);
        TextCanvas canvas = MarksPainter.Paint(_model.Marks, width, 2, GlyphSet.Ascii);
        Assert.Equal((width, 2), (canvas.Width, canvas.Height));
        int[] shown = [.. WholeNumbers().Matches(canvas.ToString().Split('\n')[0]).Select(m => int.Parse(m.Value, CultureInfo.InvariantCulture))];
        MarkedBound bound = _model.Marks.Bound;
        int[] expected = [7, bound.RealAtLeast, bound.FalseAtMost, 95];
        Assert.Equal(expected[..shown.Length], shown);
        Assert.True(width < 80 || shown.Length == 4);
        Assert.DoesNotContain(canvas.ToString(), c => c > '~' && c != '\n');
    }

    [Fact]
    public void Nothing_marked_paints_nothing() => Assert.Equal("\n\n", MarksPainter.Paint(_model.Marks, 80, 2, GlyphSet.Full).ToString());

    [Fact]
    public void Marking_in_an_empty_campaign_does_nothing()
    {
        DashboardModel empty = new(SampleCampaign.Source(SampleCampaign.Standing(0)), SampleCampaign.Code, SampleCampaign.Find);
        empty.MarkSelected();
        empty.MarkShown();
        Assert.Equal(new MarkedBound(0, 0, 0), empty.Marks.Bound);
    }

    [GeneratedRegex(@"\d+")]
    private static partial Regex WholeNumbers();
}
