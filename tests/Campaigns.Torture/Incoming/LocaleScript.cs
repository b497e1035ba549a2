using System.Globalization;
using System.Text;
using System.Text.RegularExpressions;

namespace Campaigns.Torture.Incoming;

/// <summary>A day's work that uses every command, with names and numbers that a locale could take for something else, and what the program said to each.</summary>
/// <param name="bench">Where it happens.</param>
/// <param name="run">Runs one command.</param>
/// <param name="hidesInstants">Whether instants and what is computed from them are blanked out, where the clock goes on.</param>
internal sealed partial class LocaleScript(Workbench bench, Func<string[], Ran> run, bool hidesInstants)
{
    private static readonly string[] Formats = ["table", "csv", "json"];

    private readonly List<(string Command, string Text)> _said = [];

    /// <summary>Commands that rows are asked of, in all three formats.</summary>
    private static readonly string[] Questions =
    [
        "list", "show C", "show C INDIGO", "show C INDIGO --observations", "results C", "survivors C", "comparisons C", "corrections C", "corrections C --by-experiment", "corrections C --near-misses", "risk", "risk C", "risk C --curve",
        "risk --pooled --correction bh --level 0.05", "bound C --all-survivors", "bound C --curve", "overall C", "families F", "decisions O", "results O", "permute P --draws 199", "reviews C", "reviews F --families",
        "reviews C --lines 1", "reviews C --compare 1 2", "reviews C --rerun all", "history C", "history C --changed", "ledger", "ledger C", "ledger verify", "show C --plan", "show C --sealed-plan", "show C --amendments", "show C --withdrawals", "size --groups 3 --effect 0.25,0.4 --power 0.8", "size --campaign 20 --effect 0.4 --groups 3 --share-real 0.1",
        "adjust p.csv", "adjust p.csv --correction lord --level 0.05", "restore-check copy.db",
    ];

    /// <summary>What was said so far.</summary>
    public IReadOnlyList<(string Command, string Text)> Said => _said;

    /// <summary>Does all of it, and asks everything.</summary>
    /// <param name="inAllFormats">Whether every question is asked in every format, not in one in turn.</param>
    public IReadOnlyList<(string Command, string Text)> Run(bool inAllFormats)
    {
        Work();
        if (inAllFormats)
        {
            Ask(Formats);
            return _said;
        }

        return AskInTurn();
    }

    /// <summary>Asks everything, the first question in the first of the formats, the next in the next, and so on where there are fewer than all; then misspelt things, and the exported files.</summary>
    public IReadOnlyList<(string Command, string Text)> AskInTurn()
    {
        for (int q = 0; q < Questions.Length; q++)
        {
            Ask(Questions[q], Formats[q % Formats.Length]);
        }

        AskOnce();
        return _said;
    }

    private void Ask(string[] formats)
    {
        foreach (string question in Questions)
        {
            foreach (string format in formats)
            {
                Ask(question, format);
            }
        }

        AskOnce();
    }

    private void Ask(string question, string format) =>
        Say([.. question.Split(' ').Select(w => w.EndsWith(".csv", StringComparison.Ordinal) || w.EndsWith(".db", StringComparison.Ordinal) ? bench.At(w) : w), "--format", format]);

    private void AskOnce()
    {
        Say("results", "NO SUCH");
        Say("resluts", "C");
        Say("completion", "bash");
        Say("--help");
        foreach (string campaign in new[] { "C", "F", "O" })
        {
            Say("report", campaign);
            Say("report", campaign, "--format", "markdown");
        }

        Say("plot", "C", "INDIGO");
        Say("plot", "C", "INDIGO", "--figure", "comparisons");
        foreach (string figure in new[] { "survivors", "ranking", "p-values", "risk", "corrections", "reviews" })
        {
            Say("plot", "C", "--figure", figure);
        }

        Say("export", "C", "--out", bench.At("out"));
        foreach (string file in Directory.EnumerateFiles(bench.At("out"), "*", SearchOption.AllDirectories).Order(StringComparer.Ordinal))
        {
            _said.Add((file[bench.Folder.Length..], Blank(ExportedAt().Replace(File.ReadAllText(file), "\"exported_at\": \"INSTANT\""))));
        }

        Say("export", "C", "--originals", "--out", bench.At("loaded"));
        _said.Add(("originals.csv", Blank(File.ReadAllText(bench.At("loaded/originals.csv")))));
    }

