using Campaigns.Statistics.Corrections;

namespace Campaigns.Domain.Tests;

public sealed class CorrectionsBesideTests
{
    [Theory]
    [InlineData("holm")]
    [InlineData("none")]
    [InlineData("by")]
    public void The_sealed_correction_comes_first_and_every_other_once(string correction)
    {
        CampaignStanding standing = JudgedCampaign.Of(ErrorRate.Familywise, correction, 0.001, null, 0.3);
        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(standing);
        Assert.Equal((correction, true), (outcomes[0].Procedure.Key, outcomes[0].IsSealed));
        Assert.All(outcomes.Skip(1), o => Assert.False(o.IsSealed));
        Assert.Equal(CorrectionRegistry.FromPAlone.Select(c => c.Key).Order(StringComparer.Ordinal), outcomes.Select(o => o.Procedure.Key).Order(StringComparer.Ordinal));
        Assert.Equal(standing.Experiments.Where(e => e.P is not null).Select(e => e.AdjustedP), outcomes[0].Adjusted);
        Assert.All(outcomes, o => Assert.Equal(2, o.Adjusted.Count));
    }

    // R 4.2.2, p = 0.001, 0.02, 0.03, 0.04, 0.05 of five: Bonferroni and Holm leave the first below 0.05 (Holm 0.005, 0.08, ...), Hochberg and BH all, BY the first alone (0.0114, 0.1142, ...).
    [Fact]
    public void What_survives_under_some_of_a_kind_and_not_under_others_hangs_on_the_choice()
    {
        double?[] p = [0.001, 0.02, 0.03, 0.04, 0.05, null];
        IReadOnlyList<CorrectionOutcome> familywise = CorrectionsBeside.Of(JudgedCampaign.Of(ErrorRate.Familywise, "holm", p[..5]));
        Assert.Equal((1, 5), (Of(familywise, "holm").SurvivorCount, Of(familywise, "hochberg").SurvivorCount));
        Assert.False(CorrectionsBeside.Hangs(familywise, ErrorRate.Familywise, 0));
        Assert.All([1, 2, 3, 4], place => Assert.True(CorrectionsBeside.Hangs(familywise, ErrorRate.Familywise, place)));
        Assert.Contains("hochberg", CorrectionsBeside.SurvivesUnder(familywise, ErrorRate.Familywise, 4));
        Assert.DoesNotContain("holm", CorrectionsBeside.SurvivesUnder(familywise, ErrorRate.Familywise, 4));
        Assert.DoesNotContain("bh", CorrectionsBeside.SurvivesUnder(familywise, ErrorRate.Familywise, 0));

        IReadOnlyList<CorrectionOutcome> discovery = CorrectionsBeside.Of(JudgedCampaign.Of(ErrorRate.FalseDiscovery, "bh", p[..5]));
        Assert.Equal((5, 1), (Of(discovery, "bh").SurvivorCount, Of(discovery, "by").SurvivorCount));
        Assert.False(CorrectionsBeside.Hangs(discovery, ErrorRate.FalseDiscovery, 0));
        Assert.True(CorrectionsBeside.Hangs(discovery, ErrorRate.FalseDiscovery, 4));
    }

    [Fact]
    public void Planned_experiments_count_under_every_correction()
    {
        // 0.02 of one tested and four planned: 0.02 x 5 under Bonferroni, Holm, Hochberg and BH alike.
        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(JudgedCampaign.Of(ErrorRate.Familywise, "bonferroni", 0.02, null, null, null, null));
        Assert.All((string[])["bonferroni", "holm", "hochberg", "bh"], key => Assert.Equal(0.1, Of(outcomes, key).Adjusted[0]!.Value.Value, 1e-16));
    }

    [Fact]
    public void A_sealed_plan_of_several_corrections_stands_beside_each_of_them()
    {
        CampaignStanding one = JudgedCampaign.Of(ErrorRate.Familywise, "holm", 0.001, 0.3);
        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(one with { Families = [one.Families[0], one.Families[0] with { Name = "b", Correction = "hommel" }] });
        Assert.Equal(("as-sealed", true), (outcomes[0].Key, outcomes[0].IsSealed));
        Assert.Single(outcomes, o => o.Key == "holm");
        Assert.Single(outcomes, o => o.IsSealed);
    }

    [Fact]
    public void A_campaign_without_results_is_shown_too() =>
        Assert.All(CorrectionsBeside.Of(JudgedCampaign.Of(ErrorRate.Familywise, "holm", null, null)), o => Assert.Equal((0, 0), (o.Adjusted.Count, o.SurvivorCount)));

    // Bonferroni by hand. Six planned, four tested: 0.001, 0.01, 0.0124, 0.2 times 6 are 0.006, 0.06, 0.0744, 1.2; times 4: 0.004, 0.04, 0.0496, 0.8.
    [Fact]
    public void One_thing_changed_at_a_time_gains_and_loses_what_it_must()
    {
        CampaignStanding standing = JudgedCampaign.Of(ErrorRate.Familywise, "bonferroni", 0.001, 0.01, null, 0.0124, 0.2, null);
        IReadOnlyList<PlanScenario> scenarios = PlanScenarios.Of(standing, [.. ((double[])[0.005, 0.05, 0.1]).Select(l => new Statistics.Probability.SignificanceLevel(l))]);
        AssertScenario(scenarios[0], "sealed", "", 1, [], []);
        AssertScenario(scenarios[1], "level", "0.005", 0, [], ["E1"]);
        AssertScenario(scenarios[2], "level", "0.1", 3, ["E2", "E4"], []);
        AssertScenario(scenarios[3], "family", "the 4 tested alone instead of 6 planned", 3, ["E2", "E4"], []);
        Assert.All(scenarios.Skip(4), s => Assert.Equal("correction", s.Kind));
        AssertScenario(scenarios.Single(s => s.Changed == "none"), "correction", "none", 3, ["E2", "E4"], []);
        Assert.DoesNotContain(scenarios, s => s.Changed == "bonferroni");
    }

    private static CorrectionOutcome Of(IReadOnlyList<CorrectionOutcome> outcomes, string key) => outcomes.Single(o => o.Procedure.Key == key);

    private static void AssertScenario(PlanScenario scenario, string kind, string changed, int survivors, string[] gained, string[] lost)
    {
        Assert.Equal((kind, changed, survivors), (scenario.Kind, scenario.Changed, scenario.SurvivorCount));
        Assert.Equal(gained, scenario.Gained);
        Assert.Equal(lost, scenario.Lost);
    }
}
