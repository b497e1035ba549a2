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
        SQLITE_BUSY or SQLITE_LOCKED => new CatalogException($"The catalog '{path}' is locked by another program; wait until that one is done, or close it, and try again.", inner),
        SQLITE_READONLY => new CatalogException($"The catalog '{path}' cannot be written: the file or its folder is read-only for you.", inner),
        SQLITE_FULL => new CatalogException($"The disk that holds the catalog '{path}' is full; nothing was changed. Make room and try again.", inner),
        SQLITE_CORRUPT or SQLITE_NOTADB => new CatalogException($"The catalog '{path}' is damaged ({detail}); restore it from a copy.", inner),
        SQLITE_CANTOPEN or SQLITE_PERM => new CatalogException($"The catalog '{path}' or its journal cannot be opened: check that you may read and write the file and its folder.", inner),
        SQLITE_IOERR => new CatalogException($"Reading or writing the catalog '{path}' failed ({detail}); check the disk. Nothing was changed.", inner),
        _ => new InvalidOperationException($"SQLite refused a statement of the program (code {code}: {detail}).", inner),
    };
}
