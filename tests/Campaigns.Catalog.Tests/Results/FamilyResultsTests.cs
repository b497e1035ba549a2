using Campaigns.Catalog.Exporting;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Results;

public sealed class FamilyResultsTests
{
    private const string Apart = "1.0 1.1 1.2 1.3", Beside = "5.0 5.1 5.2 5.3", Alike = "1.02 1.11 1.19 1.31", BesideAgain = "5.0 5.1 5.2 5.31";

    [Fact]
    public void Counts_in_the_file_and_in_memory_give_one_verdict()
    {
        using TestCatalog catalog = Tested();
        CampaignStanding standing = catalog.Standing;
        Assert.Equal(["one holm 0.02 3 2 1 True", "two weighted-holm 0.03 2 2 1 True", "three holm 0.03 1 1 0 False"], standing.Families.Select(Text));
        StoredCampaign stored = catalog.Campaigns.Get(TestCatalog.Code);
        CampaignOverview overview = new OverviewReader(catalog.Catalog).Read(stored);
        Assert.Equal(standing.Families, overview.Families);
        Assert.Equal((6, 5, 2), (overview.FamilySize, overview.TestedCount, overview.SurvivorCount));
        (_, IReadOnlyList<ExperimentResult> survivors) = new OverviewReader(catalog.Catalog).ReadSurvivors(TestCatalog.Code, 10);
        Assert.Equal(
            standing.Experiments.Where(e => e.Survives == true).Select(e => (e.Plan.Code, e.AdjustedP, e.Family)).OrderBy(e => e.Code),
            survivors.Select(e => (e.Plan.Code, e.AdjustedP, e.Family)).OrderBy(e => e.Code));
    }

    [Fact]
    public void A_review_keeps_its_families_and_an_interim_one_counts_what_was_tested()
    {
        using TestCatalog catalog = Tested();
        Assert.Equal((6, 5, 2), (catalog.Review().Review.FamilySize, catalog.Standing.LastReview!.TestedCount, catalog.Standing.LastReview.SurvivorCount));
        Assert.True(catalog.Review(testedOnly: true).Review.IsInterim);
        Assert.Equal(
            ["1 1 one holm 0.02 3 3 2 1 1", "1 2 two weighted-holm 0.03 2 2 2 1 1", "1 3 three holm 0.03 1 1 1 0 0", "2 1 one holm 0.02 2 3 2 1 1", "2 2 two weighted-holm 0.03 2 2 2 1 1", "2 3 three holm 0.03 1 1 1 0 0"],
            Raw.Rows(catalog.Catalog.Connection, "SELECT r.number || ' ' || f.position || ' ' || name || ' ' || f.correction || ' ' || f.level || ' ' || f.family_size || ' ' || planned_count || ' ' || f.tested_count || ' ' || f.survivor_count || ' ' || is_open FROM review_families f JOIN reviews r ON r.id = f.review_id ORDER BY r.number, f.position"));
        Assert.Equal([3, 2, 1], catalog.Standing.Families.Select(f => f.Size));
        Assert.Equal([2, 2, 1], new ReviewStore(catalog.Catalog).Families(catalog.Campaigns.Get(TestCatalog.Code)).Select(f => f.Size));
    }

    [Fact]
    public void An_export_tells_every_line_of_a_review_at_the_level_of_its_family()
    {
        using TestCatalog catalog = Tested();
        catalog.Review();
        new CampaignExport(catalog.Catalog).Write(catalog.Standing, catalog.Folder["out"], [], p => p.Value > 0.5 ? "large" : "small");
        Assert.Equal("family,correction,level,opens_after,opens_when\none,,0.02,,\ntwo,weighted-holm,0.03,one,any\nthree,,,two,all\n", File.ReadAllText(Path.Combine(catalog.Folder["out"], CampaignExport.FamiliesName)));
        string[] lines = File.ReadAllLines(Path.Combine(catalog.Folder["out"], CampaignExport.ReviewsName));
        Assert.EndsWith(",survives,family,plan_version,files,rows,program_version,ledger_sequence", lines[0], StringComparison.Ordinal);
        Assert.Equal(
            ["holm,0.02,3,false,E1,small,small,true,one", "holm,0.02,3,false,E2,large,large,false,one", "weighted-holm,0.03,2,false,E4,small,small,true,two", "weighted-holm,0.03,2,false,E5,large,large,false,two", "holm,0.03,1,false,E6,small,large,false,three"],
            lines[1..].Select(l => string.Join(',', l.Split(',')[2..11])));
        Assert.Equal("E4,,,,A|B,,f,none,,,,2,two,E1,oven", File.ReadAllLines(Path.Combine(catalog.Folder["out"], "plan.csv"))[4]);
    }

