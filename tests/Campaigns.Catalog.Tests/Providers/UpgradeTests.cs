using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests.Providers;

public sealed class UpgradeTests
{
    private const string Name = "campaigns.db";
    private const string Migrations = "Campaigns.Migrations.Sqlite";

    [Theory]
    [InlineData("")]
    [InlineData("CREATE TABLE notes (text TEXT); INSERT INTO notes VALUES ('kept');")]
    public void An_older_catalog_becomes_one_of_today(string content)
    {
        using TestFolder folder = Older(content);
        Assert.Throws<CatalogException>(() => Catalog.Open(folder[Name], TimeProvider.System));
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations));
        Assert.Equal([Name], folder.Files);
        using (Catalog catalog = Catalog.Open(folder[Name], TimeProvider.System))
        {
            Assert.Empty(new CampaignStore(catalog).All());
            Assert.Equal(["ok"], Raw.Rows(catalog.Connection, "PRAGMA integrity_check"));
            Assert.Equal(["delete"], Raw.Rows(catalog.Connection, "PRAGMA journal_mode"));
            Assert.Equal(0, Raw.Integer(catalog.Connection, "SELECT count(*) FROM sqlite_master WHERE name LIKE '%Lock%'"));
            Assert.Equal(content.Length > 0 ? ["kept"] : [], content.Length > 0 ? Raw.Rows(catalog.Connection, "SELECT text FROM notes") : []);
        }

        Assert.False(CatalogUpgrade.Run(folder[Name], Migrations));
    }

    [Fact]
    public void A_catalog_of_today_is_left_as_it_is()
    {
        using var folder = new TestFolder();
        SqliteCatalogFile.Create(folder[Name]);
        byte[] before = File.ReadAllBytes(folder[Name]);
        Assert.False(CatalogUpgrade.Run(folder[Name], Migrations));
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Assert.Equal([Name], folder.Files);
    }

    [Fact]
    public void An_upgrade_that_fails_in_the_middle_leaves_the_old_file()
    {
        // The migration cannot create a table that somebody else made.
        using TestFolder folder = Older("CREATE TABLE reviews (text TEXT);");
        byte[] before = File.ReadAllBytes(folder[Name]);
        Assert.ThrowsAny<Exception>(() => CatalogUpgrade.Run(folder[Name], Migrations));
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Assert.Equal([Name], folder.Files);
        Raw.Execute(folder[Name], "DROP TABLE reviews");
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations));
    }

    [Fact]
    public void A_copy_that_a_killed_upgrade_left_is_no_obstacle()
    {
        using TestFolder folder = Older("");
        string copy = FormattableString.Invariant($"{folder[Name]}.upgrade-{Environment.ProcessId}");
        File.WriteAllText(copy, "half a catalog");
        Assert.True(CatalogUpgrade.Run(folder[Name], Migrations));
        Assert.Equal([Name], folder.Files);
    }

    [Theory]
    [InlineData("PRAGMA user_version = 2", "newer version")]
    [InlineData("PRAGMA application_id = 5", "is no catalog")]
    public void Files_that_cannot_be_upgraded_are_left_as_they_are(string change, string reason)
    {
        using var folder = new TestFolder();
        SqliteCatalogFile.Create(folder[Name]);
        Raw.Execute(folder[Name], change);
        byte[] before = File.ReadAllBytes(folder[Name]);
        Assert.Contains(reason, Assert.Throws<CatalogException>(() => CatalogUpgrade.Run(folder[Name], Migrations)).Message, StringComparison.Ordinal);
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
        Assert.Contains("locked", Assert.Throws<CatalogException>(() => CatalogUpgrade.Run(folder[Name], Migrations)).Message, StringComparison.Ordinal);
        Assert.Equal(before, File.ReadAllBytes(folder[Name]));
        Raw.Execute(other, "ROLLBACK");
        Assert.Equal([Name], folder.Files);
    }

    /// <summary>A catalog of schema 0: the mark in the header, and whatever is given.</summary>
    private static TestFolder Older(string content)
    {
        var folder = new TestFolder();
        Raw.Execute(folder[Name], FormattableString.Invariant($"PRAGMA application_id = {SqliteCatalogFile.ApplicationId}; PRAGMA user_version = 0; {content} VACUUM;"));
        return folder;
    }
}
