using System.Security.Cryptography;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests.Providers;

public sealed class OpeningTests
{
    private const string Name = "campaigns.db";

    [Fact]
    public void A_missing_catalog_is_not_created_by_opening()
    {
        using var folder = new TestFolder();
        Assert.Contains("There is no catalog", Refused(folder[Name]), StringComparison.Ordinal);
        Assert.Contains("There is no catalog", Refused(Path.Combine(folder["nowhere"], Name)), StringComparison.Ordinal);
        Assert.Empty(folder.Files);
    }

    [Fact]
    public void A_folder_is_no_catalog()
    {
        using var folder = new TestFolder();
        Directory.CreateDirectory(folder[Name]);
        Assert.Contains("it is a folder", Refused(folder[Name]), StringComparison.Ordinal);
        Assert.Contains("it is a folder", Assert.Throws<CatalogException>(() => Catalog.OpenOrCreate(folder[Name], TimeProvider.System)).Message, StringComparison.Ordinal);
        Assert.Empty(Directory.EnumerateFileSystemEntries(folder[Name]));
    }

    [Theory]
    [InlineData("")]
    [InlineData("experiment,group,value\n")]
    [InlineData("SQLite format 3")]
    public void A_file_of_another_kind_is_refused_and_left_as_it_is(string content)
    {
        using var folder = new TestFolder();
        File.WriteAllText(folder[Name], content);
        AssertUntouched(folder, "is no catalog");
        Assert.Throws<CatalogException>(() => Catalog.OpenOrCreate(folder[Name], TimeProvider.System));
        Assert.Equal(content, File.ReadAllText(folder[Name]));
    }

    [Fact]
    public void A_catalog_that_was_made_anew_in_another_encoding_is_refused_and_left_as_it_is()
    {
        using TestFolder folder = WithCatalog();
        using (FileStream file = File.OpenWrite(folder[Name]))
        {
            // The encoding of texts, as the header of the file names it: 2 is UTF-16.
            file.Position = 59;
            file.WriteByte(2);
        }

        AssertUntouched(folder, "another encoding");
        Assert.Throws<CatalogException>(() => Catalog.OpenForProof(folder[Name], TimeProvider.System, isReadOnly: true));
    }

    [Theory]
    [InlineData("PRAGMA application_id = 1", "is no catalog")]
    [InlineData("PRAGMA application_id = 0", "is no catalog")]
    [InlineData("PRAGMA user_version = 5", "newer version")]
    [InlineData("PRAGMA user_version = 2147483647", "newer version")]
    [InlineData("PRAGMA user_version = 0", "older version")]
    [InlineData("PRAGMA user_version = -1", "is no catalog")]
    [InlineData("PRAGMA journal_mode = WAL", "write-ahead log")]
    [InlineData("ALTER TABLE campaigns ADD COLUMN unknown TEXT", "table campaigns is not as this program made it")]
    [InlineData("CREATE INDEX mine ON campaigns (title)", "index mine is not this program's")]
    [InlineData("DROP TABLE withdrawals", "table withdrawals is missing")]
    [InlineData("INSERT INTO \"__EFMigrationsHistory\" VALUES ('20990101000000_Later', '99')", "list of migrations")]
    public void A_database_that_is_not_this_programs_is_refused_and_left_as_it_is(string change, string reason)
    {
        using TestFolder folder = WithCatalog();
        Raw.Execute(folder[Name], change);
        AssertUntouched(folder, reason);
    }

    [Fact]
    public void A_truncated_catalog_is_refused_and_left_as_it_is()
    {
        using TestFolder folder = WithCatalog();
        byte[] whole = File.ReadAllBytes(folder[Name]);
        const int page = 8192;
        Assert.True(whole.Length > 20 * page);
        int[] lengths = [50, 99, 100, 512, page - 1, page, page + 1, 2 * page, 5 * page, 10 * page + 77, whole.Length - page, whole.Length - page - 1];
        Assert.All(lengths, length =>
        {
            File.WriteAllBytes(folder[Name], whole[..length]);
            AssertUntouched(folder, length < 100 ? "is no catalog" : "is damaged");
        });
    }

    [Fact]
    public void Creation_leaves_one_file_and_no_draft()
    {
        using TestFolder folder = WithCatalog();
        Assert.Equal([Name], folder.Files);
    }

    [Fact]
    public void A_draft_that_a_killed_program_left_is_no_obstacle()
    {
        using var folder = new TestFolder();
        foreach (int number in Enumerable.Range(0, 2000))
        {
            File.WriteAllText(folder[FormattableString.Invariant($"{Name}.new-{Environment.ProcessId}-{number}")], "left over");
        }

        File.WriteAllText(folder[FormattableString.Invariant($"{Name}.new-{Environment.ProcessId}")], "left over");
        using Catalog catalog = Catalog.OpenOrCreate(folder[Name], TimeProvider.System);
        Assert.Empty(new CampaignStore(catalog).All());
    }

    [Fact]
    public void A_catalog_in_a_folder_that_is_not_there_cannot_be_created()
    {
        using var folder = new TestFolder();
        CatalogException refused = Assert.Throws<CatalogException>(() => Catalog.OpenOrCreate(Path.Combine(folder["nowhere"], Name), TimeProvider.System));
        Assert.Contains("nowhere", refused.Message, StringComparison.Ordinal);
        Assert.Empty(folder.Files);
    }

