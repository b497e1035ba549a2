using System.Globalization;
using System.Text;
using System.Text.RegularExpressions;

namespace Campaigns.Torture.Outgoing;

/// <summary>T20: no exported text cell starts a formula in a spreadsheet, numbers stay numbers, and what is exported and run again is exported to the same bytes.</summary>
internal sealed partial class FormulasInText : TortureTest
{
    private static readonly string[] Starts =
        ["=", "+", "-", "@", "\uFF1D", "\uFF0B", "\uFF0D", "\uFF20", " =", "\"=", "\"\"+", "' =", "'=", "''@", "'", "''", "\u201C=", "\u00A0-", "=\"", "-\"+", "'x", "x", "+5", "-"];

    private static readonly string[] Fields = ["experiment", "title", "response", "unit", "groups", "control", "family", "confirms", "shared_control", "specimen", "block", "reason", "by"];

    private static readonly HashSet<string> NumberColumns =
    [
        "value", "statistic", "df", "df1", "df2", "p", "adjusted_p", "ln_p", "eta_squared", "omega_squared", "epsilon_squared", "cohen_f", "difference", "lower", "upper", "selected_lower", "selected_upper",
    ];

    public override string Key => "T20";

    public override string What => "formulas in text cells, and what is exported runs again";

    public override int Full => 1000;

    public override int Short => 20;

    public override void Run(Tally tally, int tries, Random random)
    {
        // Every start in every field, then random catalogs with starts in all fields at once.
        foreach (string start in Starts)
        {
            var texts = Fields.ToDictionary(f => f, _ => start + "1", StringComparer.Ordinal);
            tally.Try($"start {start} in every field", () => Fault(texts, Campaign(texts, 2, random), withRecord: true));
        }

        for (int i = 0; i < tries; i++)
        {
            var texts = Fields.ToDictionary(f => f, _ => Starts[random.Next(Starts.Length)] + Tail(random), StringComparer.Ordinal);
            tally.Try(string.Create(CultureInfo.InvariantCulture, $"catalog {i}: {string.Join(" ", texts.Values)}"), () => Fault(texts, Campaign(texts, random.Next(1, 4), random), withRecord: i % 10 == 0));
        }
    }

    private static string Tail(Random random) => random.Next(6) switch
    {
        0 => "1+1",
        1 => "HYPERLINK(\"x\",\"y\")",
        2 => "cmd, 'a'!A1",
        3 => "SUM(1;2)",
        4 => "5 %",
        _ => string.Create(CultureInfo.InvariantCulture, $"{random.Next(100)}"),
    };

    private static (string Plan, string Data) Campaign(Dictionary<string, string> texts, int experiments, Random random)
    {
        var plan = new StringBuilder("experiment,title,response,unit,groups,control,test,follow_up,family,confirms,shared_control\n");
        var data = new StringBuilder("experiment,group,value,specimen,block\n");
        for (int e = 0; e < experiments; e++)
        {
            string code = string.Create(CultureInfo.InvariantCulture, $"{texts["experiment"]}{e}"), first = texts["groups"] + "a", second = texts["control"] + "b";
            Row(plan, code, texts["title"], texts["response"], texts["unit"], $"{first}|{second}", second, "f", "dunnett", texts["family"], e == 0 ? "" : $"{texts["experiment"]}0", texts["shared_control"]);
            for (int i = 0; i < 6; i++)
            {
                string value = ((random.NextDouble() * 4) - 2 + (i % 2)).ToString("0.000", CultureInfo.InvariantCulture);
                Row(data, code, i % 2 == 0 ? first : second, value, string.Create(CultureInfo.InvariantCulture, $"{texts["specimen"]}{e}{i}"), texts["block"]);
            }
        }

        return (plan.ToString(), data.ToString());
    }

