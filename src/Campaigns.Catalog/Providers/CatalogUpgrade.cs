using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore;

namespace Campaigns.Catalog.Providers;

/// <summary>Brings a catalog of an older schema up to date: a copy is migrated, checked, and put in the place of the old file in one step, so that at every moment there is a whole catalog, the old one or the new one.</summary>
/// <remarks>Migrations never run on the live file: killed in the middle, they leave a lock behind for which every later start would wait for ever.</remarks>
public static class CatalogUpgrade
{
    /// <summary>Upgrades a catalog.</summary>
    /// <param name="path">The file.</param>
    /// <param name="migrationsAssembly">Name of the assembly that holds the migrations.</param>
    /// <param name="clock">Where instants come from.</param>
    /// <param name="actor">Who acts; null for the account of the process.</param>
    /// <returns>Whether there was anything to do.</returns>
    /// <exception cref="CatalogException">The file is no catalog, is newer than this program, is in use, or the copy did not pass its checks; the old file stands.</exception>
    public static bool Run(string path, string migrationsAssembly, TimeProvider clock, Actor? actor = null)
    {
        int version = SqliteCatalogFile.ReadVersion(path);
        if (version == SqliteCatalogFile.SchemaVersion)
        {
            return false;
        }

        if (version > SqliteCatalogFile.SchemaVersion)
        {
            throw new CatalogException($"The catalog '{path}' was written by a newer version of this program; use that version. The file was not touched.");
        }

        string copy = $"{path}.upgrade-{Environment.ProcessId}";
        try
        {
            using SqliteConnection old = SqliteCatalogFile.Connect(path);

            // Held to the end, so that nobody writes between the copy and the exchange of the files.
            SqliteCatalogFile.Execute(old, "BEGIN IMMEDIATE");
            CopyTo(path, copy);
            Migrate(copy, migrationsAssembly);
            Record(copy, version, clock, actor);
            File.Move(copy, path, overwrite: true);
            return true;
        }
        catch (SqliteException error)
        {
            throw SqliteErrors.Translate(error.SqliteExtendedErrorCode, error.Message, path, error);
        }
        finally
        {
            File.Delete(copy);
            File.Delete(copy + "-journal");
        }
    }

    private static void CopyTo(string path, string copy)
    {
        File.Delete(copy);
        using SqliteConnection reader = SqliteCatalogFile.Connect(path);
        using SqliteCommand vacuum = reader.CreateCommand();
        vacuum.CommandText = "VACUUM INTO $copy";
        vacuum.Parameters.AddWithValue("$copy", copy);
        vacuum.ExecuteNonQuery();
    }

    private static void Migrate(string copy, string migrationsAssembly)
    {
        using SqliteConnection connection = SqliteCatalogFile.Connect(copy);
        using (CatalogContext context = CatalogContext.On(connection, migrationsAssembly))
        {
            context.Database.Migrate();
        }

        SqliteCatalogFile.Execute(connection, $"DROP TABLE IF EXISTS \"__EFMigrationsLock\"; PRAGMA user_version = {SqliteCatalogFile.SchemaVersion};");
        Demand(connection, "PRAGMA journal_mode = DELETE", answer: "delete", copy);
        Demand(connection, "PRAGMA integrity_check", answer: "ok", copy);
        Demand(connection, "PRAGMA foreign_key_check", answer: null, copy);
    }

    /// <summary>Everything that the catalog holds is spoken for from here on; a catalog from before the ledger begins its chain with this entry.</summary>
    private static void Record(string copy, int version, TimeProvider clock, Actor? actor)
    {
        using Catalog catalog = Catalog.Open(copy, clock, actor);
        catalog.Change(() => catalog.Record(new LedgerAct(LedgerAction.Upgrade, null)
        {
            Changes = [new LedgerChange("schema", FormattableString.Invariant($"{version}"), FormattableString.Invariant($"{SqliteCatalogFile.SchemaVersion}"))],
            Evidence = EvidenceRegistry.Everything(catalog),
        }));
    }

    private static void Demand(SqliteConnection connection, string pragma, string? answer, string copy)
    {
        using SqliteCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Two fixed texts of this class.
        command.CommandText = pragma;
#pragma warning restore CA2100
        if (command.ExecuteScalar() as string != answer)
        {
            throw new CatalogException($"The upgraded copy '{copy}' did not pass its checks; the catalog itself was not touched.");
        }
    }
}
