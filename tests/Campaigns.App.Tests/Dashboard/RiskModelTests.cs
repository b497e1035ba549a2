using Campaigns.App.Dashboard.Model;
using Campaigns.Domain;

namespace Campaigns.App.Tests.Dashboard;

public sealed class RiskModelTests
{
    [Fact]
    public void Walking_goes_along_the_order_of_testing_and_not_of_the_plan()
    {
        CampaignStanding standing = SampleCampaigns.By("bh");
        SampleSource source = SampleCampaigns.Source(standing);
        DashboardModel model = new(source, SampleCampaign.Code, SampleCampaign.Find);
        RiskModel risk = new(model);
        risk.Begin();
        risk.GoTo(1);
        for (int test = 1; test <= source.Risk.Count; test++)
        {
            Assert.Equal(test, risk.Test);
            Assert.Same(source.Risk[test - 1].Experiment, model.Selected);
            risk.Walk(1);
        }

        Assert.Equal(source.Risk.Count, risk.Test);
        risk.Walk(-1000);
        Assert.Equal(1, risk.Test);
        Assert.NotEqual(standing.Experiments.Where(e => e.P is not null).Select(e => e.Plan.Code), source.Risk.Select(p => p.Experiment.Plan.Code));
    }

    [Fact]
    public void An_experiment_without_a_result_is_no_test_and_the_first_one_is_next_to_it()
    {
        CampaignStanding standing = SampleCampaigns.By("bh");
        DashboardModel model = new(SampleCampaigns.Source(standing), SampleCampaign.Code, SampleCampaign.Find);
        RiskModel risk = new(model);
        risk.Begin();
        model.SelectPosition(standing.Experiments.ToList().FindIndex(e => e.P is null));
        Assert.Equal(0, risk.Test);
        risk.Walk(1);
        Assert.Equal(1, risk.Test);
    }

    [Fact]
    public void Decisions_stand_in_the_order_of_the_stream_and_a_batch_correction_has_none()
    {
        CampaignStanding standing = SampleCampaigns.InStream();
        DashboardModel model = new(SampleCampaigns.Source(standing), SampleCampaign.Code, SampleCampaign.Find);
        RiskModel risk = new(model);
        risk.Begin();
        Assert.True(risk.IsOnline);
        Assert.Equal(Enumerable.Range(1, standing.Experiments.Count), risk.Decisions.Select(e => e.Entry!.Position));
        risk.GoToDecision(5);
        Assert.Equal(5, risk.Decision);
        risk.GoToDecision(1000);
        Assert.Equal(standing.Experiments.Count - 1, risk.Decision);
        RiskModel batch = new(new DashboardModel(SampleCampaigns.Source(SampleCampaigns.By("bh")), SampleCampaign.Code, SampleCampaign.Find));
        Assert.Empty(batch.Decisions);
        Assert.Equal(-1, batch.Decision);
    }

    [Fact]
    public void The_bound_of_the_smallest_p_values_is_the_one_of_marking_them()
    {
        CampaignStanding standing = SampleCampaigns.By("bh");
        DashboardModel model = new(SampleCampaigns.Source(standing), SampleCampaign.Code, SampleCampaign.Find);
        Assert.Equal(0, model.Marks.FalseAtMostOfSmallest(0));
        for (int k = 1; k <= model.Ranking.Count; k++)
        {
            model.Marks.Turn(model.Ranking.PositionAt(k));
            Assert.Equal(model.Marks.Bound.FalseAtMost, model.Marks.FalseAtMostOfSmallest(k));
        }
    }

    [Fact]
    public void Survivors_are_marked_together_and_taken_off_together()
    {
        CampaignStanding standing = SampleCampaigns.By("bh");
        DashboardModel model = new(SampleCampaigns.Source(standing), SampleCampaign.Code, SampleCampaign.Find);
        model.MarkSurvivors();
        Assert.Equal(standing.SurvivorCount, model.Marks.Count);
        Assert.All(model.Marks.Positions, i => Assert.True(standing.Experiments[i].Survives));
        Assert.Equal(CampaignRisk.Of(standing).SurvivorBound, model.Marks.Bound);
        model.MarkSurvivors();
        Assert.Equal(0, model.Marks.Count);
    }

    [Fact]
    public void A_correction_that_this_program_does_not_have_gives_no_risk_with_it()
    {
        RiskModel risk = new(new DashboardModel(SampleCampaign.Source(SampleCampaign.Standing(12)), SampleCampaign.Code, SampleCampaign.Find));
        Assert.Null(risk.Risk);
    }
}
