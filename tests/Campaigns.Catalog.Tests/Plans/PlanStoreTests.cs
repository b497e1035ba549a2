using Campaigns.Catalog.Plans;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Plans;

public sealed class PlanStoreTests
{
    private static readonly PlannedExperiment Full = new()
    {
        Code = "full",
        Title = "t µ",
        Response = "strength",
        Unit = "MPa",
        Groups = ["control", "1 %", "2 %"],
        Control = "control",
        Test = "f",
        FollowUp = "dunnett",
        Replicates = 6,
        SmallestEffect = 0.1,
        AssumedStandardDeviation = 1e-300,
        Weight = 0,
        Family = "main",
    };

    [Fact]
    public void A_plan_is_read_as_it_was_registered()
    {
        using var catalog = new TestCatalog();
        long id = catalog.Start().Id;
        PlannedExperiment bare = TestCatalog.Experiment("bare");
        Assert.Equal(new PlanChange(2, 0, 0), catalog.Plan(Full, bare));
        IReadOnlyList<PlannedExperiment> read = new PlanStore(catalog.Catalog).Read(id);
        Assert.Equal([Full, bare], read.Zip([Full, bare], (r, e) => r with { Groups = e.Groups }));
        Assert.Equal([Full.Groups, bare.Groups], read.Select(e => e.Groups));
    }

    [Fact]
    public void Registering_again_tells_added_changed_and_unchanged_and_keeps_the_order()
    {
        using var catalog = new TestCatalog();
        long id = catalog.Start().Id;
        catalog.Plan(Full, TestCatalog.Experiment("b", 3, "x", "y"), TestCatalog.Experiment("c"));
        string before = catalog.Dump;
        Assert.Equal(new PlanChange(0, 0, 3), catalog.Plan(Full with { Groups = [.. Full.Groups] }, TestCatalog.Experiment("b", 3, "x", "y"), TestCatalog.Experiment("c")));
        Assert.Equal(before, catalog.Dump);
        Assert.Equal(new PlanChange(1, 1, 1), catalog.Plan(TestCatalog.Experiment("d"), TestCatalog.Experiment("b", 3, "y", "x"), Full));
        IReadOnlyList<PlannedExperiment> read = new PlanStore(catalog.Catalog).Read(id);
        Assert.Equal(["full", "b", "c", "d"], read.Select(e => e.Code));
        Assert.Equal(["y", "x"], read[1].Groups);
    }

    [Fact]
    public void A_sealed_plan_takes_no_changes()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(Full);
        string before = catalog.Dump;
        Assert.Contains("sealed since 2026-12-01 08:00:00 UTC", Assert.Throws<RefusedException>(() => catalog.Plan(Full)).Message, StringComparison.Ordinal);
        Assert.Equal(before, catalog.Dump);
    }

    [Fact]
    public void A_plan_after_the_data_is_refused()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        catalog.Load(TestCatalog.Rows("E", "a", "1 2") + TestCatalog.Rows("E", "b", "3 4"));
        Assert.Contains("after the data", Assert.Throws<RefusedException>(() => catalog.Plan(Full)).Message, StringComparison.Ordinal);
    }
}
