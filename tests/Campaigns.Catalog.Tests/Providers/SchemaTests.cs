using System.Globalization;
using System.Reflection;
using System.Text.RegularExpressions;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Rows;
using Campaigns.Statistics.Tests.External;
using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata;

namespace Campaigns.Catalog.Tests.Providers;

public sealed partial class SchemaTests
{
    private const string Migrations = "Campaigns.Migrations.Sqlite";

    /// <summary>A row for every table, parents first, every column with a value of its own.</summary>
    private static readonly (string Table, Dictionary<string, object> Cells)[] HandBuilt =
    [
        ("campaigns", new()
        {
            ["id"] = 7L, ["code"] = "c", ["title"] = "Titel µ", ["purpose"] = "why", ["error_rate"] = "familywise", ["level"] = 0.01, ["correction"] = "holm",
            ["default_test"] = "f", ["default_follow_up"] = "dunnett", ["is_exploratory"] = 1L, ["opened_at"] = 1_764_576_000_000_001L,
            ["sealed_at"] = 1_764_576_000_000_002L, ["plan_digest"] = "abc",
        }),
        ("group_sets", new() { ["id"] = 8L, ["campaign_id"] = 7L }),
        ("groups", new() { ["group_set_id"] = 8L, ["position"] = 3L, ["label"] = "80 °C" }),
        ("experiments", new()
        {
            ["id"] = 9L, ["campaign_id"] = 7L, ["code"] = "e", ["title"] = "t", ["response"] = "r", ["unit"] = "MPa", ["group_set_id"] = 8L,
            ["groups_are_planned"] = 1L, ["control"] = "k", ["test"] = "f", ["follow_up"] = "scheffe", ["replicates"] = 6L, ["smallest_effect"] = 0.25,
            ["assumed_sd"] = 0.5, ["weight"] = 2.0, ["family"] = "main", ["confirms"] = "early/e", ["shared_control"] = "panel 3", ["first_load_id"] = 10L, ["amendment_id"] = 15L,
        }),
        ("loads", new()
        {
            ["id"] = 10L, ["campaign_id"] = 7L, ["file_name"] = "w.csv", ["sha256"] = new string('a', 64), ["byte_count"] = 5_000_000_000L, ["row_count"] = 12L,
            ["missing_count"] = 2L, ["experiment_count"] = 1L, ["loaded_at"] = 1_764_576_000_000_003L, ["amendment_reason"] = "late panel",
        }),
        ("measurements", new() { ["experiment_id"] = 9L, ["load_id"] = 10L, ["value_count"] = 10L, ["missing_count"] = 2L, ["packed"] = new byte[] { 1, 2, 255 }, ["group_set_id"] = 8L }),
        ("test_runs", new()
        {
            ["id"] = 11L, ["campaign_id"] = 7L, ["last_load_id"] = 10L, ["last_exclusion_id"] = 13L, ["last_amendment_id"] = 15L, ["last_withdrawal_id"] = 16L, ["ran_at"] = 1_764_576_000_000_004L, ["includes_incomplete"] = 1L, ["program_version"] = "9.8.7",
        }),
        ("test_results", new()
        {
            ["experiment_id"] = 9L, ["test_run_id"] = 11L, ["status"] = "tested", ["group_count"] = 2L, ["observation_count"] = 10L, ["statistic"] = 5.5,
            ["df1"] = 1.5, ["df2"] = 8.25, ["p"] = 4.9406564584124654e-324, ["log_p"] = -744.4400719213812, ["eta_squared"] = 0.5, ["omega_squared"] = -0.125,
            ["specimen_count"] = 6L, ["arrangements"] = 99_999L, ["as_extreme"] = 17L, ["seed"] = -5L,
        }),
        ("reviews", new()
        {
            ["id"] = 12L, ["campaign_id"] = 7L, ["number"] = 1L, ["taken_at"] = 1_764_576_000_000_005L, ["correction"] = "holm", ["level"] = 0.01, ["family_size"] = 5L,
            ["tested_count"] = 4L, ["survivor_count"] = 3L, ["is_interim"] = 1L, ["last_test_run_id"] = 11L, ["last_load_id"] = 10L, ["last_exclusion_id"] = 13L, ["last_amendment_id"] = 15L, ["last_withdrawal_id"] = 16L, ["program_version"] = "9.8.7", ["lines"] = new byte[] { 9 },
        }),
        ("exclusions", new()
        {
            ["id"] = 13L, ["experiment_id"] = 9L, ["load_id"] = 10L, ["line"] = 4L, ["is_excluded"] = 1L, ["group_label"] = "80 °C", ["value"] = "1.50",
            ["reason"] = "spilled", ["named_by"] = "Ada", ["made_at"] = 1_764_576_000_000_006L, ["program_version"] = "9.8.7",
        }),
        ("families", new()
        {
            ["campaign_id"] = 7L, ["position"] = 2L, ["name"] = "main", ["correction"] = "hommel", ["level"] = 0.02, ["opens_after"] = "first", ["opens_when"] = "all",
        }),
        ("review_families", new()
        {
            ["review_id"] = 12L, ["position"] = 2L, ["name"] = "main", ["correction"] = "hommel", ["level"] = 0.02, ["family_size"] = 5L, ["planned_count"] = 6L,
            ["tested_count"] = 4L, ["survivor_count"] = 3L, ["is_open"] = 1L,
        }),
        ("online_settings", new() { ["campaign_id"] = 7L, ["horizon"] = 40L, ["shape"] = "p2", ["initial_wealth"] = 0.004, ["lambda"] = 0.3, ["tau"] = 0.6 }),
        ("streams", new()
        {
            ["id"] = 14L, ["campaign_id"] = 7L, ["number"] = 2L, ["procedure"] = "addis", ["level"] = 0.03, ["horizon"] = 50L, ["shape"] = "p1.6", ["initial_wealth"] = 0.015,
            ["lambda"] = 0.25, ["tau"] = 0.5, ["reason"] = "more experiments", ["started_at"] = 1_764_576_000_000_007L, ["program_version"] = "9.8.7",
        }),
        ("stream_entries", new()
        {
            ["stream_id"] = 14L, ["position"] = 3L, ["experiment_id"] = 9L, ["level"] = 0.00125, ["known_count"] = 2L, ["registered_at"] = 1_764_576_000_000_008L,
        }),
        ("standing_decisions", new()
        {
            ["stream_id"] = 14L, ["position"] = 3L, ["known_order"] = 4L, ["test_run_id"] = 11L, ["p"] = 4.9406564584124654e-324, ["log_p"] = -744.4400719213812,
            ["survives"] = 1L, ["decided_at"] = 1_764_576_000_000_009L,
        }),
        ("plan_amendments", new() { ["id"] = 15L, ["campaign_id"] = 7L, ["number"] = 2L, ["reason"] = "late panels", ["named_by"] = "Ada", ["made_at"] = 1_764_576_000_000_010L, ["program_version"] = "9.8.7" }),
        ("plan_amendment_changes", new() { ["amendment_id"] = 15L, ["experiment_id"] = 9L, ["field"] = "replicates", ["before"] = "5", ["after"] = "6" }),
        ("withdrawals", new()
        {
            ["id"] = 16L, ["experiment_id"] = 9L, ["is_withdrawn"] = 1L, ["had_data"] = 1L, ["reason"] = "wrong primer", ["named_by"] = "Ada", ["made_at"] = 1_764_576_000_000_011L, ["program_version"] = "9.8.7",
        }),
        ("originals", new() { ["load_id"] = 10L, ["encoding"] = "utf-8", ["separator"] = "semicolon", ["decimal_mark"] = "comma", ["columns"] = "value=Reading", ["compression"] = "brotli", ["piece_count"] = 2L }),
        ("original_pieces", new() { ["load_id"] = 10L, ["position"] = 2L, ["byte_count"] = 7L, ["content"] = new byte[] { 3, 4 } }),
        ("ledger", new()
        {
            ["sequence"] = 17L, ["at"] = 1_764_576_000_000_012L, ["account"] = "bench", ["acting_as"] = "Ada", ["program_version"] = "9.8.7", ["action"] = "load", ["campaign"] = "c",
            ["subject"] = "w.csv", ["reason"] = "late panel", ["hash"] = new string('b', 64),
        }),
        ("ledger_changes", new() { ["sequence"] = 17L, ["position"] = 1L, ["what"] = "rows", ["before"] = "1", ["after"] = "12" }),
        ("ledger_evidence", new() { ["sequence"] = 17L, ["position"] = 2L, ["kind"] = "load", ["owner"] = 10L, ["first"] = 3L, ["last"] = 4L, ["digest"] = new string('c', 64) }),
    ];

