using System.Globalization;
using System.Text;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>A catalog with a life of its own: campaigns opened, planned, sealed, loaded, tested, reviewed, judged as they arrive, values left out and taken in again.</summary>
internal static class RecordedLife
{
    private const int Experiments = 6;
    private const int ValuesOfAnExperiment = 8;

    /// <summary>Lives until the ledger holds so many entries.</summary>
    /// <param name="bench">Where.</param>
    /// <param name="entries">Entries of the ledger in the end, at least 12; the tail of it are decisions about observations.</param>
    /// <param name="afterEach">Called after every action of the tail.</param>
    public static void Live(Workbench bench, int entries, Action? afterEach = null)
    {
        Well(bench.Run("start", "A", "--title", "Primers, älter", "--as", "Ada"));
        Well(bench.Run("plan", "A", bench.Write("plan.csv", Plan())));
        Well(bench.Run("seal", "A"));
        Well(bench.Run("load", "A", bench.Write("a.csv", Measurements())));
        Well(bench.Run("test", "A", "--as", "Ada"));
        Well(bench.Run("review", "A"));
        Well(bench.Run("start", "B", "--correction", "lord"));
        Well(bench.Run("plan", "B", bench.At("plan.csv")));
        Well(bench.Run("seal", "B"));
        Well(bench.Run("register", "B", "E1", "E2"));
        Well(bench.Run("load", "B", bench.At("a.csv")));
        Well(bench.Run("test", "B"));
        for (int i = (int)Head(bench).Sequence; i < entries; i++)
        {
            Decide(bench, i);
            afterEach?.Invoke();
        }
    }

    /// <summary>One more decision: a value left out, or taken in again.</summary>
    public static void Decide(Workbench bench, int number)
    {
        int place = number / 2 % (Experiments * ValuesOfAnExperiment);
        string experiment = Text($"E{(place / ValuesOfAnExperiment) + 1}"), line = Text($"{place + 2}");
        Ran ran = bench.Run("exclude", "A", experiment, "--line", line, "--reason", Text($"reason {number}"), "--as", Text($"person {number % 7}"));
        if (ran.Code == 3)
        {
            ran = bench.Run("exclude", "A", experiment, "--line", line, "--take-back", "--reason", Text($"reason {number}"));
        }

        Well(ran);
    }

    /// <summary>The head of the ledger, read past the program.</summary>
    public static LedgerHead Head(Workbench bench)
    {
        using SqliteConnection connection = Open(bench.Catalog, SqliteOpenMode.ReadOnly);
        using SqliteCommand command = connection.CreateCommand();
        command.CommandText = "SELECT sequence || ':' || hash FROM ledger ORDER BY sequence DESC LIMIT 1";
        return LedgerHead.TryParse((string)command.ExecuteScalar()!, out LedgerHead head) ? head : throw new InvalidOperationException("The ledger has no head.");
    }

    public static SqliteConnection Open(string path, SqliteOpenMode mode)
    {
        var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = path, Mode = mode, Pooling = false }.ToString());
        connection.Open();
        return connection;
    }

    /// <summary>A copy of a catalog in memory, without its triggers and its other guards, so that anything may be written into it.</summary>
    public static SqliteConnection Unguarded(string path)
    {
        var memory = new SqliteConnection("Data Source=:memory:");
        memory.Open();
        using (SqliteConnection file = Open(path, SqliteOpenMode.ReadOnly))
        {
            file.BackupDatabase(memory);
        }

        SqliteCatalogFile.Execute(memory, "PRAGMA foreign_keys = OFF; PRAGMA ignore_check_constraints = ON;");
        foreach (string trigger in Strings(memory, "SELECT name FROM sqlite_schema WHERE type = 'trigger'"))
        {
            SqliteCatalogFile.Execute(memory, $"DROP TRIGGER {trigger}");
        }

        return memory;
    }

    /// <summary>The first column of every row, as text.</summary>
    public static List<string> Strings(SqliteConnection connection, string sql)
    {
        using SqliteCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Texts of these tests.
        command.CommandText = sql;
#pragma warning restore CA2100
        using SqliteDataReader rows = command.ExecuteReader();
        var texts = new List<string>();
        while (rows.Read())
        {
            texts.Add(rows.IsDBNull(0) ? "" : rows.GetString(0));
        }

        return texts;
    }

    public static string Text(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);

    private static void Well(Ran ran)
    {
        if (ran.Code != 0)
        {
            throw new InvalidOperationException($"exit {ran.Code}: {ran.Error}");
        }
    }

    private static string Plan()
    {
        var plan = new StringBuilder("experiment,groups\n");
        for (int i = 1; i <= Experiments; i++)
        {
            plan.Append(CultureInfo.InvariantCulture, $"E{i},a|b\n");
        }

        return plan.ToString();
    }

    private static string Measurements()
    {
        var rows = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < Experiments * ValuesOfAnExperiment; i++)
        {
            int experiment = (i / ValuesOfAnExperiment) + 1;
            rows.Append(CultureInfo.InvariantCulture, $"E{experiment},{(i % 2 == 0 ? 'a' : 'b')},{10 + (i % 2 * experiment) + (i * 7 % 5)}\n");
        }

        return rows.ToString();
    }
}
