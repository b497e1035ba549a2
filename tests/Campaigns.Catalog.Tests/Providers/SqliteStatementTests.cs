using System.Text;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests.Providers;

public sealed class SqliteStatementTests : IDisposable
{
    private readonly SqliteConnection _connection = SqliteCatalogFile.InMemory();

    [Theory]
    [InlineData("SELECT 'abc'")]
    [InlineData("SELECT '7'")]
    [InlineData("SELECT x'07'")]
    [InlineData("SELECT 7.0")]
    [InlineData("SELECT NULL")]
    public void What_is_no_whole_number_is_never_read_as_one(string sql)
    {
        using var row = At(sql);
        Assert.Contains("a whole number belongs", Assert.Throws<RecordException>(() => row.Integer(0)).Message, StringComparison.Ordinal);
        using var loose = At(sql, takesAnything: true);
        Assert.InRange(loose.Integer(0), 0, 7);
    }

    [Theory]
    [InlineData("SELECT '0.05'")]
    [InlineData("SELECT x'00'")]
    [InlineData("SELECT NULL")]
    [InlineData("SELECT 9e999")]
    [InlineData("SELECT -9e999")]
    public void What_is_no_finite_number_is_never_read_as_one(string sql)
    {
        using var row = At(sql);
        Assert.Throws<RecordException>(() => row.Real(0));
    }

    [Theory]
    [InlineData("SELECT 7")]
    [InlineData("SELECT 7.5")]
    [InlineData("SELECT x'61'")]
    [InlineData("SELECT NULL")]
    [InlineData("SELECT CAST(x'61ff62' AS TEXT)")]
    [InlineData("SELECT CAST(x'eda080' AS TEXT)")]
    [InlineData("SELECT CAST(x'c3' AS TEXT)")]
    public void What_is_no_text_is_never_read_as_one(string sql)
    {
        using var row = At(sql);
        Assert.Throws<RecordException>(() => row.Text(0));
        using var loose = At(sql, takesAnything: true);
        Assert.NotNull(loose.Text(0));
    }

    [Theory]
    [InlineData("SELECT 7")]
    [InlineData("SELECT NULL")]
    [InlineData("SELECT 0.5")]
    public void What_is_no_packed_value_is_never_read_as_one(string sql)
    {
        using var row = At(sql);
        Assert.Throws<RecordException>(() => row.Blob(0).Length);
    }