    [Fact]
    public void The_embedded_schema_is_what_the_migrations_build()
    {
        using var folder = new TestFolder();
        SqliteCatalogFile.Create(folder["embedded.db"]);
        using SqliteConnection embedded = Raw.Open(folder["embedded.db"]);
        using SqliteConnection migrated = Raw.Open(folder["migrated.db"]);
        using (CatalogContext context = CatalogContext.On(migrated, Migrations))
        {
            context.Database.Migrate();
        }

        // The lock table lives only while a migration runs, or is killed; an upgrade takes it away.
        const string master = "SELECT type, name, tbl_name, sql FROM sqlite_master WHERE name NOT LIKE '%__EFMigrationsLock%' ORDER BY type, name";
        const string history = "SELECT * FROM __EFMigrationsHistory";
        Assert.Equal(Raw.Rows(migrated, master), Raw.Rows(embedded, master));
        Assert.Equal(Raw.Rows(migrated, history), Raw.Rows(embedded, history));
        Assert.True(Raw.Rows(embedded, master).Count > 30);
    }

    [Fact]
    public void The_model_has_no_change_without_a_migration_and_the_version_counts_the_migrations()
    {
        using var catalog = new TestCatalog();
        using CatalogContext context = CatalogContext.On(catalog.Catalog.Connection, Migrations);
        Assert.False(context.Database.HasPendingModelChanges());
        Assert.Empty(context.Database.GetPendingMigrations());
        int migrations = context.Database.GetMigrations().Count();
        Assert.Equal(SqliteCatalogFile.SchemaVersion, migrations);
        Assert.Equal(SqliteCatalogFile.SchemaVersion, Raw.Integer(catalog.Catalog.Connection, "PRAGMA user_version"));
        Assert.Equal(SqliteCatalogFile.ApplicationId, Raw.Integer(catalog.Catalog.Connection, "PRAGMA application_id"));
    }

