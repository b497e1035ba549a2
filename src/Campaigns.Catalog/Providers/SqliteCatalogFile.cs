using System.Buffers.Binary;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Providers;

/// <summary>The catalog as a file: recognised by its header before anything else touches it, created beside its place and moved there whole, opened with the settings that keep it one safe file.</summary>
internal static class SqliteCatalogFile
{
    /// <summary>"CAMP" in the header of every catalog.</summary>
    public const int ApplicationId = 0x43414D50;

    /// <summary>The schema that this program writes: the number of migrations.</summary>
    public const int SchemaVersion = 4;

    private const int HeaderLength = 100;
    private const byte WriteAheadLog = 2;
    private const int Utf16 = 2;

    /// <summary>One by one, because the driver loses errors that come after the first row of a text of several statements.</summary>
    private static readonly string[] Settings =
    [
        "PRAGMA busy_timeout = 5000",

        // The first question that reads the file: a locked or damaged one is told here.
        "PRAGMA schema_version",

        // The journals of single statements stay in memory; they guard nothing that outlives a crash.
        "PRAGMA temp_store = MEMORY",
        "PRAGMA foreign_keys = ON",

        // In KiB. A review of 100,000 experiments is one value of 1.7 MB: SQLite's own 2 MB would write it to the file before the commit, with a sync of the journal, and read it again for its digest.
        "PRAGMA cache_size = -8192",

        // One file that may be copied: a rollback journal, not a write-ahead log. EXTRA also syncs the folder, so an acknowledged action survives a power cut.
        "PRAGMA synchronous = EXTRA",
        "PRAGMA journal_mode = DELETE",
    ];

    private static ReadOnlySpan<byte> Signature => "SQLite format 3\0"u8;

    /// <summary>One connection is used by one thread at a time, so SQLite need not lock itself at every call.</summary>
    static SqliteCatalogFile()
    {
        SQLitePCL.Batteries_V2.Init();
        _ = SQLitePCL.raw.sqlite3_config(SQLitePCL.raw.SQLITE_CONFIG_MULTITHREAD);
    }

    /// <summary>Opens a catalog that exists and is of this program's schema; every other file is left as it is.</summary>
    /// <exception cref="CatalogException">Missing, unreadable, foreign, older, newer or damaged.</exception>
    public static SqliteConnection Open(string path, SqliteOpenMode mode = SqliteOpenMode.ReadWrite)
    {
        SqliteConnection connection = OpenAsItIs(path, mode);
        try
        {
            SchemaFingerprint.Demand(connection, path);
            return connection;
        }
        catch
        {
            connection.Dispose();
            throw;
        }
    }

    /// <summary>Opens a catalog of this program's schema by its header alone; for the proofs, which name what was changed in it.</summary>
    /// <exception cref="CatalogException">Missing, unreadable, foreign, older, newer or damaged.</exception>
    public static SqliteConnection OpenAsItIs(string path, SqliteOpenMode mode)
    {
        int version = ReadVersion(path);
        if (version > SchemaVersion)
        {
            throw new CatalogException($"The catalog '{path}' was written by a newer version of this program (schema {version}, this program knows {SchemaVersion}); use that version. The file was not touched.");
        }

        if (version < SchemaVersion)
        {
            throw new CatalogException($"The catalog '{path}' was written by an older version of this program (schema {version}, this program writes {SchemaVersion}); run 'campaigns upgrade' to bring it up to date. The file was not touched.");
        }

        return Connect(path, mode);
    }

    /// <summary>Creates an empty catalog: a complete file is made beside the place and then moved there, so that nobody ever sees half a catalog. Where somebody else was quicker, theirs stays.</summary>
    /// <exception cref="CatalogException">The folder cannot be written.</exception>
    public static void Create(string path)
    {
        if (!Directory.Exists(Path.GetDirectoryName(Path.GetFullPath(path))))
        {
            throw new CatalogException($"The catalog '{path}' cannot be created: its folder is not there. Make the folder, or name another with --catalog.");
        }

        DraftFiles.RemoveAbandoned(path);
        string draft = DraftFiles.Name(path, "new");
        try
        {
            using (var connection = new SqliteConnection(ConnectionString(draft, SqliteOpenMode.ReadWriteCreate)))
            {
                connection.Open();
                ExecuteAll(connection, $"PRAGMA page_size = 8192; PRAGMA application_id = {ApplicationId}; PRAGMA user_version = {SchemaVersion}; PRAGMA synchronous = FULL;", path);
                ExecuteAll(connection, ReadSchema(), path);
            }

            DraftFiles.Place(draft, path, overwrite: false);
        }
        catch (IOException) when (File.Exists(path))
        {
        }
        catch (SqliteException error)
        {
            throw SqliteErrors.Translate(error.SqliteExtendedErrorCode, error.Message, path, error);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new CatalogException($"The catalog '{path}' cannot be created: {FileTrouble.Reason(error, draft, path)}", error);
        }
        finally
        {
            DraftFiles.Remove(draft);
        }
    }

