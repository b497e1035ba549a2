using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Domain.Tests;

public sealed class ComparisonVerdictTests
{
    private static readonly string[] Labels = ["a", "b", "c", "d", "e"];

    // Six experiments of which three are selected: 40-digit arithmetic (mpmath), tests/reference/campaign/generate/10_selective.py.
    [Fact]
    public void A_campaign_that_holds_the_false_discovery_rate_claims_what_the_reference_claims()
    {
        var verdict = Verdict(ErrorRate.FalseDiscovery, 6, 3);
        foreach (ReferenceRow pair in ReferenceTable.Read("campaign/selective_pairs.csv").Rows)
        {
            bool selected = pair.Integer("experiment_selected") == 1;
            ExperimentComparison judged = Judge(verdict, selected, new GroupComparison(pair.Integer("group_a") - 1, pair.Integer("group_b") - 1, 1) { P = PValue.FromValue(pair.Number("holm_within")) });
            Assert.Equal(pair.Integer("bb_holm_reject_q0.05") == 1, judged.Survives);
            Assert.Equal(selected, judged.AdjustedP is not null);
            Assert.Equal(judged.Survives == true, judged.NotClaimedBecause is null);
            Assert.Equal((Labels[pair.Integer("group_a") - 1], Labels[pair.Integer("group_b") - 1]), (judged.GroupA, judged.GroupB));
            if (selected)
            {
                double expected = pair.Number("bb_holm_adjusted");
                Assert.Equal(expected, judged.AdjustedP!.Value.Value, 4e-16 * expected);
            }
        }
    }

    // Six hypotheses: 6 x 0.008 = 0.048, 6 x 0.009 = 0.054.
    [Theory]
    [InlineData(0.008, true, 0.048, true, null)]
    [InlineData(0.009, true, 0.054, false, "its adjusted p is above the level")]
    [InlineData(0.5, true, 1.0, false, "its adjusted p is above the level")]
    [InlineData(0.001, false, 0.006, false, "its experiment does not survive")]
    public void A_familywise_campaign_multiplies_by_its_whole_family(double p, bool selected, double adjusted, bool claimed, string? because)
    {
        ExperimentComparison judged = Judge(Verdict(ErrorRate.Familywise, 6, 2), selected, new GroupComparison(0, 1, 1) { P = PValue.FromValue(p) });
        Assert.Equal(adjusted, judged.AdjustedP!.Value.Value, 1e-15);
        Assert.Equal((claimed, because), (judged.Survives!.Value, judged.NotClaimedBecause));
    }

    [Theory]
    [InlineData(ErrorRate.Familywise)]
    [InlineData(ErrorRate.FalseDiscovery)]
    public void A_comparison_that_cannot_be_made_is_neither_claimed_nor_denied_and_keeps_its_obstacle(ErrorRate rate)
    {
        ExperimentComparison judged = Judge(Verdict(rate, 6, 2), true, new GroupComparison(0, 1, 1) { Obstacle = "a group with one value has no variance of its own" });
        Assert.Null(judged.Survives);
        Assert.Null(judged.AdjustedP);
        Assert.Equal("a group with one value has no variance of its own", judged.NotClaimedBecause);
    }

    [Theory]
    [InlineData(ErrorRate.Familywise)]
    [InlineData(ErrorRate.FalseDiscovery)]
    public void Where_nothing_survives_nothing_is_claimed_and_nothing_is_divided_by_nought(ErrorRate rate)
    {
        var verdict = Verdict(rate, 6, 0);
        ExperimentComparison judged = Judge(verdict, false, new GroupComparison(0, 1, 1) { P = PValue.FromValue(1e-9) });
        Assert.False(judged.Survives);
        Assert.DoesNotContain("0/6", verdict.Guarantee, StringComparison.Ordinal);
        Assert.EndsWith(".", verdict.Guarantee, StringComparison.Ordinal);
    }

    [Fact]
    public void An_experiment_without_a_verdict_claims_nothing()
    {
        ExperimentResult untested = Experiment(null);
        var verdict = Verdict(ErrorRate.FalseDiscovery, 6, 2);
        Assert.False(Assert.Single(verdict.Judge(untested, Labels, [new GroupComparison(0, 1, 1) { P = PValue.FromValue(1e-9) }])).Survives);
        Assert.Empty(verdict.Judge(untested, Labels, []));
    }

    [Fact]
    public void What_is_held_is_told_with_its_figures()
    {
        Assert.Contains("level 0.05 x 2/6", Verdict(ErrorRate.FalseDiscovery, 6, 2).Guarantee, StringComparison.Ordinal);
        Assert.Contains("level 0.05/6", Verdict(ErrorRate.Familywise, 6, 2).Guarantee, StringComparison.Ordinal);
    }

    // By hand: family a 0.01 x 3/2 = 0.015, family b 0.01 x 4/1 = 0.04.
    [Fact]
    public void Under_false_discovery_control_a_family_pays_for_its_own_selection()
    {
        var verdict = new ComparisonVerdict(Campaign(ErrorRate.FalseDiscovery), [Standing("a", 0.05, 3, 2), Standing("b", 0.02, 4, 1)]);
        Assert.Equal((0.015, true), Judged(verdict, "a", 0.01));
        Assert.Equal((0.04, false), Judged(verdict, "b", 0.01));
        Assert.Contains("In the family 'b' comparisons are claimed only inside the 1 surviving of 4 experiments, at level 0.02 x 1/4", verdict.Guarantee, StringComparison.Ordinal);
    }

