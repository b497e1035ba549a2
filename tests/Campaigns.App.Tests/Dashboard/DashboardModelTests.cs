using System.Diagnostics;
using Campaigns.App.Dashboard.Model;
using Campaigns.Domain;

namespace Campaigns.App.Tests.Dashboard;

public sealed class DashboardModelTests
{
    private readonly DashboardModel _model = new(SampleCampaign.Source(SampleCampaign.Standing(48)), SampleCampaign.Code, SampleCampaign.Find);

    [Fact]
    public void At_the_start_every_experiment_is_there_in_the_order_of_the_plan()
    {
        Assert.Equal(48, _model.RowCount);
        Assert.Equal(Enumerable.Range(1, 48), Codes().Select(c => int.Parse(c[1..], System.Globalization.CultureInfo.InvariantCulture)));
        Assert.Equal("E1", _model.Selected!.Plan.Code);
    }

    [Fact]
    public void Every_column_sorts_both_ways_and_leaves_what_has_no_value_last()
    {
        foreach (ExperimentColumn column in ExperimentColumn.All.Where(c => c.Number is not null))
        {
            _model.SortBy(column);
            Assert.Equal(48, _model.RowCount);
            double[] rising = Values(column);
            Assert.Equal(rising.Order(), rising);
            _model.SortBy(column);
            Assert.True(_model.IsFalling);
            double[] falling = Values(column);
            Assert.Equal(falling.OrderDescending(), falling);
            Assert.Equal(rising.Length, falling.Length);
            Assert.All(Enumerable.Range(falling.Length, 48 - falling.Length), row => Assert.Null(column.Number!(_model.RowAt(row))));
        }
    }

    [Fact]
    public void Ties_stay_in_the_order_of_the_plan_either_way()
    {
        ExperimentColumn groups = ExperimentColumn.Named("groups");
        for (int way = 0; way < 2; way++)
        {
            _model.SortBy(groups);
            int[] tied = [.. Enumerable.Range(0, 48).Select(_model.RowAt).Where(e => e.GroupCount == 4).Select(e => e.Position)];
            Assert.Equal(tied.Order(), tied);
        }
    }

    [Fact]
    public void Codes_are_sorted_as_people_count()
    {
        _model.SortBy(ExperimentColumn.Named("title"));
        _model.SortBy(ExperimentColumn.Named("experiment"));
        Assert.Equal(["E1", "E2", "E3"], Codes().Take(3));
        Assert.Equal("E48", Codes().Last());
    }

    [Theory]
    [InlineData("E2", "E10", -1)]
    [InlineData("E10", "E2", 1)]
    [InlineData("E12", "E123", -1)]
    [InlineData("E19b", "E110a", -1)]
    [InlineData("a", "b", -1)]
    [InlineData("E1", "E01", 0)]
    [InlineData("E000", "E1", -1)]
    [InlineData("E1234567890", "E987654321", 1)]
    [InlineData("E1", "E1", 0)]
    public void Numbers_inside_codes_are_compared_as_numbers(string first, string second, int sign)
    {
        Assert.Equal(sign, Math.Sign(string.CompareOrdinal(CodeOrder.KeyOf(first), CodeOrder.KeyOf(second))));
        Assert.Equal(-sign, Math.Sign(string.CompareOrdinal(CodeOrder.KeyOf(second), CodeOrder.KeyOf(first))));
    }

    [Fact]
    public void Sorting_and_filtering_keep_the_selected_experiment()
    {
        _model.Select(20);
        _model.SortBy(ExperimentColumn.Named("p"));
        Assert.Equal("E21", _model.Selected!.Plan.Code);
        _model.SetFilter("survives:yes");
        Assert.Equal("E21", _model.Selected!.Plan.Code);
        _model.SetFilter("survives:no");
        Assert.Equal(0, _model.SelectedRow);
    }

