namespace Campaigns.Domain.Tests;

public sealed class PlanComparisonTests
{
    private static readonly PlannedExperiment E = new() { Code = "E", Groups = ["a", "b"], Test = "f", FollowUp = "none", Replicates = 3 };

    [Fact]
    public void Equal_plans_in_any_order_do_not_differ()
    {
        PlannedExperiment other = E with { Code = "F" };
        Assert.Empty(PlanComparison.Differences([E, other], [other, E with { Groups = ["a", "b"] }]));
        Assert.True(PlanComparison.IsSame(E, E with { Groups = ["a", "b"] }));
    }

    [Fact]
    public void Every_field_counts()
    {
        PlannedExperiment[] others =
        [
            E with { Title = "t" }, E with { Response = "t" }, E with { Unit = "t" }, E with { Groups = ["b", "a"] }, E with { Groups = [] }, E with { Control = "a" },
            E with { Test = "welch" }, E with { FollowUp = "dunnett" }, E with { Replicates = null }, E with { SmallestEffect = 1 }, E with { AssumedStandardDeviation = 1 },
            E with { Weight = 0 }, E with { Family = "" },
        ];
        Assert.All(others, other => Assert.False(PlanComparison.IsSame(E, other)));
    }

    [Fact]
    public void Differences_are_told_experiment_by_experiment()
    {
        IReadOnlyList<string> told = PlanComparison.Differences([E, E with { Code = "gone" }], [E with { Replicates = 4, Unit = "MPa" }, E with { Code = "new" }]);
        Assert.Equal(["E: unit '' against 'MPa', replicates '3' against '4'", "gone: is in the plan, and missing in the other", "new: is not in the plan"], told);
    }

    [Fact]
    public void Twenty_differences_are_told_and_the_others_counted()
    {
        IReadOnlyList<string> told = PlanComparison.Differences([.. Enumerable.Range(0, 50).Select(i => E with { Code = FormattableString.Invariant($"{i}") })], []);
        Assert.Equal(21, told.Count);
        Assert.Equal("... and 30 more", told[20]);
        Assert.Equal(20, PlanComparison.Differences([.. Enumerable.Range(0, 20).Select(i => E with { Code = FormattableString.Invariant($"{i}") })], []).Count);
    }
}
