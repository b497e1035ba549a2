using Campaigns.App.Dashboard.Model;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Dashboard;

public sealed class RankingModelTests
{
    [Theory]
    [InlineData("bh", 0.1)]
    [InlineData("holm", 0.001)]
    [InlineData("storey", 0.2)]
    public void Another_level_keeps_exactly_the_experiments_whose_adjusted_p_is_at_most_it(string correction, double level)
    {
        (DashboardModel model, RankingModel ranking) = Models(SampleCampaigns.By(correction));
        ranking.LookAt(level);
        LevelExploration explored = ranking.Exploration!;
        int[] would = Places(model.Standing, e => e.AdjustedP is { } p && p.Value <= level), now = Places(model.Standing, e => e.Survives == true);
        Assert.Equal(would.Length, explored.SurvivorCount);
        Assert.Equal(would.Except(now), explored.Gained.Order());
        Assert.Equal(now.Except(would), explored.Lost.Order());
        Assert.NotEmpty(explored.Gained.Concat(explored.Lost));

        // The campaign itself is as it was.
        Assert.Equal(0.05, model.Standing.Campaign.Level.Value);
        Assert.Equal(now.Length, ranking.Ranking.SurvivorCount);
    }

    [Fact]
    public void Levels_go_up_and_down_by_steps_that_people_would_type_and_come_back_to_the_sealed_one()
    {
        (_, RankingModel ranking) = Models(SampleCampaigns.By("bh"));
        ranking.MoveLevel(1);
        Assert.Equal(0.06, ranking.Exploration!.Level.Value);
        ranking.MoveLevel(-2);
        Assert.Equal(0.04, ranking.Exploration!.Level.Value);
        ranking.MoveLevel(1);
        Assert.Null(ranking.Exploration);
        ranking.MoveLevel(1000);
        Assert.Equal(0.8, ranking.Exploration!.Level.Value);
        ranking.MoveLevel(-1000);
        Assert.Equal(1e-4, ranking.Exploration!.Level.Value);
    }

    [Fact]
    public void A_sealed_level_that_nobody_would_type_is_a_step_of_its_own()
    {
        LevelLadder ladder = new(0.0371);
        Assert.Equal(0.0371, ladder.From(0.03, 1));
        Assert.Equal(0.0371, ladder.From(0.04, -1));
        Assert.Equal(0.04, ladder.From(0.038, 1));
        Assert.Equal(0.0371, ladder.From(0.038, -1));
        Assert.Equal(0.0371, ladder.Nearest(0.037));
        Assert.True(new LevelLadder(1e-9).Lowest < 1e-9);
    }

    [Fact]
    public void Families_are_ranked_each_on_its_own_and_follow_the_selected_experiment()
    {
        (DashboardModel model, RankingModel ranking) = Models(SampleCampaigns.InFamilies());
        Assert.Equal("films", ranking.Family.Name);
        foreach (string name in new[] { "inks", "late", "films" })
        {
            ranking.TurnFamily(1);
            Assert.Equal(name, ranking.Family.Name);
            int[] members = Places(model.Standing, e => e.P is not null && e.Plan.Family == name);
            Assert.Equal(members.OrderBy(i => model.Standing.Experiments[i].P!.Value.Log), Enumerable.Range(1, ranking.Ranking.Count).Select(ranking.Ranking.PositionAt));
            Assert.Equal(1, ranking.Rank);
            Assert.Equal(ranking.Family.Size, ranking.Ranking.FamilySize);
        }

        model.SelectPosition(Places(model.Standing, e => e.Plan.Family == "inks")[0]);
        Assert.Equal("inks", ranking.Family.Name);
        Assert.Equal(0.02 / 12, ranking.Beside.Single(b => b.Line.Correction.Key == "bonferroni").Line.At(1)!.Value, 1e-15);
    }

    [Fact]
    public void Another_level_deals_out_shares_of_it_and_keeps_gates()
    {
        (DashboardModel model, RankingModel ranking) = Models(SampleCampaigns.InFamilies());
        ranking.LookAt(0.1);
        Assert.Equal([0.06, 0.04, 0.06], ranking.Exploration!.Families.Select(f => Math.Round(f.Level.Value, 12)));
        Assert.False(ranking.Exploration.Families[2].IsOpen);
        Assert.DoesNotContain(ranking.Exploration.Gained, i => model.Standing.Experiments[i].Plan.Family == "late");
        Assert.Equal(0.06, ranking.ExploredLine!.Level.Value, 1e-12);
    }

