using static SQLitePCL.raw;

namespace Campaigns.Catalog.Providers;

/// <summary>Turns SQLite's result codes into sentences.</summary>
internal static class SqliteErrors
{
    /// <summary>The exception for a failed call on a catalog.</summary>
    /// <param name="code">SQLite's result code, extended or not.</param>
    /// <param name="detail">SQLite's own words.</param>
    /// <param name="path">The catalog's file.</param>
    /// <param name="inner">The error beneath; null where there is none.</param>
    public static Exception Translate(int code, string detail, string path, Exception? inner = null) => (code & 0xff) switch
    {
        SQLITE_BUSY or SQLITE_LOCKED => new CatalogException($"The catalog '{path}' is locked by another program{LockHolder.Describe(path)}; wait until that one is done, or close it, and try again.", inner),
        SQLITE_READONLY or SQLITE_CANTOPEN or SQLITE_PERM or SQLITE_IOERR when WaitsForRollback(path) =>
            new CatalogException($"An action that was interrupted waits to be rolled back in the catalog '{path}', which needs write access to the file, its folder and '{System.IO.Path.GetFileName(path)}-journal': run any command with that access, and do not remove the journal.", inner),
        SQLITE_READONLY => new CatalogException($"The catalog '{path}' cannot be written: the file or its folder is read-only for you. Nothing was changed; ask whoever keeps it for the right to write to both, or work on a copy of your own.", inner),
        SQLITE_FULL => new CatalogException($"The disk that holds the catalog '{path}' is full; nothing was changed. Make room and try again.", inner),
        SQLITE_CORRUPT or SQLITE_NOTADB => new CatalogException($"The catalog '{path}' is damaged ({detail}); restore it from a copy.", inner),
        SQLITE_CANTOPEN or SQLITE_PERM => new CatalogException($"The catalog '{path}' or its journal cannot be opened: check that you may read and write the file and its folder, or work on a copy of your own.", inner),
        SQLITE_IOERR => new CatalogException($"Reading or writing the catalog '{path}' failed ({detail}); check the disk. Nothing was changed.", inner),
        SQLITE_NOMEM => new CatalogException($"There is not enough memory left to work on the catalog '{path}'; nothing was changed. Close other programs and try again.", inner),
        SQLITE_INTERRUPT => new OperationCanceledException("The statement was stopped.", inner),
        _ => new InvalidOperationException($"SQLite refused a statement of the program (code {code}: {detail}).", inner),
    };

    /// <summary>Whether a killed program left a journal that SQLite has to roll back. By SQLite's own rule one that is empty, or begins with zero, was never used, and goes away with the next change.</summary>
    public static bool WaitsForRollback(string path)
    {
        try
        {
            using var journal = new FileStream(path + "-journal", FileMode.Open, FileAccess.Read, FileShare.ReadWrite | FileShare.Delete, 1);
            return journal.ReadByte() > 0;
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            return error is UnauthorizedAccessException;
        }
    }
}