    /// <summary>Commands that the script leaves out; empty where it uses all of them.</summary>
    public static IReadOnlyList<string> LeftOut(string help, IReadOnlyList<(string Command, string Text)> said)
    {
        var used = said.Select(s => s.Command.Split(' ')[0]).ToHashSet(StringComparer.Ordinal);
        string list = help[help.IndexOf("Commands:", StringComparison.Ordinal)..help.IndexOf("Example:", StringComparison.Ordinal)];
        return [.. Command().Matches(list).Select(m => m.Groups[1].Value).Where(c => !used.Contains(c) && c != "dashboard")];
    }

    private void Prepare()
    {
        Directory.CreateDirectory(bench.At("P/measurements"));
        bench.Write("P/campaign.json", """{"code": "P", "title": "İstanbul ırmağı", "purpose": "", "errorRate": "familywise", "level": 0.05, "correction": "holm", "test": "f", "followUp": "tukey-kramer"}""");
        bench.Write("P/plan.csv", "experiment,groups,test\nI1,i|I|ı,f\nI2,i|I|ı,f\nI10,i|I|ı,permutation\n");
        bench.Write("P/measurements/a.csv", Values(["I1", "I2", "I10"], ["i", "I", "ı"], ',', '.', withSpecimens: true));
        bench.Write("plan.csv", "experiment,title,groups,control,test,follow_up,replicates,smallest_effect,assumed_sd\nINDIGO,Füllgrad 1.234.567,a|b|c,a,f,dunnett,4,0.5,0.25\nindigo,ملء,a|b|c,a,welch,games-howell,4,0.5,\nıI,پر کردن,a|b|c,,kruskal-wallis,none,,,\n");
        bench.Write("comma.csv", Values(["INDIGO", "indigo"], ["a", "b", "c"], ';', ',', withSpecimens: false));
        bench.Write("later.csv", Values(["ıI"], ["a", "b", "c"], ',', '.', withSpecimens: false));
        bench.Write("late.csv", "experiment,group,value\nINDIGO,a,1234.5\nINDIGO,b,-1e-3\n");
        bench.Write("fplan.csv", "experiment,groups,family,weight\nE1,a|b,first,1.5\nE2,a|b,second,0.5\n");
        bench.Write("families.csv", "family,correction,level,opens_after,opens_when\nfirst,holm,0.02,,\nsecond,holm,0.03,first,any\n");
        bench.Write("f.csv", Values(["E1", "E2"], ["a", "b"], ',', '.', withSpecimens: false));
        bench.Write("o.csv", Values(["E1", "E2", "E3"], ["a", "b"], '\t', '.', withSpecimens: false));
        bench.Write("p.csv", "name,p\nİ,0.001\ni,1e-12\nI,0.049999999999999996\nı,0.5\n");
    }

