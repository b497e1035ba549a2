using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

/// <summary>Intervals inside survivors that account for the selection.</summary>
public sealed class SelectedComparisonsTests
{
    private static readonly string[] Labels = ["a", "b", "c", "d"];

    public static TheoryData<string> FollowUps => [.. FollowUpRegistry.All.Select(f => f.Key)];

    [Theory]
    [MemberData(nameof(FollowUps))]
    public void Under_either_error_rate_they_hold_at_the_experiments_share_and_claims_leave_out_zero(string key)
    {
        foreach ((ErrorRate rate, double risk) in (ReadOnlySpan<(ErrorRate, double)>)[(ErrorRate.FalseDiscovery, 0.05 * 3 / 8), (ErrorRate.Familywise, 0.05 / 8)])
        {
            IReadOnlyList<ExperimentComparison> judged = Judge(key, rate, survives: true);
            IReadOnlyList<GroupComparison> expected = FollowUp(key).Procedure.Compare(FollowUp(key).Estimates, 0, 1 - risk);
            Assert.Equal(expected.Count, judged.Count);
            Assert.Contains(judged, c => c.Survives == true);
            Assert.Contains(judged, c => c.Survives == false);
            foreach ((ExperimentComparison c, GroupComparison e) in judged.Zip(expected))
            {
                Assert.Equal((e.Lower, e.Upper), (c.SelectedInterval!.Value.Lower, c.SelectedInterval.Value.Upper));
                Assert.Equal(1 - risk, c.SelectedConfidence!.Value, 1e-15);
                Assert.True(c.SelectedInterval.Value.Lower < c.Comparison.Lower && c.SelectedInterval.Value.Upper > c.Comparison.Upper);
                bool leavesOut = c.SelectedInterval.Value.Lower > 0 || c.SelectedInterval.Value.Upper < 0;

                // Holm's p-values go with Bonferroni's intervals, which are wider.
                Assert.True(key == "holm-pairs" ? !leavesOut || c.Survives == true : leavesOut == c.Survives);
            }
        }
    }

    [Fact]
    public void What_does_not_survive_has_none()
    {
        Assert.All(Judge("tukey-kramer", ErrorRate.FalseDiscovery, survives: false), c => Assert.Equal((null, null), (c.SelectedInterval, c.SelectedConfidence)));
        Assert.All(Judge("tukey-kramer", ErrorRate.Familywise, survives: null), c => Assert.Null(c.SelectedInterval));
        Assert.Null(Verdict(ErrorRate.Familywise).SelectedRisk(Experiment("none", false)));
    }

    // Weight 2 of 10; two families that together have 0.08 where the campaign has 0.05; an experiment that arrived with 0.004.
    [Fact]
    public void Weights_families_and_levels_given_on_arrival_have_their_shares()
    {
        Campaign campaign = Campaign(ErrorRate.Familywise, 0.05);
        FamilyStanding one = new("", "weighted-holm", campaign.Level, 8, 8, 8, 3) { WeightTotal = 10 };
        ExperimentResult experiment = Experiment("tukey-kramer", true);
        Assert.Equal(0.05 * 2 / 10, new ComparisonVerdict(campaign, [one]).SelectedRisk(experiment with { Plan = experiment.Plan with { Weight = 2 } })!.Value, 1e-17);

        FamilyStanding[] two = [new("x", "holm", campaign.Level, 5, 5, 5, 1), new("y", "holm", new SignificanceLevel(0.03), 4, 4, 4, 1)];
        Assert.Equal(0.05 / 5 * 5 / 8, new ComparisonVerdict(campaign, two).SelectedRisk(experiment with { Plan = experiment.Plan with { Family = "x" } })!.Value, 1e-16);

        var online = new ComparisonVerdict(campaign with { Correction = "alpha-spending" }, [one with { WeightTotal = null }]);
        Assert.Equal(0.004, online.SelectedRisk(experiment with { GivenLevel = 0.004 }));
        Assert.Contains("given on arrival", online.SelectedGuarantee, StringComparison.Ordinal);
    }

    // What is claimed and what its selected interval says agree for a weight too.
    [Fact]
    public void With_weights_claims_leave_out_zero()
    {
        FamilyStanding family = new("", "weighted-holm", new SignificanceLevel(0.05), 8, 8, 8, 3) { WeightTotal = 10 };
        ExperimentResult experiment = Experiment("tukey-kramer", true);
        foreach (double weight in (double[])[1e-9, 0.5, 3, 9])
        {
            IReadOnlyList<ExperimentComparison> judged = new ComparisonVerdict(Campaign(ErrorRate.Familywise, 0.05), [family])
                .Judge(experiment with { Plan = experiment.Plan with { Weight = weight } }, Labels, FollowUp("tukey-kramer"));
            Assert.All(judged, c => Assert.Equal(c.Survives, c.SelectedInterval!.Value.Lower > 0 || c.SelectedInterval.Value.Upper < 0));
        }
    }

    [Fact]
    public void A_level_below_the_grain_of_doubles_has_none() =>
        Assert.All(Verdict(ErrorRate.Familywise, 1e-16).Judge(Experiment("scheffe", true), Labels, FollowUp("scheffe")), c => Assert.Null(c.SelectedInterval));

    [Fact]
    public void What_they_hold_is_told_with_its_figures()
    {
        Assert.Contains("at 1 - 0.05 x 3/8", Verdict(ErrorRate.FalseDiscovery).SelectedGuarantee, StringComparison.Ordinal);
        Assert.Contains("at 1 - 0.05/8", Verdict(ErrorRate.Familywise).SelectedGuarantee, StringComparison.Ordinal);
        Assert.Equal("", new ComparisonVerdict(Campaign(ErrorRate.Familywise, 0.05), [new FamilyStanding("", "holm", new SignificanceLevel(0.05), 8, 8, 8, 0)]).SelectedGuarantee);
    }

    private static IReadOnlyList<ExperimentComparison> Judge(string key, ErrorRate rate, bool? survives) => Verdict(rate).Judge(Experiment(key, survives), Labels, FollowUp(key));

    private static PlannedFollowUp FollowUp(string key) =>
        PlannedFollowUp.Of(Experiment(key, true).Plan, Labels, new GroupedSample([10, 13, 12, 11, 12, 11, 14, 10, 30, 33, 31, 35, 12, 19, 15, 16], 0, [0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2, 2, 3, 3, 3, 3], 4), new SignificanceLevel(0.05))!;

    private static ExperimentResult Experiment(string followUp, bool? survives) => new()
    {
        Plan = new PlannedExperiment { Code = "E", Test = "f", FollowUp = followUp, Control = "a" },
        Position = 1,
        Status = survives is null ? ExperimentStatus.Ready : ExperimentStatus.Tested,
        Survives = survives,
    };

    private static Campaign Campaign(ErrorRate rate, double level) => new() { Code = "C", ErrorRate = rate, Level = new SignificanceLevel(level), Correction = "bh", OpenedAt = DateTimeOffset.UnixEpoch };

    private static ComparisonVerdict Verdict(ErrorRate rate, double level = 0.05) =>
        new(Campaign(rate, level), [new FamilyStanding("", "bh", new SignificanceLevel(level), 8, 8, 8, 3)]);
}