    [Fact]
    public void A_connection_has_the_settings_that_keep_a_catalog_one_safe_file()
    {
        using var catalog = new TestCatalog();
        SqliteConnection connection = catalog.Catalog.Connection;
        Assert.Equal(["delete"], Raw.Rows(connection, "PRAGMA journal_mode"));
        Assert.Equal(3, Raw.Integer(connection, "PRAGMA synchronous"));
        Assert.Equal(1, Raw.Integer(connection, "PRAGMA foreign_keys"));
        Assert.Equal(5000, Raw.Integer(connection, "PRAGMA busy_timeout"));
    }

    [Fact]
    public void The_model_reads_every_column_of_every_table_as_prepared_statements_wrote_it()
    {
        using var catalog = new TestCatalog();
        Raw.Execute(catalog.Catalog.Connection, "BEGIN");

        // A sealed campaign takes no more groups of experiments, so the campaign that stands sealed here is an exploratory one.
        foreach ((string table, Dictionary<string, object> cells) in HandBuilt)
        {
            Insert(catalog.Catalog, table, cells);
        }

        Raw.Execute(catalog.Catalog.Connection, "COMMIT");
        CatalogContext context = catalog.Catalog.Context;
        object[] read =
        [
            context.Campaigns.Single(c => c.Code == "c"), context.Set<GroupSetRow>().Single(), context.Groups.Single(g => g.Label.StartsWith("80")),
            context.Experiments.Single(e => e.Replicates == 6), context.Loads.Single(l => l.AmendmentReason != null), context.Measurements.Single(m => m.ValueCount == 10),
            context.TestRuns.Single(r => r.IncludesIncomplete), context.TestResults.Single(r => r.P < 1e-300), context.Reviews.Single(r => r.IsInterim), context.Exclusions.Single(x => x.IsExcluded),
            context.Families.Single(f => f.Level != null), context.ReviewFamilies.Single(f => f.IsOpen), context.OnlineSettings.Single(o => o.Horizon == 40),
            context.Streams.Single(x => x.Reason != null), context.StreamEntries.Single(e => e.KnownCount == 2), context.StandingDecisions.Single(d => d.Survives),
            context.PlanAmendments.Single(), context.PlanAmendmentChanges.Single(), context.Withdrawals.Single(w => w.IsWithdrawn), context.Originals.Single(), context.OriginalPieces.Single(),
            context.Ledger.Single(), context.LedgerChanges.Single(), context.LedgerEvidence.Single(),
        ];
        for (int i = 0; i < read.Length; i++)
        {
            IEntityType entity = context.Model.FindEntityType(read[i].GetType())!;
            Assert.Equal(HandBuilt[i].Table, entity.GetTableName());
            Assert.Equal(HandBuilt[i].Cells.Keys.Order(), entity.GetProperties().Select(p => p.GetColumnName()).Order());
            Assert.Equal(HandBuilt[i].Cells.Keys.Order(), Raw.Rows(catalog.Catalog.Connection, $"SELECT name FROM pragma_table_info('{HandBuilt[i].Table}')").Order());
            foreach (IProperty property in entity.GetProperties())
            {
                object expected = HandBuilt[i].Cells[property.GetColumnName()];
                object? actual = property.PropertyInfo!.GetValue(read[i]);
                Assert.Equal(expected, expected is long ? Convert.ToInt64(actual, CultureInfo.InvariantCulture) : actual);
            }
        }

        Assert.Equal(context.Model.GetEntityTypes().Count(), read.Length);
    }