    [Fact]
    public void A_stream_is_not_looked_at_with_another_level()
    {
        (_, RankingModel ranking) = Models(SampleCampaigns.InStream());
        ranking.MoveLevel(3);
        Assert.Null(ranking.Exploration);
        Assert.Contains("given its level", ranking.WhyNoExploration, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("bh")]
    [InlineData("holm")]
    public void Survivors_under_every_correction_are_those_that_the_command_gives(string correction)
    {
        (DashboardModel model, RankingModel ranking) = Models(SampleCampaigns.By(correction));
        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(model.Standing);
        Assert.Equal(outcomes.Select(o => (o.Key, (int?)o.SurvivorCount, o.IsSealed)), ranking.Rows.Select(r => (r.Key, r.Survivors, r.IsSealed)));
        Assert.Equal(Enumerable.Range(0, model.Standing.TestedCount).Count(i => CorrectionsBeside.Hangs(outcomes, model.Standing.Campaign.ErrorRate, i)), ranking.Hanging);
    }

    [Fact]
    public void Boundaries_are_drawn_and_taken_off_one_by_one_and_the_sealed_one_stays()
    {
        (_, RankingModel ranking) = Models(SampleCampaigns.By("bh"));
        Assert.Equal(["none", "bonferroni", "holm"], ranking.Beside.Select(b => b.Line.Correction.Key));
        ranking.PointAt(0);
        ranking.TurnPointed();
        Assert.Equal(3, ranking.Beside.Count);
        int sidak = ranking.Rows.ToList().FindIndex(r => r.Key == "sidak");
        ranking.PointAt(sidak);
        ranking.TurnPointed();
        Assert.Contains(ranking.Beside, b => b.Line.Correction.Key == "sidak" && b.Sign == ranking.Rows[sidak].Letter);
        ranking.TurnPointed();
        Assert.Equal(3, ranking.Beside.Count);
        Assert.Null(ranking.Rows.Single(r => r.Key == "hommel").Letter);
        Assert.Equal("abcdefg", string.Concat(ranking.Rows.Select(r => r.Letter)));
        ranking.Point(-1);
        Assert.Equal("bonferroni", ranking.Rows[ranking.Pointed].Key);
    }

    [Fact]
    public void Every_p_value_stands_in_one_bar_and_the_line_is_the_share_times_a_twentieth()
    {
        CampaignStanding standing = SampleCampaigns.By("bh", 200);
        PHistogram histogram = new(standing);
        double[] p = [.. standing.Experiments.Where(e => e.P is not null).Select(e => e.P!.Value.Value)];
        for (int bar = 0; bar < PHistogram.Bars; bar++)
        {
            double low = bar / 20.0, high = (bar + 1) / 20.0;
            Assert.Equal(p.Count(v => v <= high && (v > low || bar == 0)), histogram.Counts[bar]);
        }

        // Storey (2002): the p-values above one half, doubled, over all.
        double share = Math.Min(1, 2.0 * p.Count(v => v > 0.5) / p.Length);
        Assert.Equal(share * p.Length / 20, histogram.ExpectedNulls!.Value, 1e-12);
    }

    [Theory]
    [InlineData(0.05, 0)]
    [InlineData(0.05000000000000001, 1)]
    [InlineData(0.15, 2)]
    [InlineData(0.15000000000000002, 3)]
    [InlineData(1, 19)]
    [InlineData(0, 0)]
    public void A_p_value_on_the_edge_belongs_to_the_bar_that_ends_there(double p, int bar)
    {
        CampaignStanding one = SampleCampaign.Standing(1);
        PHistogram histogram = new(one with { Experiments = [one.Experiments[0] with { P = PValue.FromValue(p) }] });
        Assert.Equal(1, histogram.Counts[bar]);
    }

    [Fact]
    public void A_load_ends_the_exploration_and_reads_everything_again()
    {
        CampaignStanding before = SampleCampaigns.By("bh"), after = SampleCampaigns.By("none");
        DashboardModel model = new(new SampleSource(before, after), SampleCampaign.Code, SampleCampaign.Find);
        RankingModel ranking = new(model);
        ranking.LookAt(0.2);
        Assert.NotNull(ranking.Exploration);
        int survivors = ranking.Ranking.SurvivorCount;
        model.Reload();
        Assert.Null(ranking.Exploration);
        Assert.NotEqual(survivors, ranking.Ranking.SurvivorCount);
        Assert.Equal("none", ranking.Rows[0].Key);
        Assert.DoesNotContain(ranking.Beside, b => b.Line.Correction.Key == "none");
    }

    [Fact]
    public async Task Large_campaigns_are_reckoned_beside_the_screen_and_give_the_same()
    {
        CampaignStanding standing = SampleCampaigns.By("bh", Reckoning.FewExperiments + 1);
        (_, RankingModel ranking) = Models(standing);
        Assert.All(ranking.Rows.Where(r => !r.IsSealed && !ranking.Outcomes!.IsDone), r => Assert.Null(r.Survivors));
        for (int i = 0; i < 600 && !ranking.Outcomes!.IsDone; i++)
        {
            await Task.Delay(50, TestContext.Current.CancellationToken);
        }

        Assert.Equal(CorrectionsBeside.Of(standing).Select(o => (int?)o.SurvivorCount), ranking.Rows.Select(r => r.Survivors));
    }

    private static (DashboardModel Model, RankingModel Ranking) Models(CampaignStanding standing)
    {
        DashboardModel model = new(SampleCampaign.Source(standing), SampleCampaign.Code, SampleCampaign.Find);
        return (model, new RankingModel(model));
    }

    private static int[] Places(CampaignStanding standing, Predicate<ExperimentResult> condition) =>
        [.. Enumerable.Range(0, standing.Experiments.Count).Where(i => condition(standing.Experiments[i]))];
}
