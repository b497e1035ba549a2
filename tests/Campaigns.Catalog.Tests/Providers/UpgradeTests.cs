using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests.Providers;

public sealed class UpgradeTests
{
    private const string Name = KeptCatalog.Name;
    private const string Migrations = "Campaigns.Migrations.Sqlite";

    [Theory]
    [InlineData("")]
    [InlineData("CREATE TABLE notes (text TEXT); INSERT INTO notes VALUES ('kept');")]
    public void An_older_catalog_becomes_one_of_today(string content)
    {
        using TestFolder folder = Older(content);
        Assert.Throws<CatalogException>(() => Catalog.Open(folder[Name], TimeProvider.System));
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        Assert.Equal([Name], folder.Files);
        using (Catalog catalog = Catalog.Open(folder[Name], TimeProvider.System))
        {
            Assert.Empty(new CampaignStore(catalog).All());
            Assert.Equal(["ok"], Raw.Rows(catalog.Connection, "PRAGMA integrity_check"));
            Assert.Equal(["delete"], Raw.Rows(catalog.Connection, "PRAGMA journal_mode"));
            Assert.Equal(0, Raw.Integer(catalog.Connection, "SELECT count(*) FROM sqlite_master WHERE name LIKE '%Lock%'"));
            Assert.Equal(content.Length > 0 ? ["kept"] : [], content.Length > 0 ? Raw.Rows(catalog.Connection, "SELECT text FROM notes") : []);
        }

        Assert.False(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
    }

    [Fact]
    public void A_catalog_that_the_first_schema_wrote_keeps_every_result_and_takes_new_work()
    {
        // schema-1.db.gz was written by the program when its schema was 1: ten experiments of published data, tested and reviewed.
        using TestFolder folder = KeptCatalog.Unpack("schema-1");
        List<string> before;
        using (SqliteConnection old = Raw.Open(folder[Name]))
        {
            before = Facts(old);
        }

        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        using Catalog catalog = Catalog.Open(folder[Name], TimeProvider.System);
        Assert.Equal(before, Facts(catalog.Connection));
        CampaignStanding standing = new StandingReader(catalog).Read("published-classics");
        Assert.Equal((10, 9), (standing.TestedCount, standing.SurvivorCount));
        Assert.Equal(new TestRunSummary(0, 0, 0, false), new TestRunner(catalog).Run("published-classics", false, _ => { }, TestContext.Current.CancellationToken));

        // PlantGrowth, first data line: leave it out, test again.
        new ExclusionStore(catalog).Decide("published-classics", "PlantGrowth", new ObservationPlace(2, null), true, "a trial", "the test");
        Assert.Equal(new TestRunSummary(1, 0, 0, true), new TestRunner(catalog).Run("published-classics", false, _ => { }, TestContext.Current.CancellationToken));
        Assert.Equal(29, new StandingReader(catalog).Read("published-classics").Experiments.Single(e => e.Plan.Code == "PlantGrowth").ObservationCount);
    }

    [Fact]
    public void A_catalog_of_the_second_schema_keeps_its_results_its_exclusion_and_its_plan_digest()
    {
        // schema-2.db.gz was written by the program when its schema was 2: twelve experiments of published designs, one value of warpbreaks left out, tested again, reviewed twice.
        using TestFolder folder = KeptCatalog.Unpack("schema-2");
        List<string> before;
        using (SqliteConnection old = Raw.Open(folder[Name]))
        {
            before = Facts(old);
        }

        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        using Catalog catalog = Catalog.Open(folder[Name], TimeProvider.System);
        Assert.Equal(before, Facts(catalog.Connection));
        CampaignStanding standing = new StandingReader(catalog).Read("published-designs");
        Assert.Equal((12, 12, 53), (standing.TestedCount, standing.SurvivorCount, standing.Experiments.Single(e => e.Plan.Code == "warpbreaks").ObservationCount));
        StoredCampaign stored = new CampaignStore(catalog).Get("published-designs");
        Assert.Equal(stored.Campaign.PlanDigest, PlanDigest.Of(stored.Campaign, new PlanStore(catalog).Read(stored.Id)));
        Assert.False(new ReviewStore(catalog).Take("published-designs", testedOnly: false).IsNew);
        Assert.Equal(["families 0", "review_families 0"], new[] { "families", "review_families" }.Select(t => FormattableString.Invariant($"{t} {Raw.Integer(catalog.Connection, $"SELECT count(*) FROM {t}")}")));
        Assert.Equal(("", 12, 12), (standing.Families.Single().Name, standing.Families[0].Size, standing.Families[0].Survivors));
    }

    [Fact]
    public void A_catalog_of_the_third_schema_keeps_the_results_of_all_its_campaigns()
    {
        // schema-3.db.gz was written by the program when its schema was 3: published designs with an exclusion, two families, a stream, and an exploratory campaign.
        using TestFolder folder = KeptCatalog.Unpack("schema-3");
        List<string> before;
        List<string> beforeThem;
        using (SqliteConnection old = Raw.Open(folder[Name]))
        {
            before = Facts(old);
            beforeThem = OfSchema3(old);
        }

        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        using Catalog catalog = Catalog.Open(folder[Name], TimeProvider.System);
        Assert.Equal(before, Facts(catalog.Connection));
        Assert.Equal(beforeThem, OfSchema3(catalog.Connection));
        foreach ((string code, int tested, int survivors, bool isReviewed) in new[] { ("published-designs", 12, 12, true), ("fam", 8, 4, true), ("onl", 8, 2, true), ("expl", 2, 0, false) })
        {
            CampaignStanding standing = new StandingReader(catalog).Read(code);
            Assert.Equal((code, tested, isReviewed), (code, standing.TestedCount, standing.LastReview is not null));
            Assert.Equal((code, survivors), (code, isReviewed ? standing.SurvivorCount : survivors));
            Assert.True(!isReviewed || !new ReviewStore(catalog).Take(code, testedOnly: false).IsNew, code);
            Assert.Equal(new TestRunSummary(0, 0, 0, false), new TestRunner(catalog).Run(code, false, _ => { }, TestContext.Current.CancellationToken));
        }

        Assert.Equal([("first", 0.02, 0), ("second", 0.03, 4)], new StandingReader(catalog).Read("fam").Families.Select(f => (f.Name, f.Level.Value, f.Survivors)));
    }

    [Theory]
    [InlineData("schema-1", "published-classics", 1)]
    [InlineData("schema-2", "published-designs", 2)]
    [InlineData("schema-3", "published-designs", 2)]
    [InlineData("schema-3", "fam", 1)]
    [InlineData("schema-3", "onl", 1)]
    public void Reviews_of_older_catalogs_come_out_of_their_record_to_the_byte(string fixture, string code, int reviews)
    {
        using TestFolder folder = KeptCatalog.Unpack(fixture);
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        using Catalog catalog = Catalog.Open(folder[Name], TimeProvider.System);
        IReadOnlyList<ReviewRerun.Outcome> outcomes = new ReviewRerun(catalog).Run(code, null, _ => { }, TestContext.Current.CancellationToken);
        Assert.Equal(reviews, outcomes.Count);
        Assert.All(outcomes, o => Assert.True(o.IsSame, $"{o.Review.Number}: {string.Join("; ", o.Figures)} {string.Join(", ", o.Lines.Select(l => l.Experiment))}"));
        Assert.Equal(outcomes[^1].Review.TestedCount, new ReviewReader(catalog).Lines(code, reviews).Lines.Count);
    }

    [Fact]
    public void A_catalog_of_today_is_left_as_it_is()
    {
        using var folder = new TestFolder();
        SqliteCatalogFile.Create(folder[Name]);
        byte[] before = File.ReadAllBytes(folder[Name]);
        Assert.False(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Assert.Equal([Name], folder.Files);
    }

    [Fact]
    public void An_upgrade_that_fails_in_the_middle_leaves_the_old_file()
    {
        // The migration cannot create a table that somebody else made.
        using TestFolder folder = Older("CREATE TABLE reviews (text TEXT);");
        byte[] before = File.ReadAllBytes(folder[Name]);
        Assert.ThrowsAny<Exception>(() => CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Assert.Equal([Name], folder.Files);
        Raw.Execute(folder[Name], "DROP TABLE reviews");
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
    }

    [Fact]
    public void A_copy_that_a_killed_upgrade_left_is_no_obstacle()
    {
        using TestFolder folder = Older("");
        string copy = FormattableString.Invariant($"{folder[Name]}.draft-upgrade-{Environment.ProcessId}-99");
        File.WriteAllText(copy, "half a catalog");
        File.WriteAllText(copy + "-journal", "half a journal");
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        Assert.Equal([Name], folder.Files);
    }

    [Fact]
    public void An_upgrade_keeps_the_old_catalog_where_that_is_asked_for_and_never_over_another_file()
    {
        using TestFolder folder = Older("CREATE TABLE notes (text TEXT); INSERT INTO notes VALUES ('kept');");
        byte[] before = File.ReadAllBytes(folder[Name]);
        File.WriteAllText(folder["taken"], "mine");
        Assert.Throws<RefusedException>(() => CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, keep: folder["taken"], stop: TestContext.Current.CancellationToken));
        Assert.Equal("mine", File.ReadAllText(folder["taken"]));
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, keep: folder["old.db"], stop: TestContext.Current.CancellationToken));
        Assert.Equal(0, SqliteCatalogFile.ReadVersion(folder["old.db"]));
        using SqliteConnection old = Raw.Open(folder["old.db"]);
        Assert.Equal(["kept"], Raw.Rows(old, "SELECT text FROM notes"));
        Assert.Equal([Name, "old.db", "taken"], folder.Files);
    }