    // By hand: 0.002 x 3, and in b by the weights 0.002 x 8/2.
    [Fact]
    public void Under_familywise_control_an_experiment_has_the_share_of_its_weight()
    {
        var verdict = new ComparisonVerdict(Campaign(ErrorRate.Familywise), [Standing("a", 0.03, 3, 2), Standing("b", 0.02, 4, 1) with { WeightTotal = 8 }]);
        Assert.Equal((0.006, true), Judged(verdict, "a", 0.002, weight: 2));
        Assert.Equal((0.008, true), Judged(verdict, "b", 0.002, weight: 2));
        Assert.Equal((0.016, true), Judged(verdict, "b", 0.002));
        Assert.Equal((1.0, false), Judged(verdict, "b", 1e-300, weight: 0));
        Assert.Contains("each experiment's at level 0.02 times its weight over 8", verdict.Guarantee, StringComparison.Ordinal);
    }

    // Two families at 0.05 each, the second behind a gate "all": the levels of comparisons are halved, 0.002 x 3 x 2.
    [Fact]
    public void Comparisons_pay_for_families_behind_a_gate_too()
    {
        var verdict = new ComparisonVerdict(Campaign(ErrorRate.Familywise), [Standing("a", 0.05, 3, 3), Standing("b", 0.05, 3, 1)]);
        Assert.Equal((0.012, true), Judged(verdict, "a", 0.002));
        Assert.Equal((0.06, false), Judged(verdict, "b", 0.01));
        Assert.Contains("each experiment's at level 0.05/3. Since a family behind a gate costs nothing for experiments but does for comparisons, these levels are divided by 2: over all families the probability of any false comparison in the campaign is at most 0.05", verdict.Guarantee, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(0.001, 0.2, 0.2)]
    [InlineData(0.1, 0.2, 0.6)]
    public void Inside_an_experiment_that_does_not_survive_no_comparison_has_a_smaller_adjusted_p_than_the_experiment(double p, double ofExperiment, double adjusted)
    {
        ExperimentResult experiment = Experiment(false) with { AdjustedP = PValue.FromValue(ofExperiment) };
        ExperimentComparison judged = Assert.Single(Verdict(ErrorRate.Familywise, 6, 2).Judge(experiment, Labels, [new GroupComparison(0, 1, 1) { P = PValue.FromValue(p) }]));
        Assert.Equal((adjusted, false), (Math.Round(judged.AdjustedP!.Value.Value, 12), judged.Survives!.Value));
    }

    // Under the two-stage procedure an experiment's own p can change the number of survivors: .069 .009 .057 .057 .005 .033 at 0.05 gives six, with .016 for .009 two, that one among them.
    [Fact]
    public void What_is_not_proved_under_a_procedure_whose_survivors_hang_on_one_of_them_is_said()
    {
        double[] six = [0.069, 0.009, 0.057, 0.057, 0.005, 0.033];
        Correction twoStage = CorrectionRegistry.Find("bky")!;
        Assert.Equal(6, twoStage.Adjust(RankedFamily.Of([.. six.Select(PValue.FromValue)], 6)).Count(p => p.Value <= 0.05));
        six[1] = 0.016;
        PValue[] changed = twoStage.Adjust(RankedFamily.Of([.. six.Select(PValue.FromValue)], 6));
        Assert.Equal((2, true), (changed.Count(p => p.Value <= 0.05), changed[1].Value <= 0.05));
        Assert.False(twoStage.IsSimpleSelection);
        string text = new ComparisonVerdict(Campaign(ErrorRate.FalseDiscovery), [new FamilyStanding("", "bky", new SignificanceLevel(0.05), 6, 6, 6, 6)]).Guarantee;
        Assert.EndsWith("so that here it is not proved.", text, StringComparison.Ordinal);
        Assert.DoesNotContain("not proved", Verdict(ErrorRate.FalseDiscovery, 6, 6).Guarantee, StringComparison.Ordinal);
    }

    private static FamilyStanding Standing(string name, double level, int size, int survivors) => new(name, "holm", new SignificanceLevel(level), size, size, size, survivors);

    private static (double, bool) Judged(ComparisonVerdict verdict, string family, double p, double? weight = null)
    {
        ExperimentResult experiment = Experiment(true) with { Plan = new PlannedExperiment { Code = "E", Test = "f", FollowUp = "holm-pairs", Family = family, Weight = weight } };
        ExperimentComparison judged = Assert.Single(verdict.Judge(experiment, Labels, [new GroupComparison(0, 1, 1) { P = PValue.FromValue(p) }]));
        return (Math.Round(judged.AdjustedP!.Value.Value, 15), judged.Survives!.Value);
    }

    private static ExperimentComparison Judge(ComparisonVerdict verdict, bool survives, GroupComparison comparison) =>
        Assert.Single(verdict.Judge(Experiment(survives), Labels, [comparison]));

    private static ExperimentResult Experiment(bool? survives) => new()
    {
        Plan = new PlannedExperiment { Code = "E", Test = "f", FollowUp = "holm-pairs" },
        Position = 1,
        Status = survives is null ? ExperimentStatus.Ready : ExperimentStatus.Tested,
        Survives = survives,
    };

    private static Campaign Campaign(ErrorRate rate) => new()
    {
        Code = "C",
        ErrorRate = rate,
        Level = new SignificanceLevel(0.05),
        Correction = rate == ErrorRate.Familywise ? "holm" : "bh",
        OpenedAt = DateTimeOffset.UnixEpoch,
    };

    private static ComparisonVerdict Verdict(ErrorRate rate, int size, int survivors) =>
        new(Campaign(rate), [new FamilyStanding("", "bh", Campaign(rate).Level, size, size, size, survivors)]);
}
