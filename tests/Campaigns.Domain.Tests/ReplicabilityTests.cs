using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

public sealed class ReplicabilityTests
{
    private static readonly Campaign Bonferroni = new()
    {
        Code = "C",
        ErrorRate = ErrorRate.Familywise,
        Level = new SignificanceLevel(0.05),
        Correction = "bonferroni",
        OpenedAt = DateTimeOffset.UnixEpoch,
    };

    // Two confirmations sealed before the first data: the larger of both, times two.
    [Fact]
    public void A_confirmation_sealed_beforehand_is_corrected_over_the_confirmations_planned()
    {
        IReadOnlyList<ExperimentResult> judged = Apply(
            (0.9, null), (0.001, First("A1", 0.02, before: false)), (null, First("A2", 0.001, before: false)));
        Assert.Null(judged[0].Confirmation);
        AssertPair(judged[1].Confirmation!, 2, 0.02, 0.04, true);
        AssertOpen(judged[2].Confirmation!, 2);
    }

    [Theory]
    [InlineData(0.02, 0.001)]
    [InlineData(0.001, 0.02)]
    public void Both_sides_must_be_small(double first, double second) =>
        AssertPair(Apply((second, First("A1", first, before: false)))[0].Confirmation!, 1, 0.02, 0.02, true);

    // Chosen after looking at a family of ten: the other nine count as p = 1.
    [Fact]
    public void One_chosen_by_its_result_is_corrected_over_the_whole_first_family()
    {
        AssertPair(Apply((0.004, First("A1", 1e-9, before: true)))[0].Confirmation!, 10, 0.004, 0.04, true);
        AssertPair(Apply((0.006, First("A1", 1e-9, before: true)))[0].Confirmation!, 10, 0.006, 0.06, false);
    }

    [Fact]
    public void Two_that_follow_one_experiment_are_two_hypotheses_and_other_families_come_on_top()
    {
        EarlierExperiment other = First("B1", 0.001, before: true) with { Campaign = "B", FamilySize = 4 };
        IReadOnlyList<ExperimentResult> judged = Apply(
            (0.001, First("A1", 0.001, before: true)), (0.001, First("A1", 0.001, before: true)), (0.001, First("A2", 0.001, before: false)), (0.001, other));

        // A's ten, one of them followed twice, and B's four.
        Assert.All(judged, e => Assert.Equal(15, e.Confirmation!.FamilySize));
        Assert.All(judged, e => Assert.Equal(0.015, e.Confirmation!.AdjustedP!.Value.Value, 1e-16));
    }

    [Fact]
    public void A_procedure_for_arriving_experiments_leaves_its_confirmations_to_a_batch_correction()
    {
        static string Used(ErrorRate rate) => Replicability.Apply(Bonferroni with { Correction = "alpha-spending", ErrorRate = rate }, [JudgedCampaign.Experiment("E1", 0.01)], [First("A1", 0.01, false)])[0].Confirmation!.Correction;
        Assert.Equal(("holm", "bh"), (Used(ErrorRate.Familywise), Used(ErrorRate.FalseDiscovery)));
    }

    [Fact]
    public void Without_any_result_nothing_is_said()
    {
        AssertOpen(Apply((null, First("A1", null, before: false)))[0].Confirmation!, 1);
        AssertOpen(Apply((0.001, First("A1", null, before: false)))[0].Confirmation!, 1);
    }

    private static EarlierExperiment First(string code, double? p, bool before) => new("A", code, p is { } value ? PValue.FromValue(value) : null, "", 10, before);

    private static IReadOnlyList<ExperimentResult> Apply(params (double? P, EarlierExperiment? First)[] experiments) =>
        Replicability.Apply(Bonferroni, [.. experiments.Select((e, i) => JudgedCampaign.Experiment($"E{i + 1}", e.P, i + 1))], [.. experiments.Select(e => e.First)]);

    private static void AssertPair(Confirmation confirmation, int family, double p, double adjusted, bool replicated)
    {
        Assert.Equal((family, p, replicated), (confirmation.FamilySize, confirmation.P!.Value.Value, confirmation.IsReplicated!.Value));
        Assert.Equal(adjusted, confirmation.AdjustedP!.Value.Value, 1e-15);
    }

    private static void AssertOpen(Confirmation confirmation, int family) =>
        Assert.Equal((family, null, null, null), (confirmation.FamilySize, confirmation.P, confirmation.AdjustedP, confirmation.IsReplicated));
}
