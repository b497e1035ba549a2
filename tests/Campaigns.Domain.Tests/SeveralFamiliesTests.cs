using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

public sealed class SeveralFamiliesTests
{
    private const string Gated = "main=0.03 second<main third<<second";

    // R 4.2.2: p.adjust(c(0.001, 0.02, 0.3), "holm", n = 4) = 0.004 0.06 0.6; p.adjust(c(0.005, 0.004, 0.01), "hommel") = 0.01 0.008 0.01; p.adjust(c(1e-4, 0.5), "holm") = 2e-4 0.5.
    [Fact]
    public void Each_family_is_corrected_on_its_own_at_its_level_behind_its_gate()
    {
        Campaign campaign = Sealed(Gated) with { Families = [.. Families(Gated).Select(f => f.Name == "second" ? f with { Correction = "hommel" } : f)] };
        IReadOnlyList<ExperimentResult> judged = Judge(campaign, ("third", 1e-4), ("main", 0.001), ("second", 0.005), ("main", 0.02), ("main", null), ("second", 0.004), ("main", 0.3), ("second", 0.01), ("third", 0.5));
        Assert.Equal([2e-4, 0.004, 0.01, 0.06, null, 0.008, 0.6, 0.01, 0.5], judged.Select(e => e.AdjustedP is { } p ? Math.Round(p.Value, 15) : (double?)null));
        Assert.Equal([true, true, true, false, null, true, false, true, false], judged.Select(e => e.Survives));
        Assert.Equal(["main holm 0.03 4 4 3 1 ", "second hommel 0.02 3 3 3 3 opened when an experiment of main survives: 1 does", "third holm 0.02 2 2 2 1 opened when all 3 experiments of second survive: 3 do"], Standings(campaign, judged));
        Assert.All(judged, e => Assert.Equal(e.Plan.Family, e.Family!.Name));
    }

    [Fact]
    public void What_is_closed_keeps_closed_what_waits_on_it_and_claims_nothing()
    {
        Campaign campaign = Sealed(Gated);
        IReadOnlyList<ExperimentResult> judged = Judge(campaign, ("main", 0.02), ("second", 1e-300), ("third", 1e-9), ("second", 1e-9), ("main", null));
        Assert.All(judged.Where(e => e.P is not null), e => Assert.False(e.Survives));
        Assert.Equal([0.04, 1, 1, 1], judged.Where(e => e.P is not null).Select(e => e.AdjustedP!.Value.Value));
        Assert.Equal(["main holm 0.03 2 2 1 0 ", "second holm 0.02 2 2 2 0 waits until an experiment of main survives: none does", "third holm 0.02 1 1 1 0 waits until all 2 experiments of second survive: none does"], Standings(campaign, judged));
        Assert.Equal([true, false, false], CampaignVerdictOf(campaign, judged).Families.Select(f => f.IsOpen));
    }

    [Fact]
    public void A_gate_that_asks_for_all_counts_what_was_not_tested()
    {
        Campaign campaign = Sealed("a b<<a");
        Assert.False(Judge(campaign, ("a", 1e-9), ("a", null), ("b", 1e-9))[2].Survives);
        Assert.True(Judge(campaign, ("a", 1e-9), ("a", 1e-9), ("b", 1e-9))[2].Survives);

        // In an interim review the untested one is not counted by the correction, and still is by the gate.
        var tally = new FamilyTally(campaign);
        tally.Add("a", null, null, PValue.FromValue(1e-9));
        tally.Add("a", null, null, null);
        tally.Add("b", null, null, PValue.FromValue(1e-9));
        CampaignVerdict interim = FamilyVerdict.Judge(campaign, tally.Members(testedOnly: true));
        Assert.Equal([(1, 2, 1, true), (1, 1, 0, false)], interim.Families.Select(f => (f.Size, f.Planned, f.Survivors, f.IsOpen)));
    }

    // R 4.2.2: p.adjust(c(0.001, 0.02, 0.3, 0.005, 0.004, 0.01), "holm", n = 7) = 0.007 0.06 0.6 0.025 0.024 0.04.
    [Fact]
    public void Before_the_seal_and_without_families_all_experiments_are_one_family()
    {
        Campaign open = Sealed(Gated) with { SealedAt = null };
        (string, double?)[] experiments = [("main", 0.001), ("main", 0.02), ("main", 0.3), ("main", null), ("second", 0.005), ("second", 0.004), ("third", 0.01)];
        foreach (Campaign campaign in (Campaign[])[open, Sealed(Gated) with { Families = [] }])
        {
            IReadOnlyList<ExperimentResult> judged = Judge(campaign, experiments);
            Assert.Equal([0.007, 0.06, 0.6, 0.025, 0.024, 0.04], judged.Where(e => e.P is not null).Select(e => Math.Round(e.AdjustedP!.Value.Value, 15)));
            Assert.Equal(("", 7), (judged[0].Family!.Name, judged[0].Family!.Size));
        }
    }

    // Weighted Holm by hand: weights 2, 1, 1 (untested), p = 0.02, 0.02: ranks by p/w; 0.02/2 x 4 = 0.04, 0.02/1 x 2 = 0.04.
    [Fact]
    public void Weights_come_from_the_plan_and_are_1_where_it_gives_none()
    {
        Campaign campaign = Sealed("a") with { Correction = "weighted-holm", Families = [] };
        ExperimentResult[] experiments = [Result("", 0.02, weight: 2), Result("", 0.02), Result("", null, weight: 1)];
        IReadOnlyList<ExperimentResult> judged = FamilyVerdict.Apply(campaign, experiments);
        Assert.Equal([0.04, 0.04], judged.Take(2).Select(e => Math.Round(e.AdjustedP!.Value.Value, 15)));
        Assert.Equal(4, judged[0].Family!.WeightTotal);
        Assert.Null(FamilyVerdict.Apply(campaign with { Correction = "holm" }, experiments)[0].Family!.WeightTotal);
    }