    [Fact]
    public void Five_families_of_100000_experiments_are_counted_apart()
    {
        using TestCatalog five = Large(families: 5);
        CampaignOverview overview = new OverviewReader(five.Catalog).Read(five.Campaigns.Get(TestCatalog.Code));
        Assert.Equal(5, overview.Families.Count);
        Assert.All(overview.Families, f => Assert.Equal((20_000, 20_000), (f.Planned, f.Tested)));
    }

    private static TestCatalog Large(int families)
    {
        var catalog = new TestCatalog();
        catalog.Start();
        catalog.Plan([.. Enumerable.Range(1, 100_000).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}")) with { Family = FormattableString.Invariant($"family {i % families}") })]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        Raw.Execute(catalog.Catalog.Connection,
            """
            INSERT INTO test_runs VALUES (1, 1, NULL, 1, 0, 'v', NULL, NULL, NULL);
            INSERT INTO test_results (experiment_id, test_run_id, status, group_count, observation_count, statistic, p, log_p)
            SELECT id, 1, 'tested', 2, 10, 1.0, ((id * 7919) % 100003) / 100003.0 + 1e-9, NULL FROM experiments;
            """);
        catalog.Review();
        return catalog;
    }

    /// <summary>Three families: in the first one survives of three, of which one has no data; that opens the second, of weights, in which one of two survives; that keeps the third closed.</summary>
    private static TestCatalog Tested()
    {
        var catalog = new TestCatalog();
        catalog.Campaigns.Open(new Campaign { Code = TestCatalog.Code, ErrorRate = ErrorRate.Familywise, Level = new SignificanceLevel(0.05), Correction = "holm", OpenedAt = catalog.Clock.GetUtcNow() });
        catalog.Plan(
            TestCatalog.Experiment("E1", null, "A", "B") with { Family = "one" },
            TestCatalog.Experiment("E2", null, "A", "B") with { Family = "one" },
            TestCatalog.Experiment("E3", null, "A", "B") with { Family = "one" },
            TestCatalog.Experiment("E4", null, "A", "B") with { Family = "two", Weight = 2, Confirms = "E1", SharedControl = "oven" },
            TestCatalog.Experiment("E5", null, "A", "B") with { Family = "two" },
            TestCatalog.Experiment("E6", null, "A", "B") with { Family = "three" });
        new FamilyStore(catalog.Catalog).Register(TestCatalog.Code,
        [
            new Family("one") { Level = new SignificanceLevel(0.02) },
            new Family("two") { Correction = "weighted-holm", Level = new SignificanceLevel(0.03), OpensAfter = "one" },
            new Family("three") { OpensAfter = "two", Gate = FamilyGate.AllSurvive },
        ]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        catalog.Load(string.Concat(new[] { ("E1", Beside), ("E2", Alike), ("E4", BesideAgain), ("E5", Alike), ("E6", Beside) }.Select(e => TestCatalog.Rows(e.Item1, "A", Apart) + TestCatalog.Rows(e.Item1, "B", e.Item2))));
        catalog.Test();
        return catalog;
    }

    private static string Text(FamilyStanding f) => FormattableString.Invariant($"{f.Name} {f.Correction} {f.Level} {f.Size} {f.Tested} {f.Survivors} {f.IsOpen}");
}