    [Fact]
    public void A_filter_without_rows_selects_nothing_and_gives_everything_back()
    {
        _model.SetFilter("no such words");
        Assert.Equal((0, -1, null), (_model.RowCount, _model.SelectedRow, _model.Selected));
        Assert.Null(_model.SelectedDetail());
        _model.SetFilter("");
        Assert.Equal(48, _model.RowCount);
        Assert.NotNull(_model.SelectedDetail());
    }

    [Theory]
    [InlineData("p<0.01")]
    [InlineData("P<1e-2")]
    public void A_condition_on_p_compares_the_p_value(string filter)
    {
        _model.SetFilter(filter);
        Assert.Null(_model.FilterProblem);
        Assert.Equal(_model.Standing.Experiments.Count(e => e.P?.Value < 0.01), _model.RowCount);
    }

    [Fact]
    public void Words_and_conditions_must_all_hold()
    {
        _model.SetFilter("BLEND steel n>=32 survives:yes");
        Assert.Equal(_model.Standing.Experiments.Count(e => e.Plan.Title.Contains("Blend", StringComparison.Ordinal) && e.ObservationCount >= 32 && e.Survives == true), _model.RowCount);
        _model.SetFilter("no-replication");
        Assert.All(Enumerable.Range(0, _model.RowCount).Select(_model.RowAt), e => Assert.Equal(ExperimentStatus.NoReplication, e.Status));
        Assert.True(_model.RowCount > 0);
        _model.SetFilter("survives:open");
        Assert.Equal(8, _model.RowCount);
    }

    [Theory]
    [InlineData("p<")]
    [InlineData("p<x")]
    [InlineData("p<NaN")]
    [InlineData("q<0.1")]
    [InlineData("<3")]
    [InlineData("title=a")]
    [InlineData("survives:maybe")]
    public void A_filter_that_cannot_be_read_says_so_and_leaves_the_rows(string filter)
    {
        _model.SetFilter("survives:yes");
        int rows = _model.RowCount;
        _model.SetFilter("survives:yes " + filter);
        Assert.NotNull(_model.FilterProblem);
        Assert.Equal(rows, _model.RowCount);
        _model.SetFilter("");
        Assert.Null(_model.FilterProblem);
    }

    [Fact]
    public void Sorting_by_neighbours_goes_round_through_the_order_of_the_plan()
    {
        List<string?> seen = [];
        for (int i = 0; i <= ExperimentColumn.All.Count; i++)
        {
            _model.SortByNeighbour(1);
            seen.Add(_model.SortColumn?.Name);
        }

        Assert.Equal([.. ExperimentColumn.All.Select(c => c.Name), null], seen);
        _model.SortByNeighbour(-1);
        Assert.Equal("status", _model.SortColumn!.Name);
    }

    [Fact]
    public void A_detail_is_loaded_once_and_again_after_reloading()
    {
        CampaignStanding first = SampleCampaign.Standing(48);
        int loads = 0;
        CampaignStanding next = first with { Experiments = [.. first.Experiments.Skip(2)] };
        DashboardModel model = new(new SampleSource(first, next) { OnDetail = _ => loads++ }, SampleCampaign.Code, SampleCampaign.Find);
        model.Select(5);
        model.SelectedDetail();
        model.SelectedDetail();
        Assert.Equal(1, loads);
        model.Reload();
        Assert.Equal("E6", model.Selected!.Plan.Code);
        Assert.Equal(46, model.RowCount);
        model.SelectedDetail();
        Assert.Equal(2, loads);
    }

