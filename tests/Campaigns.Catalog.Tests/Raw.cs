using System.Globalization;
using System.Text;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests;

/// <summary>SQL from outside the program, as somebody with a database tool would send it.</summary>
internal static class Raw
{
    public static SqliteConnection Open(string path)
    {
        var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = path, Pooling = false }.ToString());
        connection.Open();
        return connection;
    }

    public static void Execute(string path, string sql)
    {
        using SqliteConnection connection = Open(path);
        Execute(connection, sql);
    }

    public static void Execute(SqliteConnection connection, string sql)
    {
        using SqliteCommand command = Command(connection, sql);
        command.ExecuteNonQuery();
    }

    public static long Integer(SqliteConnection connection, string sql)
    {
        using SqliteCommand command = Command(connection, sql);
        return Convert.ToInt64(command.ExecuteScalar(), CultureInfo.InvariantCulture);
    }

    public static List<string> Rows(SqliteConnection connection, string sql)
    {
        using SqliteCommand command = Command(connection, sql);
        using SqliteDataReader reader = command.ExecuteReader();
        var rows = new List<string>();
        while (reader.Read())
        {
            rows.Add(string.Join('|', Enumerable.Range(0, reader.FieldCount).Select(i => Text(reader.GetValue(i)))));
        }

        return rows;
    }

    /// <summary>Every row of every table, so that "nothing was changed" can be asserted literally.</summary>
    public static string Dump(SqliteConnection connection)
    {
        var dump = new StringBuilder();
        foreach (string table in Rows(connection, "SELECT name FROM sqlite_master WHERE type = 'table' ORDER BY name"))
        {
            dump.AppendLine(table);
            foreach (string row in Rows(connection, $"SELECT * FROM \"{table}\""))
            {
                dump.AppendLine(row);
            }
        }

        return dump.ToString();
    }

    public static SqliteCommand Command(SqliteConnection connection, string sql)
    {
        SqliteCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Texts of the tests.
        command.CommandText = sql;
#pragma warning restore CA2100
        return command;
    }

    private static string Text(object value) => value switch
    {
        byte[] bytes => Convert.ToHexStringLower(bytes),
        double number => number.ToString("R", CultureInfo.InvariantCulture),
        DBNull => "NULL",
        _ => Convert.ToString(value, CultureInfo.InvariantCulture)!,
    };
}