    [Fact]
    public void A_link_to_a_catalog_stays_a_link()
    {
        using TestFolder folder = Older("");
        File.CreateSymbolicLink(folder["link.db"], folder[Name]);
        Assert.True(CatalogUpgrade.Run(folder["link.db"], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken));
        Assert.NotNull(new FileInfo(folder["link.db"]).LinkTarget);
        Assert.Equal(SqliteCatalogFile.SchemaVersion, SqliteCatalogFile.ReadVersion(folder[Name]));
    }

    [Theory]
    [InlineData("PRAGMA user_version = 5", "newer version")]
    [InlineData("PRAGMA application_id = 5", "is no catalog")]
    public void Files_that_cannot_be_upgraded_are_left_as_they_are(string change, string reason)
    {
        using var folder = new TestFolder();
        SqliteCatalogFile.Create(folder[Name]);
        Raw.Execute(folder[Name], change);
        byte[] before = File.ReadAllBytes(folder[Name]);
        Assert.Contains(reason, Assert.Throws<CatalogException>(() => CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken)).Message, StringComparison.Ordinal);
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Assert.Equal([Name], folder.Files);
    }

    [Fact]
    public void A_catalog_in_use_is_not_upgraded()
    {
        using TestFolder folder = Older("");
        using SqliteConnection other = Raw.Open(folder[Name]);
        Raw.Execute(other, "BEGIN IMMEDIATE");
        byte[] before = File.ReadAllBytes(folder[Name]);
        Assert.Contains("locked", Assert.Throws<CatalogException>(() => CatalogUpgrade.Run(folder[Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken)).Message, StringComparison.Ordinal);
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Raw.Execute(other, "ROLLBACK");
        Assert.Equal([Name], folder.Files);
    }

    /// <summary>What the third schema added: families, streams, decisions.</summary>
    private static List<string> OfSchema3(SqliteConnection connection) =>
    [
        .. Raw.Rows(connection, "SELECT * FROM families ORDER BY campaign_id, position"),
        .. Raw.Rows(connection, "SELECT * FROM review_families ORDER BY review_id, position"),
        .. Raw.Rows(connection, "SELECT * FROM streams ORDER BY id"),
        .. Raw.Rows(connection, "SELECT * FROM stream_entries ORDER BY stream_id, position"),
        .. Raw.Rows(connection, "SELECT * FROM standing_decisions ORDER BY stream_id, position"),
        .. Raw.Rows(connection, "SELECT id, number, lines FROM reviews ORDER BY id"),
    ];

    /// <summary>Counts of the tables, and every result to its last bit.</summary>
    private static List<string> Facts(SqliteConnection connection) =>
    [
        .. new[] { "campaigns", "experiments", "groups", "loads", "measurements", "reviews" }.Select(t => FormattableString.Invariant($"{t} {Raw.Integer(connection, $"SELECT count(*) FROM {t}")}")),
        .. Raw.Rows(connection, "SELECT experiment_id || ' ' || quote(p) || ' ' || quote(statistic) || ' ' || quote(eta_squared) FROM test_results ORDER BY 1"),
    ];

    /// <summary>A catalog of schema 0: the mark in the header, and whatever is given.</summary>
    private static TestFolder Older(string content)
    {
        var folder = new TestFolder();
        Raw.Execute(folder[Name], FormattableString.Invariant($"PRAGMA application_id = {SqliteCatalogFile.ApplicationId}; PRAGMA user_version = 0; {content} VACUUM;"));
        return folder;
    }
}
