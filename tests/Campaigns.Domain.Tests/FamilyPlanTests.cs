namespace Campaigns.Domain.Tests;

public sealed class FamilyPlanTests
{
    [Fact]
    public void Families_are_named_by_the_plan_in_its_order() =>
        Assert.Equal(["b", "a"], FamilyPlan.NamedIn([Planned("1", "b"), Planned("2", "a"), Planned("3", "b"), Planned("4", null)]).Select(f => f.Name));

    [Theory]
    [InlineData("a b", "1:a 2:b 3:", "The experiment '3' names no family, while the campaign has some (a, b)")]
    [InlineData("main b", "1:main 2:mian 3:b", "The experiment '2' names the family 'mian', which is none of the campaign's (did you mean 'main'?): main, b.")]
    [InlineData("a b", "1:a", "The family 'b' has no experiment in the plan")]
    [InlineData("a b<c", "1:a 2:b", "The family 'b' opens after 'c', which is none of the families.")]
    [InlineData("a b<b", "1:a 2:b", "The family 'b' waits on itself: let one")]
    [InlineData("a b<c c<b", "1:a 2:b 3:c", "The family 'c' waits on itself over others")]
    public void What_does_not_fit_is_refused_in_a_sentence(string families, string plan, string sentence)
    {
        Campaign campaign = SeveralFamiliesTests.Sealed(families);
        RefusedException refused = Assert.Throws<RefusedException>(() => FamilyPlan.Check(campaign, campaign.Families, Plan(plan)));
        Assert.Contains(refused.Details, d => d.StartsWith(sentence, StringComparison.Ordinal));
        Assert.All(refused.Details, d => Assert.EndsWith(".", d, StringComparison.Ordinal));
    }

    [Fact]
    public void Online_procedures_and_exploratory_campaigns_have_no_families()
    {
        Campaign campaign = SeveralFamiliesTests.Sealed("a b");
        IReadOnlyList<PlannedExperiment> plan = Plan("1:a 2:b");
        FamilyPlan.Check(campaign, campaign.Families, plan);
        Assert.Contains("in one stream", Details(campaign with { Correction = "lord" }, campaign.Families, plan), StringComparison.Ordinal);
        Assert.Contains("none of the batch corrections", Details(campaign, [new Family("a") { Correction = "lord" }, new Family("b")], plan), StringComparison.Ordinal);
        Assert.Contains("an exploratory campaign is one family", Details(campaign with { IsExploratory = true }, campaign.Families, plan), StringComparison.Ordinal);
        FamilyPlan.Check(campaign with { IsExploratory = true }, [], []);
    }

    [Fact]
    public void Weights_that_are_all_0_are_refused_where_they_count()
    {
        Campaign campaign = SeveralFamiliesTests.Sealed("a") with { Families = [] };
        PlannedExperiment[] none = [Planned("1", null) with { Weight = 0 }, Planned("2", null) with { Weight = 0 }];
        FamilyPlan.Check(campaign, [], none);
        Assert.Contains("All weights are 0", Details(campaign with { Correction = "weighted-bh" }, [], none), StringComparison.Ordinal);
        FamilyPlan.Check(campaign with { Correction = "weighted-bh" }, [], [none[0], none[1] with { Weight = null }]);
    }

    [Theory]
    [InlineData("weighted-holm", null, "Note: Weighted Holm takes weights, and the plan gives none: every experiment weighs 1.")]
    [InlineData("weighted-holm", 2.0, null)]
    [InlineData("holm", 2.0, "Note: the plan's weights are not used: Holm takes none.")]
    [InlineData("holm", null, null)]
    public void Weights_that_are_missing_or_idle_are_told(string correction, double? weight, string? note)
    {
        Campaign campaign = SeveralFamiliesTests.Sealed("a") with { Families = [], Correction = correction };
        Assert.Equal(note is null ? [] : [note], FamilyPlan.Notes(campaign, [Planned("1", null) with { Weight = weight }]));
    }

    [Fact]
    public void What_a_familys_correction_does_not_hold_or_cover_is_told()
    {
        Campaign campaign = SeveralFamiliesTests.Sealed("a b") with { Families = [new Family("a") { Correction = "storey" }, new Family("b")] };
        string[] notes = [.. FamilyPlan.Notes(campaign, [Planned("1", "a") with { SharedControl = "oven 2" }, Planned("2", "a") with { SharedControl = "oven 2" }, Planned("3", "b") with { SharedControl = "oven 2" }])];
        Assert.Equal(3, notes.Length);
        Assert.StartsWith("Warning: 2 experiments are few in the family 'a' for Storey", notes[2], StringComparison.Ordinal);
        Assert.StartsWith("Note: Storey", notes[0], StringComparison.Ordinal);
        Assert.StartsWith("Warning: 2 experiments of the family 'a' share a control, batch or instrument, so that their p-values are dependent", notes[1], StringComparison.Ordinal);
    }

    [Fact]
    public void Two_lists_of_families_are_told_apart()
    {
        Family[] stored = FamilyLevelsTests.Parse("a=0.03 b<<a c");
        Assert.Empty(FamilyPlan.Differences(stored, [stored[2], stored[0], stored[1]]));
        Assert.Equal(
            ["family a: correction '', level '0.03' against correction '', level '0.02'", "family b: correction '', level '', opens after 'a' when all against correction '', level '', opens after 'a' when any", "family c: is in the sealed plan, and missing in the other", "family d: is not in the sealed plan"],
            FamilyPlan.Differences(stored, FamilyLevelsTests.Parse("a=0.02 b<a d")));
    }

    private static string Details(Campaign campaign, IReadOnlyList<Family> families, IReadOnlyList<PlannedExperiment> plan) =>
        string.Join(' ', Assert.Throws<RefusedException>(() => FamilyPlan.Check(campaign, families, plan)).Details);

    private static PlannedExperiment[] Plan(string plan) => [.. plan.Split(' ').Select(e => e.Split(':')).Select(e => Planned(e[0], e[1].Length > 0 ? e[1] : null))];

    private static PlannedExperiment Planned(string code, string? family) => new() { Code = code, Test = "f", FollowUp = "none", Family = family };
}