    /// <summary>Does what changes the catalog.</summary>
    public void Work()
    {
        Prepare();
        Say("run", bench.At("P"));
        Say("start", "C", "--title", "Istanbul", "--level", "0.05", "--correction", "bh");
        Say("plan", "C", bench.At("plan.csv"));
        Say("seal", "C");
        Say("load", "C", bench.At("comma.csv"), "--decimal", "comma");
        Say("test", "C");
        Say("review", "C");
        Say("load", "C", bench.At("later.csv"), "--format", "csv");
        Say("load", "C", bench.At("late.csv"));
        Say("load", "C", bench.At("late.csv"), "--amend", "iki İnce şişe", "--format", "json");
        Say("test", "C", "--incomplete");
        Say("exclude", "C", "indigo", "--line", "9", "--reason", "çizik");
        Say("plan", "C", bench.Write("amended.csv", "experiment,title\nIĞDIR,İ\n"), "--reason", "ışık değişti");
        Say("withdraw", "C", "IĞDIR", "--reason", "geri alındı");
        Say("test", "C", "--format", "json");
        Say("review", "C", "--format", "csv");
        Say("start", "F", "--error-rate", "familywise", "--correction", "holm");
        Say("plan", "F", bench.At("fplan.csv"));
        Say("families", "F", bench.At("families.csv"));
        Say("seal", "F", "--format", "json");
        Say("load", "F", bench.At("f.csv"));
        Say("test", "F");
        Say("review", "F");
        Say("start", "O", "--correction", "lord", "--horizon", "5");
        Say("plan", "O", bench.Write("oplan.csv", "experiment,groups\nE1,a|b\nE2,a|b\nE3,a|b\nE4,a|b\n"));
        Say("seal", "O");
        Say("register", "O", "E2", "--format", "csv");
        Say("load", "O", bench.At("o.csv"));
        Say("test", "O");
        Say("review", "O");
        Say("restream", "O", "--correction", "saffron", "--reason", "yeni akış");
        Say("upgrade");
        Say("backup", bench.At("copy.db"));
    }

    private void Say(params string[] arguments)
    {
        Ran ran = run(arguments);
        string text = string.Create(CultureInfo.InvariantCulture, $"exit {ran.Code}\n{ran.Out}\n{ran.Error}").Replace(bench.Folder, "FOLDER", StringComparison.Ordinal)
            .Replace("Campaigns.Torture", "campaigns", StringComparison.Ordinal); // The name of the process, in its help.
        _said.Add((string.Join(' ', arguments).Replace(bench.Folder, "FOLDER", StringComparison.Ordinal), Blank(text)));
    }

    private string Blank(string text) => hidesInstants ? Hash().Replace(Instant().Replace(text, "INSTANT"), "HASH") : text;

    /// <summary>Four values of each group: of the first experiment apart, of the others alike, with thousands, small ones and negative ones among them.</summary>
    private static string Values(string[] experiments, string[] groups, char separator, char mark, bool withSpecimens)
    {
        var text = new StringBuilder($"experiment{separator}group{separator}value{(withSpecimens ? $"{separator}specimen" : "")}\n");
        for (int e = 0; e < experiments.Length; e++)
        {
            for (int g = 0; g < groups.Length; g++)
            {
                for (int v = 0; v < 4; v++)
                {
                    decimal value = (e == 0 ? 1000m * g : -0.001m) + (0.25m * v) + (0.125m * ((g * 7 + v * 3 + e) % 5));
                    text.Append(experiments[e]).Append(separator).Append(groups[g]).Append(separator).Append(value.ToString(CultureInfo.InvariantCulture).Replace('.', mark));
                    text.Append(withSpecimens ? $"{separator}s{v}" : "").Append('\n');
                }
            }
        }

        return text.ToString();
    }

    [GeneratedRegex(@"\d{4}-\d\d-\d\d[T ]\d\d:\d\d(:\d\d)?(\.\d+)?(Z| UTC)?")]
    private static partial Regex Instant();

    /// <summary>The clock of a process goes on; in any other form than this the text stays, and differs.</summary>
    [GeneratedRegex("\"exported_at\": \"[0-9]{4}-[0-9]{2}-[0-9]{2}T[0-9]{2}:[0-9]{2}:[0-9]{2}Z\"")]
    private static partial Regex ExportedAt();

    [GeneratedRegex("[0-9a-f]{64}")]
    private static partial Regex Hash();

    [GeneratedRegex(@"^  ([a-z-]+)", RegexOptions.Multiline)]
    private static partial Regex Command();
}
