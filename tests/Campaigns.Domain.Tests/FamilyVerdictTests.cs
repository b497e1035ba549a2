using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

public sealed class FamilyVerdictTests
{
    private static readonly Campaign Family = new()
    {
        Code = "C",
        ErrorRate = ErrorRate.FalseDiscovery,
        Level = new SignificanceLevel(0.05),
        Correction = "bh",
        OpenedAt = DateTimeOffset.UnixEpoch,
    };

    // R 4.2.2: p.adjust(c(0.01, 0.02, 0.03, 0.5), "BH", n = 5) = 0.05 0.05 0.05 0.625; Holm, n = 5: 0.05 0.08 0.09 1.
    [Theory]
    [InlineData("bh", new[] { 0.05, 0.05, 0.05, 0.625 }, 3)]
    [InlineData("holm", new[] { 0.05, 0.08, 0.09, 1.0 }, 1)]
    [InlineData("none", new[] { 0.01, 0.02, 0.03, 0.5 }, 3)]
    public void Untested_experiments_count_and_get_no_verdict(string correction, double[] adjusted, int survivors)
    {
        ExperimentResult[] experiments = [Result("b", 0.5), Result("untested", null), Result("a", 0.03), Result("d", 0.01), Result("c", 0.02)];
        IReadOnlyList<ExperimentResult> judged = FamilyVerdict.Apply(Family with { Correction = correction }, experiments);
        Assert.Equal(experiments.Select(e => e.Plan.Code), judged.Select(e => e.Plan.Code));
        Assert.Equal(experiments[1] with { Family = judged[1].Family }, judged[1]);
        Assert.Null(judged[1].Survives);
        Assert.Equal(adjusted, judged.Where(e => e.P is not null).OrderBy(e => e.P).Select(e => Math.Round(e.AdjustedP!.Value.Value, 15)));
        Assert.Equal(survivors, judged.Count(e => e.Survives == true));
        Assert.Equal(4 - survivors, judged.Count(e => e.Survives == false));
    }

    [Fact]
    public void An_adjusted_p_value_equal_to_the_level_survives()
    {
        // 3 times 0.05/3, rounded once, is 0.05 again.
        IReadOnlyList<ExperimentResult> judged = FamilyVerdict.Apply(Family with { Correction = "bonferroni" }, [Result("a", 0.05 / 3), Result("b", null), Result("c", null)]);
        Assert.True(judged[0].Survives);
        Assert.Equal(0.05, judged[0].AdjustedP!.Value.Value);
    }

    [Fact]
    public void A_verdict_put_into_the_experiments_is_the_one_put_into_copies()
    {
        ExperimentResult[] own = [Result("b", 0.5), Result("untested", null), Result("a", 0.03), Result("d", 0.01)];
        CampaignVerdict verdict = FamilyVerdict.Judge(Family, FamilyMembers.Of(Family, own));
        IReadOnlyList<ExperimentResult> copies = FamilyVerdict.Apply(own, verdict);
        Assert.All(own, e => Assert.Null(e.Family));
        Assert.Equal(copies, FamilyVerdict.ApplyToOwn(own, verdict));
        Assert.Equal(copies, own);
    }

    [Fact]
    public void A_family_smaller_than_its_results_is_a_fault_of_the_caller() =>
        Assert.ThrowsAny<ArgumentException>(() => FamilyVerdict.Judge(Family, FamilyMembers.OneFamily(new[] { PValue.FromValue(0.1), PValue.FromValue(0.2) }, 1)));

    [Fact]
    public void An_empty_family_is_judged() => Assert.Empty(FamilyVerdict.Apply(Family, []));

    [Fact]
    public void A_correction_that_this_version_lacks_is_refused_with_the_campaign()
    {
        RefusedException refused = Assert.Throws<RefusedException>(() => FamilyVerdict.CorrectionOf(Family with { Correction = "later" }));
        Assert.Contains("'C' names the correction 'later'", refused.Message, StringComparison.Ordinal);
    }

    private static ExperimentResult Result(string code, double? p) => new()
    {
        Plan = new PlannedExperiment { Code = code, Test = "f", FollowUp = "none" },
        Position = 1,
        Status = p is null ? ExperimentStatus.Planned : ExperimentStatus.Tested,
        P = p is { } given ? PValue.FromValue(given) : null,
    };
}
