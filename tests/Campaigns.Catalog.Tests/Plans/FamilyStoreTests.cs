using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Plans;

public sealed class FamilyStoreTests
{
    private static readonly Family[] Two = [new("b") { Correction = "by", Level = new SignificanceLevel(0.03) }, new("a") { OpensAfter = "b", Gate = FamilyGate.AllSurvive }];

    [Fact]
    public void Families_are_read_as_they_were_registered_and_may_be_replaced_until_the_seal()
    {
        using TestCatalog catalog = Planned();
        Register(catalog, [new Family("x")]);
        Register(catalog, Two);
        Assert.Equal(Two, Stored(catalog).Families);
        Assert.Empty(Stored(catalog).JudgedFamilies);
        catalog.Campaigns.Seal(TestCatalog.Code);
        Assert.Equal(Two, Stored(catalog).JudgedFamilies);
        Assert.Contains("is sealed since", Assert.Throws<RefusedException>(() => Register(catalog, Two)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Families_that_the_plan_alone_names_are_kept_at_the_seal()
    {
        using TestCatalog catalog = Planned();
        catalog.Campaigns.Seal(TestCatalog.Code);
        Assert.Equal([new Family("a"), new Family("b")], Stored(catalog).Families);
        Assert.Equal(["a 0.05 2", "b 0.05 1"], catalog.Standing.Families.Select(f => FormattableString.Invariant($"{f.Name} {f.Level} {f.Planned}")));
    }

    [Fact]
    public void The_digest_of_the_plan_covers_the_families()
    {
        Assert.Equal(3, new[] { [], Two, [Two[0], Two[1] with { Gate = FamilyGate.AnySurvives }] }.Select(families =>
        {
            using TestCatalog catalog = Planned();
            if (families.Length > 0)
            {
                Register(catalog, families);
            }

            return catalog.Campaigns.Seal(TestCatalog.Code).Campaign.PlanDigest;
        }).Distinct().Count());
    }

    [Fact]
    public void A_plan_that_does_not_fit_its_families_stays_open()
    {
        using TestCatalog catalog = Planned();
        catalog.Plan(TestCatalog.Experiment("E4"));
        string before = catalog.Dump;
        Assert.Contains("'E4' names no family", Assert.Single(Assert.Throws<RefusedException>(() => catalog.Campaigns.Seal(TestCatalog.Code)).Details), StringComparison.Ordinal);
        Assert.Equal(before, catalog.Dump);
    }

    [Fact]
    public void Families_without_a_plan_keep_data_out_and_data_without_a_plan_keeps_families_out()
    {
        using var waiting = new TestCatalog();
        waiting.Start();
        Register(waiting, Two);
        Assert.Contains("Families were registered", waiting.Refused(TestCatalog.Rows("E1", "A", "1 2")).Message, StringComparison.Ordinal);
        using var exploring = new TestCatalog();
        exploring.Start();
        exploring.Load(TestCatalog.Rows("E1", "A", "1 2"));
        Assert.Contains("families would come after the data", Assert.Throws<RefusedException>(() => Register(exploring, Two)).Message, StringComparison.Ordinal);
    }

    private static TestCatalog Planned()
    {
        var catalog = new TestCatalog();
        catalog.Start();
        catalog.Plan(TestCatalog.Experiment("E1") with { Family = "a" }, TestCatalog.Experiment("E2") with { Family = "b" }, TestCatalog.Experiment("E3") with { Family = "a" });
        return catalog;
    }

    private static void Register(TestCatalog catalog, IReadOnlyList<Family> families) => new FamilyStore(catalog.Catalog).Register(TestCatalog.Code, families);

    private static Campaign Stored(TestCatalog catalog) => catalog.Campaigns.Get(TestCatalog.Code).Campaign;
}