    [Fact]
    public async Task Several_that_create_the_same_catalog_at_once_all_get_it()
    {
        for (int round = 0; round < 5; round++)
        {
            using var folder = new TestFolder();
            using var start = new Barrier(4);
            Task[] openers = [.. Enumerable.Range(0, 4).Select(_ => Task.Factory.StartNew(
                () =>
                {
                    start.SignalAndWait();
                    using Catalog catalog = Catalog.OpenOrCreate(folder[Name], TimeProvider.System);
                    Assert.Empty(new CampaignStore(catalog).All());
                },
                TestContext.Current.CancellationToken,
                TaskCreationOptions.LongRunning,
                TaskScheduler.Default))];
            await Task.WhenAll(openers);
            Assert.Equal([Name], folder.Files);
        }
    }

    [Fact]
    public void What_others_keep_beside_the_tables_is_no_harm()
    {
        using TestFolder folder = WithCatalog();
        Raw.Execute(folder[Name], "CREATE TABLE notes (text TEXT); CREATE VIEW titles AS SELECT title FROM campaigns");
        Catalog.Open(folder[Name], TimeProvider.System).Dispose();
    }

    [Fact]
    public void The_fingerprint_is_that_of_the_schema()
    {
        using SqliteConnection fresh = SqliteCatalogFile.InMemory();
        Assert.Equal(SchemaFingerprint.Expected, SchemaFingerprint.Of(fresh));
        Raw.Execute(fresh, "DROP INDEX IF EXISTS none; ALTER TABLE loads ADD COLUMN unknown TEXT");
        Assert.NotEqual(SchemaFingerprint.Expected, SchemaFingerprint.Of(fresh));
    }

    [Fact]
    public void Leftovers_of_processes_that_are_gone_are_removed_and_those_of_living_ones_stay()
    {
        using var folder = new TestFolder();
        using System.Diagnostics.Process gone = System.Diagnostics.Process.Start(new System.Diagnostics.ProcessStartInfo("dotnet", "--version") { RedirectStandardOutput = true })!;
        gone.WaitForExit();
        string[] stay = [FormattableString.Invariant($"{Name}.draft-backup-{Environment.ProcessId}-7"), $"{Name}.draft-2024-1-1", $"{Name}.draft-new-x-1", $"{Name}.new-1"];
        string[] go = [FormattableString.Invariant($"{Name}.draft-new-{gone.Id}-1"), FormattableString.Invariant($"{Name}.draft-upgrade-{gone.Id}-2-journal")];
        Array.ForEach([.. stay, .. go], file => File.WriteAllText(folder[file], ""));
        Catalog.OpenOrCreate(folder[Name], TimeProvider.System).Dispose();
        Assert.Equal([.. new[] { Name }.Concat(stay).Order(StringComparer.Ordinal)], folder.Files);
    }

    [Fact]
    public void A_catalog_that_another_program_holds_is_told_as_locked()
    {
        using TestFolder folder = WithCatalog();
        using SqliteConnection other = Raw.Open(folder[Name]);
        Raw.Execute(other, "BEGIN EXCLUSIVE");
        Assert.Contains("locked by another program", Refused(folder[Name]), StringComparison.Ordinal);
    }

    [Fact]
    public void A_change_while_another_program_writes_is_told_as_locked_and_can_be_tried_again()
    {
        using var catalog = new TestCatalog();
        using SqliteConnection other = Raw.Open(catalog.Catalog.Path);
        Raw.Execute(other, "BEGIN IMMEDIATE");
        CatalogException refused = Assert.Throws<CatalogException>(() => catalog.Start());
        Assert.Contains("locked by another program", refused.Message, StringComparison.Ordinal);
        Raw.Execute(other, "ROLLBACK");
        Assert.Equal(1, catalog.Start().Id);
    }

    [Fact]
    public void A_failed_change_leaves_nothing_and_a_change_inside_another_joins_it()
    {
        using var catalog = new TestCatalog();
        string before = catalog.Dump;
        Assert.Throws<InvalidOperationException>(() => catalog.Catalog.Change(() =>
        {
            catalog.Start();
            return catalog.Campaigns.Get("C").Id == 1 ? throw new InvalidOperationException("after all") : 0;
        }));
        Assert.Equal(before, catalog.Dump);
        Assert.Equal(1, catalog.Start().Id);
    }

    private static TestFolder WithCatalog()
    {
        var folder = new TestFolder();
        SqliteCatalogFile.Create(folder[Name]);
        return folder;
    }

    private static string Refused(string path) =>
        Assert.Throws<CatalogException>(() => Catalog.Open(path, TimeProvider.System).Dispose()).Message;

    private static void AssertUntouched(TestFolder folder, string reason)
    {
        string hash = Hash(folder[Name]);
        Assert.Contains(reason, Refused(folder[Name]), StringComparison.Ordinal);
        Assert.Equal(hash, Hash(folder[Name]));
        Assert.Equal([Name], folder.Files);
    }

    private static string Hash(string path) => Convert.ToHexString(SHA256.HashData(File.ReadAllBytes(path)));
}
