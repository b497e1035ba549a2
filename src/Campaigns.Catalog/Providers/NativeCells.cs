using System.Runtime.InteropServices;

namespace Campaigns.Catalog.Providers;

/// <summary>The cells of a row straight from SQLite's library, for what reads every cell of a catalog.</summary>
/// <remarks>
/// The driver guards its handle at every call, which costs several times what the call does. Here the handle is kept alive by whoever holds the statement,
/// and the calls, which only look into a row that was already read, do not tell the garbage collector of themselves.
/// </remarks>
internal static class NativeCells
{
    // The library that the driver's own provider loads.
    private const string Library = "e_sqlite3";

    [DllImport(Library, EntryPoint = "sqlite3_column_type")]
    [SuppressGCTransition]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static extern int Type(nint statement, int column);

    [DllImport(Library, EntryPoint = "sqlite3_column_int64")]
    [SuppressGCTransition]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static extern long Integer(nint statement, int column);

    [DllImport(Library, EntryPoint = "sqlite3_column_double")]
    [SuppressGCTransition]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static extern double Real(nint statement, int column);

    /// <summary>Where the bytes of a text or a blob stand; until the next call on the statement that moves it.</summary>
    [DllImport(Library, EntryPoint = "sqlite3_column_blob")]
    [SuppressGCTransition]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static extern nint Bytes(nint statement, int column);

    /// <summary>How many they are; asked after <see cref="Bytes"/>.</summary>
    [DllImport(Library, EntryPoint = "sqlite3_column_bytes")]
    [SuppressGCTransition]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static extern int ByteCount(nint statement, int column);
}