    /// <summary>A row as this test types it: a text that a reader would take for a guarded one is guarded once more, by a rule of its own.</summary>
    private static void Row(StringBuilder file, params string[] cells) =>
        file.AppendJoin(',', cells.Select(c => $"\"{(LooksGuarded().IsMatch(c) ? "'" + c : c).Replace("\"", "\"\"", StringComparison.Ordinal)}\"")).Append('\n');

    private static string? Fault(Dictionary<string, string> texts, (string Plan, string Data) campaign, bool withRecord)
    {
        using var bench = new Workbench();
        Directory.CreateDirectory(Path.Combine(bench.At("in"), "measurements"));
        bench.Write("in/campaign.json", """{"code": "C", "title": "=t", "purpose": "+p", "errorRate": "familywise", "level": 0.05, "correction": "holm", "test": "f", "followUp": "none"}""");
        bench.Write("in/plan.csv", campaign.Plan);
        bench.Write("in/measurements/=1+1.csv", campaign.Data);
        Ran ran = bench.Run("run", bench.At("in"));
        if (ran.Code != 0)
        {
            return $"the campaign was refused: {ran.Error}";
        }

        bench.Run("export", "C", "--out", bench.At("out"));
        if (FormulaIn(bench.At("out")) is { } found)
        {
            return found;
        }

        Ran again = bench.Run("run", bench.At("out"), "--catalog", bench.At("second.db"));
        if (again.Code != 0)
        {
            return $"the export was refused: {again.Error}";
        }

        bench.Run("export", "C", "--out", bench.At("out2"), "--catalog", bench.At("second.db"));
        foreach (string file in (string[])["campaign.json", "plan.csv", "results.csv", "comparisons.csv"])
        {
            if (File.ReadAllText(Path.Combine(bench.At("out"), file)) != File.ReadAllText(Path.Combine(bench.At("out2"), file)))
            {
                return $"{file} changed: {File.ReadAllText(Path.Combine(bench.At("out2"), file))}";
            }
        }

        string[] typed = Texts(bench.At("out")), back = Texts(bench.At("out2"));
        return !typed.SequenceEqual(back) ? "the measurements changed" : withRecord ? FaultOfRecord(bench, texts) : null;
    }

    /// <summary>What people say about a campaign afterwards goes out as guarded as what they planned.</summary>
    private static string? FaultOfRecord(Workbench bench, Dictionary<string, string> texts)
    {
        string code = (texts["experiment"] + "0").Trim(); // Blanks around a name are no part of it.
        string[] said = [$"--reason={texts["reason"]}", $"--as={texts["by"]}"];
        var amended = new StringBuilder("experiment,title,response,unit,groups,control,test,follow_up,family,confirms,shared_control\n");
        Row(amended, code, texts["title"] + " amended", texts["response"], texts["unit"], $"{texts["groups"]}a|{texts["control"]}b", texts["control"] + "b", "f", "dunnett", texts["family"], "", texts["shared_control"]);
        string[][] deeds = [["plan", "C", bench.Write("amended.csv", amended.ToString()), .. said], ["exclude", .. said, "--line", "2", "--", "C", code], ["withdraw", .. said, "--", "C", code]];
        foreach (string[] deed in deeds)
        {
            if (bench.Run(deed) is { Code: not 0 } refused)
            {
                return $"{deed[0]} was refused: {refused.Error}";
            }
        }

        bench.Run("export", "C", "--out", bench.At("out3"));
        return new[] { "sealed-plan.csv", "amendments.csv", "exclusions.csv", "withdrawals.csv", "ledger.csv" }.FirstOrDefault(f => !File.Exists(Path.Combine(bench.At("out3"), f))) is { } absent
            ? $"{absent} was not exported"
            : FormulaIn(bench.At("out3"));
    }

    /// <summary>The measurements without file and line, which are those of the export the second time.</summary>
    private static string[] Texts(string folder) =>
        [.. Rows(File.ReadAllText(Path.Combine(folder, "measurements", "measurements.csv"))).Select(r => string.Join('\u0001', r[..6]))];

    private static string? FormulaIn(string folder)
    {
        foreach (string file in Directory.GetFiles(folder, "*.csv", SearchOption.AllDirectories))
        {
            if (FormulaIn(Path.GetFileName(file), File.ReadAllText(file)) is { } found)
            {
                return found;
            }
        }

        return null;
    }

    private static string? FormulaIn(string file, string text)
    {
        List<string[]> rows = Rows(text);
        foreach (string[] row in rows)
        {
            for (int i = 0; i < row.Length; i++)
            {
                string cell = row[i], start = cell.TrimStart(' ', '"', '\u00A0', '\u201C');
                bool isNumber = NumberColumns.Contains(rows[0][i]);
                if (isNumber && cell.Length > 0 && row != rows[0] && !double.TryParse(cell, NumberStyles.Float, CultureInfo.InvariantCulture, out _))
                {
                    return $"{file}: the number '{cell}' is none any more";
                }

                if (start.Length > 0 && "=+-@\uFF1D\uFF0B\uFF0D\uFF20\t\r".Contains(start[0], StringComparison.Ordinal) && !isNumber)
                {
                    return $"{file}: the cell '{cell}' starts a formula";
                }
            }
        }

        return null;
    }

    [GeneratedRegex("^'+[ \u00A0\"\u201C]*[=+@\uFF1D\uFF0B\uFF0D\uFF20-]")]
    private static partial Regex LooksGuarded();

    private static List<string[]> Rows(string text)
    {
        var rows = new List<string[]>();
        var row = new List<string>();
        var cell = new StringBuilder();
        bool quoted = false;
        for (int i = 0; i < text.Length; i++)
        {
            char c = text[i];
            if (c == '"' && quoted && i + 1 < text.Length && text[i + 1] == '"')
            {
                cell.Append('"');
                i++;
            }
            else if (c == '"')
            {
                quoted = !quoted;
            }
            else if (!quoted && c is ',' or '\n' && !quoted)
            {
                row.Add(cell.ToString());
                cell.Clear();
                if (c == '\n')
                {
                    rows.Add([.. row]);
                    row.Clear();
                }
            }
            else
            {
                cell.Append(c);
            }
        }

        return rows;
    }
}