    // Weighted Bonferroni inside a family by hand: weights 3 and 1, untested 4: p x 8/w.
    [Fact]
    public void Weights_are_those_of_a_family_whose_correction_takes_them()
    {
        Campaign campaign = Sealed("a=0.03 b") with { Families = [new Family("a") { Level = new SignificanceLevel(0.03), Correction = "weighted-bonferroni" }, new Family("b")] };
        IReadOnlyList<ExperimentResult> judged = FamilyVerdict.Apply(campaign, [Result("a", 0.003, 3), Result("b", 0.01, 9), Result("a", 0.003, 1), Result("a", null, 4), Result("b", 0.02, 0)]);
        Assert.Equal([0.008, 0.02, 0.024, 0.02], judged.Where(e => e.P is not null).Select(e => Math.Round(e.AdjustedP!.Value.Value, 15)));
        Assert.Equal([8.0, null], CampaignVerdictOf(campaign, judged).Families.Select(f => f.WeightTotal));
    }

    [Fact]
    public void Where_all_that_an_interim_review_counts_weighs_nothing_nothing_survives()
    {
        Campaign campaign = Sealed("a") with { Correction = "weighted-bh", Families = [] };
        var tally = new FamilyTally(campaign);
        tally.Add(null, 0, null, PValue.FromValue(1e-20));
        tally.Add(null, 1, null, null);
        CampaignVerdict interim = FamilyVerdict.Judge(campaign, tally.Members(testedOnly: true));
        Assert.Equal((1, false), (interim.Adjusted[0].Value, interim.Survives[0]));
    }

    [Theory]
    [InlineData("bky", 2)]
    [InlineData("storey", 2)]
    [InlineData("bh", 0)]
    [InlineData("by", 0)]
    public void Shared_controls_are_counted_for_procedures_that_are_proved_for_independence(string correction, int sharing)
    {
        Campaign campaign = Sealed("a") with { ErrorRate = ErrorRate.FalseDiscovery, Correction = correction, Families = [] };
        ExperimentResult[] experiments = [Result("", 0.01, shared: "oven"), Result("", 0.02, shared: "oven"), Result("", 0.03, shared: "plate"), Result("", null)];
        FamilyStanding family = FamilyVerdict.Apply(campaign, experiments)[0].Family!;
        Assert.Equal(sharing, family.Sharing);
        string? warning = SharedControls.Warning(FamilyVerdict.ProcedureOf(campaign), "", family.Sharing);
        Assert.Equal(sharing > 0, warning?.StartsWith("Warning: 2 experiments share a control, batch or instrument", StringComparison.Ordinal) == true);
    }

    [Fact]
    public void Another_correction_is_looked_at_in_the_same_families()
    {
        Campaign campaign = Sealed("a b<<a");
        ExperimentResult[] experiments = [Result("a", 0.03), Result("a", 0.04), Result("b", 0.04), Result("b", 0.9)];
        Assert.Equal([0.06, 0.06, 1, 1], FamilyVerdict.JudgeBy(campaign, experiments, CorrectionRegistry.Find("holm")!).Adjusted.Select(p => Math.Round(p.Value, 15)));
        Assert.Equal([0.03, 0.04, 0.04, 0.9], FamilyVerdict.JudgeBy(campaign, experiments, CorrectionRegistry.Find("none")!).Adjusted.Select(p => p.Value));
    }

    [Fact]
    public void Permutation_draws_follow_the_strictest_family() =>
        Assert.Equal(PermutationDraws.Count(new SignificanceLevel(0.001), 10), PermutationDraws.Count([new FamilyStanding("a", "holm", new SignificanceLevel(0.04), 10, 10, 0, 0), new FamilyStanding("b", "holm", new SignificanceLevel(0.001), 10, 10, 0, 0)]));

    internal static Campaign Sealed(string families) => new()
    {
        Code = "C",
        ErrorRate = ErrorRate.Familywise,
        Level = new SignificanceLevel(0.05),
        Correction = "holm",
        Families = Families(families),
        OpenedAt = DateTimeOffset.UnixEpoch,
        SealedAt = DateTimeOffset.UnixEpoch,
    };

    private static Family[] Families(string families) => FamilyLevelsTests.Parse(families);

    private static IReadOnlyList<ExperimentResult> Judge(Campaign campaign, params (string Family, double? P)[] experiments) =>
        FamilyVerdict.Apply(campaign, [.. experiments.Select(e => Result(e.Family, e.P))]);

    private static CampaignVerdict CampaignVerdictOf(Campaign campaign, IReadOnlyList<ExperimentResult> experiments) => FamilyVerdict.Judge(campaign, FamilyMembers.Of(campaign, experiments));

    private static IEnumerable<string> Standings(Campaign campaign, IReadOnlyList<ExperimentResult> experiments) => CampaignVerdictOf(campaign, experiments).Families
        .Select(f => FormattableString.Invariant($"{f.Name} {f.Correction} {f.Level} {f.Size} {f.Planned} {f.Tested} {f.Survivors} {f.Waits}"));

    private static ExperimentResult Result(string family, double? p, double? weight = null, string? shared = null) => new()
    {
        Plan = new PlannedExperiment { Code = "E", Test = "f", FollowUp = "none", Family = family.Length > 0 ? family : null, Weight = weight, SharedControl = shared },
        Position = 1,
        Status = p is null ? ExperimentStatus.Planned : ExperimentStatus.Tested,
        P = p is { } value ? PValue.FromValue(value) : null,
    };
}