    /// <summary>An empty catalog in memory: what the schema of this program looks like.</summary>
    public static SqliteConnection InMemory()
    {
        var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = ":memory:", Pooling = false }.ToString());
        connection.Open();
        Execute(connection, $"PRAGMA application_id = {ApplicationId}; PRAGMA user_version = {SchemaVersion};");
        Execute(connection, ReadSchema());
        return connection;
    }

    /// <summary>Connects with the settings of every catalog, whatever its schema. A file that cannot be written is opened for reading.</summary>
    public static SqliteConnection Connect(string path, SqliteOpenMode mode = SqliteOpenMode.ReadWrite)
    {
        var connection = new SqliteConnection(ConnectionString(path, mode));
        try
        {
            connection.Open();

            foreach (string setting in Settings)
            {
                Execute(connection, setting);
            }

            return connection;
        }
        catch (SqliteException error)
        {
            connection.Dispose();
            throw SqliteErrors.Translate(error.SqliteExtendedErrorCode, error.Message, path, error);
        }
    }

    /// <summary>The schema version in the file's header.</summary>
    /// <exception cref="CatalogException">The file is missing, unreadable or no catalog.</exception>
    public static int ReadVersion(string path)
    {
        Span<byte> header = stackalloc byte[HeaderLength];
        int length;
        try
        {
            using var stream = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.ReadWrite | FileShare.Delete, 1);
            length = stream.ReadAtLeast(header, HeaderLength, throwOnEndOfStream: false);
        }
        catch (Exception error) when (error is FileNotFoundException or DirectoryNotFoundException)
        {
            throw new CatalogException($"There is no catalog '{path}'; 'campaigns start' or 'campaigns run' creates one, --catalog names another.", error);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new CatalogException($"The catalog '{path}' cannot be read: {(Directory.Exists(path) ? "it is a folder." : FileTrouble.Reason(error))}", error);
        }

        if (length < HeaderLength || !header[..Signature.Length].SequenceEqual(Signature)
            || BinaryPrimitives.ReadInt32BigEndian(header[68..]) != ApplicationId)
        {
            throw new CatalogException($"The file '{path}' is no catalog of this program; it was not touched.");
        }

        if (header[18] == WriteAheadLog)
        {
            throw new CatalogException($"The catalog '{path}' was switched to a write-ahead log by another program, so that its file alone may not be all of it; switch it back there (PRAGMA journal_mode = DELETE) and close that program. The file was not touched.");
        }

        if (BinaryPrimitives.ReadInt32BigEndian(header[56..]) >= Utf16)
        {
            throw new CatalogException($"The catalog '{path}' was made anew by another program, with its texts in another encoding than UTF-8; restore it from a backup. The file was not touched.");
        }

        int version = BinaryPrimitives.ReadInt32BigEndian(header[60..]);
        return version >= 0 ? version : throw new CatalogException($"The file '{path}' is no catalog of this program: it says that it is of schema {version}. It was not touched.");
    }

    /// <summary>Runs a text of many statements and stops at the first that fails, which the driver may pass over: on a full disk half a schema would look like a whole one.</summary>
    private static void ExecuteAll(SqliteConnection connection, string sql, string path)
    {
        int code = SQLitePCL.raw.sqlite3_exec(connection.Handle, sql, out string detail);
        if (code != SQLitePCL.raw.SQLITE_OK)
        {
            throw SqliteErrors.Translate(SQLitePCL.raw.sqlite3_extended_errcode(connection.Handle), detail ?? "", path);
        }
    }

    /// <summary>Runs a fixed text of one or more statements.</summary>
    public static void Execute(SqliteConnection connection, string sql)
    {
        using SqliteCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Fixed texts of this program alone; no value from outside ever stands in a statement.
        command.CommandText = sql;
#pragma warning restore CA2100
        command.ExecuteNonQuery();
    }

    /// <summary>SQLite itself waits for a lock as long as busy_timeout says; the time-out of the driver, which would try again until it is over, is shorter, so that nobody waits twice.</summary>
    private static string ConnectionString(string path, SqliteOpenMode mode) =>
        new SqliteConnectionStringBuilder { DataSource = path, Mode = mode, Pooling = false, DefaultTimeout = 1 }.ToString();

    private static string ReadSchema()
    {
        using Stream stream = typeof(SqliteCatalogFile).Assembly.GetManifestResourceStream("Campaigns.Catalog.Providers.Schema.sql")!;
        using var reader = new StreamReader(stream);
        return reader.ReadToEnd();
    }
}
