using Campaigns.Catalog.Ledger;
using Campaigns.Domain;
using Microsoft.Data.Sqlite;
using SQLitePCL;
using static SQLitePCL.raw;

namespace Campaigns.Catalog.Providers;

/// <summary>What a backup became.</summary>
/// <param name="Bytes">Its size.</param>
/// <param name="Head">The end of its ledger.</param>
public sealed record BackupSummary(long Bytes, LedgerHead Head);

/// <summary>Makes a consistent copy of a catalog that is in use.</summary>
/// <remarks>
/// By VACUUM INTO: one reading transaction sees the catalog as it stands at one moment, whatever others write meanwhile, and every row is read through its tables, so that a damaged page ends the copy with an error.
/// A copy of pages (SQLite's backup interface) would carry such a page over unseen, and begins anew whenever somebody writes. The catalog is only read: a backup is no change, and has no entry in the ledger.
/// </remarks>
public static class BackupWriter
{
    /// <summary>Milliseconds between looks at a file that is busy.</summary>
    private const int BetweenAttempts = 2;

    private const string Purpose = "backup";

    /// <summary>Writes a backup: beside its place first, then moved there whole.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="target">The file to write.</param>
    /// <param name="replace">Whether it may take the place of a file that is there.</param>
    /// <exception cref="RefusedException">The target exists or cannot be written; nothing was left behind.</exception>
    /// <exception cref="CatalogException">The catalog is locked or damaged; nothing was left behind.</exception>
    public static BackupSummary Write(Catalog catalog, string target, bool replace)
    {
        ArgumentNullException.ThrowIfNull(catalog);
        catalog.ThrowIfStopped();
        Write(catalog.Connection, catalog.Path, target, replace);
        using Catalog copy = Catalog.OpenReadOnly(target, catalog.Clock);
        return new BackupSummary(new FileInfo(target).Length, new LedgerReader(copy).Head);
    }

    internal static void Write(SqliteConnection connection, string path, string target, bool replace)
    {
        Refuse(path, target, replace);
        DraftFiles.RemoveAbandoned(target);
        string draft = DraftFiles.Name(target, Purpose);
        try
        {
            CopyBetweenWrites(connection, draft);
            DraftFiles.Place(draft, target, replace);
        }
        catch (SqliteException error) when (error.SqliteErrorCode is SQLITE_FULL or SQLITE_CANTOPEN or SQLITE_READONLY or SQLITE_IOERR)
        {
            string reason = error.SqliteErrorCode == SQLITE_FULL ? "the disk is full; make room and try again" : "check the disk, and that you may write to its folder";
            throw new RefusedException($"The copy '{target}' could not be written: {reason}. Nothing of it was left behind.");
        }
        catch (SqliteException error)
        {
            throw SqliteErrors.Translate(error.SqliteExtendedErrorCode, error.Message, path, error);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new RefusedException($"The copy '{target}' could not be written: {FileTrouble.Reason(error, draft, target)} Nothing of it was left behind.");
        }
        finally
        {
            DraftFiles.Remove(draft);
        }
    }

    /// <summary>Copies as soon as a program that commits again and again pauses; asked every few milliseconds, the pause is found (see <see cref="WriteLock"/>).</summary>
    private static void CopyBetweenWrites(SqliteConnection connection, string copy)
    {
        long start = Environment.TickCount64;
        _ = sqlite3_busy_timeout(connection.Handle, 0);
        try
        {
            while (!TryCopy(connection, copy, mayWait: Environment.TickCount64 - start < WriteLock.Patience))
            {
                File.Delete(copy);
                Thread.Sleep(BetweenAttempts);
            }
        }
        finally
        {
            _ = sqlite3_busy_timeout(connection.Handle, WriteLock.Patience);
        }
    }

    /// <summary>Copies, or finds the file busy; every other trouble is thrown.</summary>
    private static bool TryCopy(SqliteConnection connection, string copy, bool mayWait)
    {
        int code = sqlite3_prepare_v2(connection.Handle, "VACUUM INTO ?1", out sqlite3_stmt statement);
        using (statement)
        {
            code = code == SQLITE_OK ? sqlite3_bind_text(statement, 1, copy) : code;
            code = code == SQLITE_OK ? sqlite3_step(statement) : code;
            if (code != SQLITE_DONE && !((code & 0xff) == SQLITE_BUSY && mayWait))
            {
                throw new SqliteException(sqlite3_errmsg(connection.Handle).utf8_to_string() ?? "", code & 0xff, sqlite3_extended_errcode(connection.Handle));
            }

            return code == SQLITE_DONE;
        }
    }

    /// <summary>Copies what a connection sees into a file that does not exist, in one reading transaction.</summary>
    internal static void CopyTo(SqliteConnection connection, string copy)
    {
        using SqliteCommand vacuum = connection.CreateCommand();
        vacuum.CommandText = "VACUUM INTO $copy";
        vacuum.Parameters.AddWithValue("$copy", copy);
        vacuum.ExecuteNonQuery();
    }

    private static void Refuse(string path, string target, bool replace)
    {
        if (Directory.Exists(target))
        {
            throw new RefusedException($"'{target}' is a folder; name a file for the copy.");
        }

        if (!Directory.Exists(Path.GetDirectoryName(Path.GetFullPath(target))))
        {
            throw new RefusedException($"The copy '{target}' cannot be written: its folder is not there. Make the folder, or name another.");
        }

        if (RealPath(target) == RealPath(path))
        {
            throw new RefusedException($"'{target}' is the catalog itself; name another file for the copy.");
        }

        if (File.Exists(target) && !replace)
        {
            throw new RefusedException($"'{target}' exists; nothing was written. Name another file; 'campaigns backup --replace' writes over an older copy.");
        }

        // SQLite would take it for a journal of the new file, and roll it back into that.
        if (File.Exists(target + "-journal"))
        {
            throw new RefusedException($"Beside '{target}' stands '{Path.GetFileName(target)}-journal', so that a program is at work there or was interrupted; name another file for the copy.");
        }
    }

    private static string RealPath(string path)
    {
        string full = Path.GetFullPath(path);
        return File.Exists(full) ? File.ResolveLinkTarget(full, returnFinalTarget: true)?.FullName ?? full : full;
    }
}
