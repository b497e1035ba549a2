using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests.Providers;

public sealed class BackupTests
{
    private const string Copy = "copy.db";

    [Fact]
    public void A_backup_is_whole_holds_the_same_rows_and_changes_nothing()
    {
        using TestCatalog catalog = Tested();
        byte[] before = File.ReadAllBytes(catalog.Catalog.Path);
        BackupSummary backup = BackupWriter.Write(catalog.Catalog, catalog.Folder[Copy], replace: false);
        Assert.Equal(before, File.ReadAllBytes(catalog.Catalog.Path));
        Assert.Equal(new LedgerReader(catalog.Catalog).Head, backup.Head);
        Assert.Equal(new FileInfo(catalog.Folder[Copy]).Length, backup.Bytes);
        using (SqliteConnection copy = Raw.Open(catalog.Folder[Copy]))
        {
            Assert.Equal(catalog.Dump, Raw.Dump(copy));
        }

        CheckedCatalog check = Check(catalog, backup.Head);
        Assert.Empty(check.Faults);
        Assert.Equal([new CheckedCampaign("C", "", 1)], check.Campaigns);
        Assert.Equal((backup.Head, catalog.Clock.GetUtcNow()), (check.Head, check.LastAt));
    }

    [Fact]
    public void A_backup_is_made_while_another_program_writes_and_holds_what_was_kept_before()
    {
        using TestCatalog catalog = Tested();
        LedgerHead head = new LedgerReader(catalog.Catalog).Head;
        using SqliteConnection writer = Raw.Open(catalog.Catalog.Path);
        Raw.Execute(writer, "BEGIN IMMEDIATE; CREATE TABLE unfinished (text TEXT)");
        Assert.Equal(head, BackupWriter.Write(catalog.Catalog, catalog.Folder[Copy], replace: false).Head);
        Raw.Execute(writer, "ROLLBACK");
        Assert.Empty(Check(catalog, head).Faults);
    }

    [Fact]
    public void A_file_that_is_there_is_replaced_only_on_demand_and_the_catalog_itself_never()
    {
        using TestCatalog catalog = Tested();
        File.WriteAllText(catalog.Folder[Copy], "mine");
        Assert.Contains("--replace", Refusal(catalog, Copy, replace: false), StringComparison.Ordinal);
        Assert.Equal("mine", File.ReadAllText(catalog.Folder[Copy]));
        BackupWriter.Write(catalog.Catalog, catalog.Folder[Copy], replace: true);
        Assert.Empty(Check(catalog, null).Faults);
        Assert.Contains("the catalog itself", Refusal(catalog, "campaigns.db", replace: true), StringComparison.Ordinal);
        Assert.Contains("its folder is not there", Refusal(catalog, Path.Combine("nowhere", Copy), replace: true), StringComparison.Ordinal);
        File.WriteAllText(catalog.Folder[Copy + "-journal"], "somebody's");
        Assert.Contains("copy.db-journal", Refusal(catalog, Copy, replace: true), StringComparison.Ordinal);
    }

    [Fact]
    public void A_check_finds_a_changed_row_a_cut_ledger_and_a_head_of_another_catalog()
    {
        using TestCatalog catalog = Tested();
        LedgerHead head = BackupWriter.Write(catalog.Catalog, catalog.Folder[Copy], replace: false).Head;
        Assert.NotEmpty(Check(catalog, head with { Hash = new string('a', 64) }).Faults);
        Assert.NotEmpty(Check(catalog, head with { Sequence = head.Sequence + 1 }).Faults);
        byte[] before = File.ReadAllBytes(catalog.Folder[Copy]);
        Raw.Execute(catalog.Folder[Copy], "DROP TRIGGER test_results_are_kept; UPDATE test_results SET p = 0.5");
        Assert.NotEqual(before, File.ReadAllBytes(catalog.Folder[Copy]));
        byte[] changed = File.ReadAllBytes(catalog.Folder[Copy]);
        CheckedCatalog check = Check(catalog, head);
        Assert.Contains(check.Faults, fault => fault.Contains("test_results_are_kept", StringComparison.Ordinal));
        Assert.True(check.Faults.Count > 1);
        Assert.Equal(changed, File.ReadAllBytes(catalog.Folder[Copy]));
    }

    private static CheckedCatalog Check(TestCatalog catalog, LedgerHead? head) =>
        CatalogCheck.Run(catalog.Folder[Copy], head, catalog.Clock, TestContext.Current.CancellationToken);

    private static string Refusal(TestCatalog catalog, string name, bool replace) =>
        Assert.Throws<RefusedException>(() => BackupWriter.Write(catalog.Catalog, catalog.Folder[name], replace)).Message;

    private static TestCatalog Tested()
    {
        var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", 2, "a", "b"));
        catalog.Load(TestCatalog.Rows("E", "a", "1 2") + TestCatalog.Rows("E", "b", "5 6"));
        catalog.Test();
        return catalog;
    }
}
