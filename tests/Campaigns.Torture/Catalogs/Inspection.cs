using System.Security.Cryptography;
using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>Looks into a catalog's file after it was hurt: by the program's own check, and past it by plain SQL.</summary>
internal static class Inspection
{
    /// <summary>Opens a catalog as any command does, closes it, and checks the file from one end to the other.</summary>
    /// <returns>What is wrong; null where all is well.</returns>
    public static string? Fault(string catalog)
    {
        Campaigns.Catalog.Catalog.Open(catalog, TimeProvider.System).Dispose();
        if (CatalogCheck.Run(catalog, null, TimeProvider.System, CancellationToken.None).Faults is [var first, ..])
        {
            return first;
        }

        using SqliteConnection connection = Open(catalog);
        string[] integrity = Texts(connection, "PRAGMA integrity_check"), dangling = Texts(connection, "PRAGMA foreign_key_check");
        return integrity is not ["ok"] ? integrity[0]
            : dangling.Length > 0 ? $"dangling: {dangling[0]}"
            : Texts(connection, "SELECT 'load ' || l.id FROM loads l WHERE l.row_count <> l.missing_count + coalesce((SELECT sum(m.value_count) FROM measurements m WHERE m.load_id = l.id), 0)") is [var partial, ..] ? $"half a file: {partial}"
            : Number(connection, "SELECT coalesce(max(sequence), 0) - count(*) FROM ledger") != 0 ? "the sequence has gaps"

            // What came before an upgrade has no entries of its own.
            : Number(connection, "SELECT count(*) FROM ledger WHERE action = 'upgrade'") > 0 ? null
            : Number(connection, "SELECT count(*) FROM ledger WHERE action = 'start'") != Number(connection, "SELECT count(*) FROM campaigns") ? "campaigns and their entries differ in number"
            : Number(connection, "SELECT count(*) FROM ledger WHERE action = 'load'") != Number(connection, "SELECT count(*) FROM loads") ? "loads and their entries differ in number"
            : null;
    }

    /// <summary>Acknowledged campaigns, or files, that the catalog does not hold.</summary>
    public static string? Missing(string catalog, string sql, IEnumerable<string> acknowledged)
    {
        using SqliteConnection connection = Open(catalog);
        string[] missing = [.. acknowledged.Except(Texts(connection, sql), StringComparer.Ordinal)];
        return missing.Length == 0 ? null : FormattableString.Invariant($"{missing.Length} acknowledged are not there, the first is {missing[0]}");
    }

    /// <summary>First column of every row.</summary>
    public static string[] Texts(SqliteConnection connection, string sql)
    {
        using SqliteCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Texts of these tests.
        command.CommandText = sql;
#pragma warning restore CA2100
        using SqliteDataReader reader = command.ExecuteReader();
        var texts = new List<string>();
        while (reader.Read())
        {
            texts.Add(reader.IsDBNull(0) ? "" : reader.GetString(0));
        }

        return [.. texts];
    }

    public static long Number(SqliteConnection connection, string sql) => long.Parse(Texts(connection, sql)[0], System.Globalization.NumberStyles.AllowLeadingSign, System.Globalization.CultureInfo.InvariantCulture);

    public static SqliteConnection Open(string path)
    {
        var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = path, Pooling = false }.ToString());
        connection.Open();
        return connection;
    }

    public static void Execute(string path, string sql)
    {
        using SqliteConnection connection = Open(path);
        Texts(connection, sql);
    }

    public static string Hash(string path) => Convert.ToHexString(SHA256.HashData(File.ReadAllBytes(path)));

    /// <summary>Names of the files of a folder, sorted.</summary>
    public static string[] Files(string folder) => [.. Directory.EnumerateFileSystemEntries(folder).Select(f => Path.GetFileName(f)).Order(StringComparer.Ordinal)];
}
