using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.Torture.Catalogs;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Outgoing;

/// <summary>T22: whatever control character stands in a catalog, a file or what was typed, a terminal is shown its code and never sent the character.</summary>
internal sealed class TerminalEscapes : TortureTest
{
    private static readonly string[][] Commands =
    [
        ["list"], ["show", "C"], ["show", "C", "E"], ["results", "C"], ["survivors", "C"], ["comparisons", "C"], ["corrections", "C"], ["corrections", "C", "--by-experiment"], ["risk", "C"], ["risk"], ["families", "C"],
        ["overall", "C"], ["results", "C", "--format", "csv"], ["results", "C", "--format", "json"], ["list", "--format", "csv"], ["ledger"], ["reviews", "C"], ["history", "C"],
    ];

    public override string Key => "T22";

    public override string What => "terminal escapes in names";

    public override int Full => 65;

    public override int Short => 13;

    public override void Run(Tally tally, int tries, Random random)
    {
        // Fewer tries than controls are spread over all of them.
        char[] controls = [.. HostileNames.Controls()];
        for (int i = 0; i < tries; i++)
        {
            char control = controls[i * controls.Length / tries % controls.Length];
            string text = $"a{control}[31mb";
            tally.Try(FormattableString.Invariant($"U+{(int)control:X4}"), () => FromTheCatalog(text) ?? FromFiles(text) ?? FromTheCommandLine(text) ?? FromTheScreen(text));
        }
    }

    /// <summary>Texts that somebody wrote into the catalog by other means.</summary>
    private static string? FromTheCatalog(string text)
    {
        using var bench = new Workbench();
        bench.Run("start", "C", "--correction", "none");
        bench.Run("plan", "C", bench.Write("p.csv", "experiment,title,response,unit,groups,test,follow_up\nE,t,r,u,A|B|D,f,tukey-kramer\n"));
        bench.Run("seal", "C");
        bench.Run("load", "C", bench.Write("m.csv", "experiment,group,value\nE,A,1\nE,A,2\nE,B,7\nE,B,8\nE,D,3\nE,D,4\n"));
        bench.Run("test", "C");
        bench.Run("review", "C");
        Plant(bench, text);
        foreach (string[] command in Commands)
        {
            using StringWriter shown = new() { NewLine = "\n" }, said = new() { NewLine = "\n" };
            int code = CommandLine.Run(command, new Host
            {
                Out = shown,
                Error = said,
                Clock = bench.Clock,
                OutIsTerminal = true,
                ErrorIsTerminal = true,
                Width = 200,
                Variable = name => name switch { "CAMPAIGNS_CATALOG" => bench.Catalog, "NO_COLOR" => "1", _ => null },
            });
            if ((Sent(shown.ToString()) ?? Sent(said.ToString())) is { } sent)
            {
                return $"'{string.Join(' ', command)}' sent {sent}";
            }

            if (code == ExitCode.OurFault)
            {
                return $"'{string.Join(' ', command)}' failed: {said}";
            }
        }

        return null;
    }

    private static void Plant(Workbench bench, string text)
    {
        using var connection = new SqliteConnection($"Data Source={bench.Catalog};Pooling=False");
        connection.Open();
        foreach (string trigger in Strings(connection, "SELECT name FROM sqlite_schema WHERE type = 'trigger'"))
        {
            Execute(connection, $"DROP TRIGGER {trigger}", text);
        }

        Execute(connection, "UPDATE campaigns SET title = $t, purpose = $t", text);
        Execute(connection, "UPDATE experiments SET title = $t, response = $t, unit = $t, control = $t", text);
        Execute(connection, "UPDATE groups SET label = label || $t", text);
        Execute(connection, "UPDATE loads SET file_name = $t", text);
        Execute(connection, "UPDATE ledger SET subject = $t, reason = $t, acting_as = $t, account = $t", text);
        Execute(connection, "UPDATE reviews SET program_version = $t", text);
    }

    /// <summary>Texts in files, and in the names of files.</summary>
    private static string? FromFiles(string text)
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        string name = text.Replace("\0", "", StringComparison.Ordinal);
        string path = bench.Write(name, $"experiment,group,{text},value\n{text},A,x,1\nE,{text},y,{text}\n");
        return Sent(bench.Run("load", "C", path)) ?? Sent(bench.Run("plan", "C", path)) ?? Sent(bench.Run("adjust", path)) ?? Sent(bench.Run("run", path));
    }

    private static string? FromTheCommandLine(string text)
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        return Sent(bench.Run("start", "D", "--title", text)) ?? Sent(bench.Run("show", text)) ?? Sent(bench.Run("show", "C", text)) ?? Sent(bench.Run(text)) ?? Sent(bench.Run("list", "--" + text))
            ?? Sent(bench.Run("list", "--catalog", text)) ?? Sent(bench.Run("load", "C", text)) ?? Sent(bench.Run("list", "--format", text)) ?? Sent(bench.Run("load", "C", "m.csv", "--columns", text)) ?? Sent(bench.Run("start", "E", "--as", text));
    }

    /// <summary>The cells of the dashboard: every text that it paints goes through them.</summary>
    private static string? FromTheScreen(string text)
    {
        var canvas = new TextCanvas(60, 1);
        canvas.Write(0, 0, text);
        return Sent(string.Concat(Enumerable.Range(0, canvas.Width).Select(x => canvas.SignAt(x, 0)))) ?? Sent(string.Concat(CellText.Cells(text).Select(c => c.Sign)))
            ?? Sent(CellText.Fit(text, 30, "~")) ?? Sent(string.Join(' ', CellText.Wrap(text, 30)));
    }

    private static string? Sent(Ran ran) => Sent(ran.Out) ?? Sent(ran.Error);

    private static string? Sent(string shown) =>
        shown.Where(c => char.IsControl(c) && c != '\n').Select(c => FormattableString.Invariant($"U+{(int)c:X4}")).FirstOrDefault();

    private static void Execute(SqliteConnection connection, string sql, string text)
    {
        using SqliteCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Texts of this test.
        command.CommandText = sql;
#pragma warning restore CA2100
        command.Parameters.AddWithValue("$t", text);
        command.ExecuteNonQuery();
    }

    private static List<string> Strings(SqliteConnection connection, string sql)
    {
        using SqliteCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Texts of this test.
        command.CommandText = sql;
#pragma warning restore CA2100
        using SqliteDataReader reader = command.ExecuteReader();
        var found = new List<string>();
        while (reader.Read())
        {
            found.Add(reader.GetString(0));
        }

        return found;
    }
}
