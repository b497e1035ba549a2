using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore;

namespace Campaigns.Catalog.Providers;

/// <summary>Brings a catalog of an older schema up to date: a copy is migrated, checked, and put in the place of the old file in one step, so that at every moment there is a whole catalog, the old one or the new one.</summary>
/// <remarks>Migrations never run on the live file: killed in the middle, they leave a lock behind for which every later start would wait for ever.</remarks>
public static class CatalogUpgrade
{
    private const string Purpose = "upgrade";

    /// <summary>Upgrades a catalog.</summary>
    /// <param name="path">The file.</param>
    /// <param name="migrationsAssembly">Name of the assembly that holds the migrations.</param>
    /// <param name="clock">Where instants come from.</param>
    /// <param name="actor">Who acts; null for the account of the process.</param>
    /// <param name="keep">A file that does not exist yet, in which the catalog is kept as it was; null to keep none.</param>
    /// <param name="stop">The wish to stop; heeded until the files are exchanged.</param>
    /// <returns>Whether there was anything to do.</returns>
    /// <exception cref="CatalogException">The file is no catalog, is newer than this program, is in use, or the copy did not pass its checks; the old file stands.</exception>
    /// <exception cref="Campaigns.Domain.RefusedException">The file to keep exists or cannot be written; the old file stands.</exception>
    public static bool Run(string path, string migrationsAssembly, TimeProvider clock, Actor? actor = null, string? keep = null, CancellationToken stop = default)
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

        // A link stays a link: what it points to is exchanged.
        string place = File.ResolveLinkTarget(path, returnFinalTarget: true)?.FullName ?? path;
        string? copy = null;
        try
        {
            using SqliteConnection old = SqliteCatalogFile.Connect(place);

            // Held to the end, so that nobody writes between the copy and the exchange of the files.
            WriteLock.Begin(old, path, stop);
            DraftFiles.RemoveAbandoned(place, held: Purpose);
            using (SqliteConnection reader = SqliteCatalogFile.Connect(place))
            {
                // Whoever held the lock before may have exchanged the file: then the lock at hand is one on a file that nobody sees any more.
                if (Version(reader) != version)
                {
                    return Run(path, migrationsAssembly, clock, actor, keep, stop);
                }

                using CancellationTokenRegistration interrupt = stop.Register(() => SQLitePCL.raw.sqlite3_interrupt(reader.Handle));
                if (keep is not null)
                {
                    BackupWriter.Write(reader, path, keep, replace: false);
                }

                copy = DraftFiles.Name(place, Purpose);
                BackupWriter.CopyTo(reader, copy);
            }

            stop.ThrowIfCancellationRequested();
            Migrate(copy, migrationsAssembly);
            Record(copy, version, clock, actor);
            KeepPermissions(place, copy);
            stop.ThrowIfCancellationRequested();
            DraftFiles.Place(copy, place, overwrite: true);
            return true;
        }
        catch (SqliteException error)
        {
            throw SqliteErrors.Translate(error.SqliteExtendedErrorCode, error.Message, path, error);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new CatalogException($"The catalog '{path}' was not upgraded, and is as it was: {FileTrouble.Reason(error, copy, path)}", error);
        }
        finally
        {
            if (copy is not null)
            {
                DraftFiles.Remove(copy);
            }
        }
    }

    /// <summary>Through the connection, not through a file of its own: closing any other handle on a file would give up this process's locks on it.</summary>
    private static int Version(SqliteConnection connection)
    {
        using var version = new SqliteStatement(connection, "PRAGMA user_version");
        return version.Read() ? (int)version.Integer(0) : 0;
    }

    private static void KeepPermissions(string place, string copy)
    {
        if (!OperatingSystem.IsWindows())
        {
            File.SetUnixFileMode(copy, File.GetUnixFileMode(place));
        }
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
            throw new CatalogException($"The upgraded copy of the catalog did not pass its checks ({pragma} of '{copy}'); the catalog itself was not touched.");
        }
    }
}