    [Fact]
    public void A_cell_of_another_kind_is_told_by_its_column_and_its_table()
    {
        Raw.Execute(_connection, "CREATE TABLE t (n INTEGER, x REAL); INSERT INTO t VALUES ('many', 'more')");
        using var row = At("SELECT n AS other, x FROM t");
        string message = Assert.Throws<RecordException>(() => row.NullableInteger(0)).Message;
        Assert.Contains("holds a text in 'n' of the table 't', where a whole number belongs", message, StringComparison.Ordinal);
        Assert.Contains("'x' of the table 't', where a number belongs", Assert.Throws<RecordException>(() => row.NullableReal(1)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Null_is_read_where_it_is_expected()
    {
        using var row = At("SELECT NULL");
        Assert.Null(row.NullableInteger(0));
        Assert.Null(row.NullableReal(0));
        Assert.Null(row.NullableText(0));
        Assert.True(row.IsNull(0));
    }

    [Fact]
    public void Numbers_at_the_ends_of_their_ranges_come_back()
    {
        using var row = At("SELECT -9223372036854775807 - 1, 9223372036854775807, 4.9e-324, 1.7976931348623157e308, 3");
        Assert.Equal((long.MinValue, long.MaxValue, double.Epsilon, double.MaxValue, 3.0), (row.Integer(0), row.Integer(1), row.Real(2), row.Real(3), row.Real(4)));
    }

    [Theory]
    [InlineData("")]
    [InlineData("a\0b")]
    [InlineData("\0")]
    [InlineData("\uFFFD")]
    [InlineData("Grün 水 🧪")]
    public void A_text_comes_back_as_it_was_bound(string text)
    {
        using var echo = new SqliteStatement(_connection, "SELECT ?1, CAST(?1 AS BLOB), ?2, typeof(?2)");
        echo.Bind(1, text).BindText(2, Encoding.UTF8.GetBytes(text)).Read();
        Assert.Equal((text, text, "text"), (echo.Text(0), echo.Text(2), echo.Text(3)));
        Assert.Equal(Encoding.UTF8.GetBytes(text), echo.Blob(1).ToArray());
    }

    [Fact]
    public void A_long_text_comes_back_as_it_was_bound()
    {
        string text = string.Concat(Enumerable.Repeat("Grün\0🧪", 10_000));
        using var echo = new SqliteStatement(_connection, "SELECT ?1");
        echo.Bind(1, text).Read();
        Assert.Equal(text, echo.Text(0));
    }

    [Fact]
    public void A_text_with_half_a_character_is_not_stored_as_another()
    {
        using var echo = new SqliteStatement(_connection, "SELECT ?1");
        Assert.ThrowsAny<ArgumentException>(() => echo.Bind(1, "a\uD83D"));
    }

    [Fact]
    public void An_empty_blob_is_no_null()
    {
        using var echo = new SqliteStatement(_connection, "SELECT ?1, typeof(?1)");
        echo.BindBlob(1, []).Read();
        Assert.Equal((0, "blob"), (echo.Blob(0).Length, echo.Text(1)));
        echo.Reset();
        echo.BindNull(1).Read();
        Assert.Equal("null", echo.Text(1));
    }

    [Fact]
    public void Cells_are_read_where_a_row_is_at_hand_alone()
    {
        using var rows = new SqliteStatement(_connection, "SELECT 1");
        Assert.Throws<InvalidOperationException>(() => rows.Integer(0));
        Assert.True(rows.Read());
        Assert.Equal(1, rows.Integer(0));
        Assert.False(rows.Read());
        Assert.Throws<InvalidOperationException>(() => rows.IsNull(0));
        Assert.True(rows.Read());
        rows.Reset();
        Assert.Throws<InvalidOperationException>(() => rows.Blob(0).Length);
    }

    [Fact]
    public void A_statement_that_was_disposed_of_refuses_everything()
    {
        var rows = At("SELECT coalesce(?1, 1)");
        rows.Dispose();
        rows.Dispose();
        Assert.Throws<ObjectDisposedException>(() => rows.Integer(0));
        Assert.Throws<ObjectDisposedException>(() => rows.NullableText(0));
        Assert.Throws<ObjectDisposedException>(() => rows.TextEquals(0, "1"));
        Assert.Throws<ObjectDisposedException>(() => rows.Read());
        Assert.Throws<ObjectDisposedException>(() => rows.Bind(1, 1L));
    }

    [Fact]
    public void A_statement_does_not_outlive_its_catalog()
    {
        using var folder = new TestFolder();
        var catalog = Catalog.OpenOrCreate(folder["c.db"], TimeProvider.System);
        SqliteStatement kept = catalog.Prepare("SELECT 1");
        Assert.True(kept.Read());
        Assert.Equal(1, catalog.OpenStatements);
        catalog.Dispose();
        Assert.Throws<ObjectDisposedException>(() => kept.Integer(0));
        Assert.Throws<ObjectDisposedException>(() => kept.Read());
        Assert.ThrowsAny<ObjectDisposedException>(() => catalog.Prepare("SELECT 1"));
        kept.Dispose();

        // The file is nobody's any more: an exclusive lock is to be had.
        Raw.Execute(folder["c.db"], "BEGIN EXCLUSIVE; ROLLBACK");
    }

    [Fact]
    public void A_statement_that_was_left_behind_stays_until_its_catalog_closes()
    {
        using var folder = new TestFolder();
        using var catalog = Catalog.OpenOrCreate(folder["c.db"], TimeProvider.System);
        LeaveBehind(catalog);
        GC.Collect();
        GC.WaitForPendingFinalizers();
        Assert.Equal(1, catalog.OpenStatements);
    }

    [Fact]
    public void Reading_from_one_end_of_a_campaign_to_the_other_leaves_no_statement_open()
    {
        using var campaign = new TestCatalog();
        campaign.Seal(TestCatalog.Experiment("E1", null, "A", "B"), TestCatalog.Experiment("E2"));
        campaign.Load(TestCatalog.Rows("E1", "A", "1.0 1.1 1.2") + TestCatalog.Rows("E1", "B", "2.0 2.1 2.2"));
        campaign.Refused("E1,Z,1\n");
        campaign.Test();
        campaign.Review();
        _ = campaign.Standing;
        Assert.NotNull(new LedgerReader(campaign.Catalog).Entries(new LedgerFilter()).First());
        Assert.Equal(0, campaign.Catalog.OpenStatements);
    }

    [Fact]
    public void A_lock_that_another_program_holds_is_told_and_the_statement_can_be_used_again()
    {
        using var folder = new TestFolder();
        using var catalog = Catalog.OpenOrCreate(folder["c.db"], TimeProvider.System);
        SqliteCatalogFile.Execute(catalog.Connection, "PRAGMA busy_timeout = 0");
        using SqliteStatement count = catalog.Prepare("SELECT count(*) FROM campaigns");
        using (SqliteConnection other = Raw.Open(folder["c.db"]))
        {
            Raw.Execute(other, "BEGIN EXCLUSIVE");
            Assert.Contains("is locked", Assert.Throws<CatalogException>(() => count.Read()).Message, StringComparison.Ordinal);
            Assert.Throws<InvalidOperationException>(() => count.Integer(0));
            Raw.Execute(other, "ROLLBACK");
        }

        Assert.True(count.Read());
        Assert.Equal(0, count.Integer(0));
    }

    [Fact]
    public void A_statement_that_is_interrupted_ends_as_a_wish_to_stop()
    {
        using var folder = new TestFolder();
        using var catalog = Catalog.OpenOrCreate(folder["c.db"], TimeProvider.System);
        using var stop = new CancellationTokenSource();
        catalog.StopOn(stop.Token);
        using SqliteStatement endless = catalog.Prepare("WITH RECURSIVE n(i) AS (VALUES (1) UNION ALL SELECT i + 1 FROM n) SELECT count(*) FROM n");
        stop.CancelAfter(TimeSpan.FromMilliseconds(50));
        Assert.ThrowsAny<OperationCanceledException>(() => endless.Read());
    }

    [Fact]
    public void Memory_that_ran_out_is_no_fault_of_the_program()
    {
        var error = Assert.IsType<CatalogException>(SqliteErrors.Translate(SQLitePCL.raw.SQLITE_NOMEM, "out of memory", "c.db"));
        Assert.Contains("not enough memory", error.Message, StringComparison.Ordinal);
    }

    public void Dispose() => _connection.Dispose();

    [System.Runtime.CompilerServices.MethodImpl(System.Runtime.CompilerServices.MethodImplOptions.NoInlining)]
    private static void LeaveBehind(Catalog catalog) => catalog.Prepare("SELECT 1").Read();

    /// <summary>A statement at its first row.</summary>
    private SqliteStatement At(string sql, bool takesAnything = false)
    {
        var row = new SqliteStatement(_connection, sql, takesAnything: takesAnything);
        Assert.True(row.Read());
        return row;
    }
}