    /// <summary>Statements are texts, so the compiler does not check them: each one in the source is prepared against an empty catalog.</summary>
    [Fact]
    public void Every_statement_in_the_source_fits_the_schema()
    {
        using var catalog = new TestCatalog();
        string source = Path.Combine(ReferenceTable.Folder(), "..", "..", "src", "Campaigns.Catalog");
        Dictionary<string, string> constants = typeof(Catalog).Assembly.GetTypes()
            .SelectMany(t => t.GetFields(BindingFlags.Static | BindingFlags.NonPublic | BindingFlags.Public).Where(f => f.IsLiteral && f.FieldType == typeof(string)).Select(f => (t.Name, Field: f)))
            .ToDictionary(f => $"{f.Name}.{f.Field.Name}", f => (string)f.Field.GetRawConstantValue()!);
        List<string> statements = [.. constants.Values.Where(v => v.StartsWith("SELECT", StringComparison.Ordinal))];
        foreach (string file in Directory.EnumerateFiles(source, "*.cs", SearchOption.AllDirectories).Where(f => !f.Contains("obj", StringComparison.Ordinal)))
        {
            string type = Path.GetFileNameWithoutExtension(file);
            statements.AddRange(Literal().Matches(File.ReadAllText(file)).Select(match => match.Groups[1].Value)
                .Where(statement => !Local().IsMatch(statement))
                .Select(statement => Hole().Replace(statement, hole => Filled(type, hole.Groups[1].Value))));
        }

        Assert.True(statements.Count > 40, FormattableString.Invariant($"{statements.Count} statements were found."));
        Assert.All(statements, statement =>
        {
            using SqliteStatement prepared = catalog.Catalog.Prepare(statement);
        });

        string Filled(string type, string name) => constants[name.Contains('.', StringComparison.Ordinal) ? name : $"{type}.{name}"];
    }

    private static void Insert(Catalog catalog, string table, Dictionary<string, object> cells)
    {
        string[] columns = [.. cells.Keys];
        using SqliteStatement insert = catalog.Prepare(
            $"INSERT INTO {table} ({string.Join(", ", columns)}) VALUES ({string.Join(", ", columns.Select((_, i) => FormattableString.Invariant($"?{i + 1}")))})");
        for (int i = 0; i < columns.Length; i++)
        {
            _ = cells[columns[i]] switch
            {
                long integer => insert.Bind(i + 1, integer),
                double real => insert.Bind(i + 1, real),
                string text => insert.Bind(i + 1, text),
                byte[] blob => insert.BindBlob(i + 1, blob),
                _ => throw new InvalidOperationException(),
            };
        }

        insert.Run();
    }

    [GeneratedRegex("Prepare\\(\\s*\\$?\"{1,3}\\s*((?:SELECT|INSERT|UPDATE|DELETE).*?)\"{1,3}\\s*\\)", RegexOptions.Singleline)]
    private static partial Regex Literal();

    /// <summary>A statement put together by a method at run time: those are run by the tests of the readers.</summary>
    [GeneratedRegex(@"\{[a-z]")]
    private static partial Regex Local();

    [GeneratedRegex(@"\{([\w.]+)\}")]
    private static partial Regex Hole();
}