    [Fact]
    public void Another_campaign_opens_in_the_order_of_its_plan_and_without_filter_and_marks()
    {
        CampaignStanding other = SampleCampaign.Standing(5);
        other = other with { Campaign = other.Campaign with { Code = "SEALS-26" } };
        DashboardModel model = new(new SampleSource(SampleCampaign.Standing(48)) { Others = [other] }, SampleCampaign.Code, SampleCampaign.Find);
        model.SortByNeighbour(1);
        model.SetFilter("survives:yes");
        model.MarkSelected();
        int edition = model.Edition;
        model.Open("SEALS-26");
        Assert.Equal(("SEALS-26", 5, 0, "E1"), (model.Heading.Code, model.RowCount, model.Marks.Count, model.Selected!.Plan.Code));
        Assert.Equal(("", null), (model.FilterText, model.SortColumn));
        Assert.NotEqual(edition, model.Edition);
        model.Open(SampleCampaign.Code);
        Assert.Equal((SampleCampaign.Code, 48), (model.Heading.Code, model.RowCount));
    }

    [Fact]
    public void Ranks_run_from_the_smallest_p_value_and_tell_those_below_the_range_of_doubles_apart()
    {
        Ranking ranking = _model.Ranking;
        Assert.Equal((40, 48), (ranking.Count, ranking.FamilySize));
        Assert.Equal("E1", ranking.At(1).Plan.Code);
        Assert.All(Enumerable.Range(2, ranking.Count - 1), r => Assert.True(ranking.Log10At(r - 1) <= ranking.Log10At(r)));
        Assert.Equal(ranking.At(ranking.SurvivorCount).P, ranking.LargestSurvivor);
        Assert.Equal(0, ranking.RankOf(5));
        Assert.Equal(1, ranking.RankOf(0));
        Assert.Equal(0.05 * 3 / 48, ranking.BoundaryAt(3));
    }

    [Theory]
    [InlineData(1, "is out of date: 1 awaits a new test")]
    [InlineData(3, "is out of date: 3 await a new test")]
    public void A_review_is_not_up_to_date_while_experiments_await_a_new_test(int awaiting, string words)
    {
        CampaignHeading heading = new(SampleCampaign.Standing(12) with { AwaitingNewTest = awaiting }, new RisingCorrection());
        Assert.EndsWith(words, heading.Review, StringComparison.Ordinal);
        Assert.Equal(words, heading.ReviewTrouble);
    }

    [Theory]
    [InlineData(0, false, "is up to date", false)]
    [InlineData(1, false, "is behind by 1 result", true)]
    [InlineData(7, false, "is behind by 7 results", true)]
    [InlineData(0, true, "is interim: tested ones only", true)]
    public void The_heading_says_whether_the_last_review_is_up_to_date(int since, bool interim, string words, bool isTrouble)
    {
        CampaignStanding standing = SampleCampaign.Standing(48) with { ResultsSinceReview = since };
        standing = standing with { LastReview = standing.LastReview! with { IsInterim = interim } };
        CampaignHeading heading = new(standing, new RisingCorrection());
        Assert.Equal("review 3 of 2026-05-01 " + words, heading.Review);
        Assert.Equal(isTrouble, heading.ReviewTrouble is not null);
        Assert.Equal("no review stored yet", new CampaignHeading(standing with { LastReview = null }, null).Review);
    }

    // Wide limits: they catch a cost that grows with the square of the rows, not a slow machine.
    [Fact]
    public void A_hundred_thousand_experiments_are_sorted_and_filtered_without_a_wait()
    {
        DashboardModel model = new(SampleCampaign.Source(SampleCampaign.Standing(100_000)), SampleCampaign.Code, SampleCampaign.Find);
        long start = Stopwatch.GetTimestamp();
        foreach (ExperimentColumn column in ExperimentColumn.All)
        {
            model.SortBy(column);
            model.SetFilter("blend " + column.Name[..1]);
        }

        Assert.True(Stopwatch.GetElapsedTime(start) < TimeSpan.FromSeconds(20));
        Assert.True(model.RowCount > 0);
    }

    private IEnumerable<string> Codes() => Enumerable.Range(0, _model.RowCount).Select(row => _model.RowAt(row).Plan.Code);

    private double[] Values(ExperimentColumn column) =>
        [.. Enumerable.Range(0, _model.RowCount).Select(row => column.Number!(_model.RowAt(row))).TakeWhile(v => v is not null).Select(v => v!.Value)];
}
