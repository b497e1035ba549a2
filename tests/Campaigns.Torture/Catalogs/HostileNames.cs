using System.Text;
using System.Text.Json;
using Campaigns.App.Commands;
using Campaigns.Catalog.Loading;

namespace Campaigns.Torture.Catalogs;

/// <summary>T13: hostile texts in every field that takes text come back as they were, or are refused with a reason; nothing of them is ever executed.</summary>
internal sealed class HostileNames : TortureTest
{
    private static readonly string[] Starts =
    [
        "'; DROP TABLE experiments; --", "\" OR 1=1 --", "x'); DELETE FROM loads; --", "Robert\"); UPDATE reviews SET survivor_count = 0; --", "%s%n%x", "{0}", "$(rm -rf .)", "`id`", "../../etc/passwd",
        "a|b", "\"", "'", "\\", "\\u0000", "NULL", "nan", "-", "--", "@file", "=1+1", "&lt;script&gt;", "<script>alert(1)</script>", "\u202Egpj.exe", "\u200Fright", "\u2066isolated\u2069",
        "e\u0301", "\uFB01", "\u0130stanbul", "\u00DF", "\uD83E\uDDEA", "\u0000", "a\u0000b", "\uD800", "a\uDFFFb", "\uFEFFmark", "\u2028", "\uFFFF", "  blank  ", "\t", "\r\n",
    ];

    private static readonly (string Name, Func<Workbench, string, string?> Try)[] Fields =
    [
        ("title typed", TitleTyped), ("title in campaign.json", TitleInJson), ("experiment and its words in a plan", Planned), ("experiment and group in a file", Measured), ("reason and name of an exclusion", Excluded),
    ];

    public override string Key => "T13";

    public override string What => "hostile names in every text field";

    public override int Full => 700;

    public override int Short => 100;

    public override void Run(Tally tally, int tries, Random random)
    {
        string[] texts = [.. Starts, .. Controls().Select(c => $"a{c}b"), new string('x', 201), new string('y', 1 << 20), .. Enumerable.Range(0, 40).Select(_ => AtRandom(random))];
        (string Field, string Text, Func<Workbench, string, string?> Test)[] all = [.. texts.SelectMany(text => Fields.Select(f => (f.Name, text, f.Try)))];

        // Fewer tries than combinations are spread over all of them.
        for (int i = 0; i < tries; i++)
        {
            (string field, string text, Func<Workbench, string, string?> test) = all[(int)((long)i * all.Length / tries)];
            tally.Try($"{field}: {JsonSerializer.Serialize(text[..Math.Min(40, text.Length)])}", () =>
            {
                using var bench = new Workbench();
                return test(bench, text) ?? Whole(bench);
            });
        }
    }

    /// <summary>The 65 controls: C0, DEL and C1.</summary>
    public static IEnumerable<char> Controls() => Enumerable.Range(0, 0xA0).Select(c => (char)c).Where(char.IsControl);

    private static string AtRandom(Random random)
    {
        var text = new StringBuilder();
        for (int length = random.Next(1, 30); length > 0; length--)
        {
            text.Append(random.Next(6) switch { 0 => (char)random.Next(0x20), 1 => (char)random.Next(0x80, 0x250), 2 => (char)random.Next(0x2000, 0x2070), 3 => (char)random.Next(0xD800, 0xE000), _ => (char)random.Next(0x20, 0x7F) });
        }

        return text.ToString();
    }

    private static string? TitleTyped(Workbench bench, string text)
    {
        Ran ran = bench.Run("start", "C", "--title=" + text);
        return ran.Code == ExitCode.Done ? Same(text, Show(bench).GetProperty("title").GetString()) : Refusal(ran, bench, campaigns: 0);
    }

    private static string? TitleInJson(Workbench bench, string text)
    {
        Directory.CreateDirectory(bench.At("f"));
        bench.Write("f/campaign.json", $"{{\"code\":\"C\",\"title\":{Json(text)}}}");
        bench.Write("f/plan.csv", "experiment\nE1\n");
        Ran ran = bench.Run("run", bench.At("f"));
        return ran.Code == ExitCode.Done ? Same(Composition.Compose(text.Trim()), Show(bench).GetProperty("title").GetString()?.Trim()) : Refusal(ran, bench, campaigns: 0);
    }

    private static string? Planned(Workbench bench, string text)
    {
        bench.Run("start", "C");
        Ran ran = bench.Run("plan", "C", bench.Write("p.csv", $"experiment,title,response,unit\n{Quote(text)},{Quote(text)},{Quote(text)},{Quote(text)}\n"));
        return ran.Code == ExitCode.Done ? Same(Clean(text), FirstExperiment(bench)) : Refusal(ran, bench, campaigns: 1);
    }

    private static string? Measured(Workbench bench, string text)
    {
        bench.Run("start", "C");
        string q = Quote(text);
        Ran ran = bench.Run("load", "C", bench.Write("m.csv", $"experiment,group,value\n{q},{q},1\n{q},{q},2\n{q},other,3\n{q},other,4.5\n"));
        if (ran.Code != ExitCode.Done)
        {
            return Refusal(ran, bench, campaigns: 1);
        }

        bench.Run("seal", "C");
        bench.Run("test", "C");
        return Same(Clean(text), FirstExperiment(bench));
    }

    private static string? Excluded(Workbench bench, string text)
    {
        bench.Run("start", "C");
        bench.Run("load", "C", bench.Write("m.csv", "experiment,group,value\nE,A,1\nE,A,2\nE,B,3\nE,B,4\n"));
        Ran ran = bench.Run("exclude", "C", "E", "--line", "2", "--reason=" + text, "--as=" + text);
        if (ran.Code != ExitCode.Done)
        {
            return Refusal(ran, bench, campaigns: 1);
        }

        using var catalog = Catalog.Catalog.Open(bench.Catalog, bench.Clock);
        var row = catalog.Context.Exclusions.Single();
        return Same(text.Trim(), row.Reason) ?? Same(text.Trim(), row.NamedBy);
    }

    private static string? Same(string asked, string? kept) => asked == kept ? null : $"came back as {JsonSerializer.Serialize(kept?[..Math.Min(60, kept.Length)])}";

    /// <summary>A refusal has the exit code of one, a sentence, and leaves nothing of what was asked.</summary>
    private static string? Refusal(Ran ran, Workbench bench, int campaigns)
    {
        if (ran.Code is not (ExitCode.WrongUsage or ExitCode.Refused) || ran.Error.Trim().Length < 10)
        {
            return $"exit code {ran.Code}: {ran.Error}";
        }

        if (!File.Exists(bench.Catalog))
        {
            return null;
        }

        using var catalog = Catalog.Catalog.Open(bench.Catalog, bench.Clock);
        bool left = catalog.Context.Campaigns.Count() != campaigns || catalog.Context.Exclusions.Any() || (catalog.Context.Experiments.Any() && !catalog.Context.Loads.Any());
        return left ? "refused, and something was left" : null;
    }

    /// <summary>Nothing of a text was executed: every table is there, and no row is without those it belongs to.</summary>
    private static string? Whole(Workbench bench)
    {
        if (!File.Exists(bench.Catalog))
        {
            return null;
        }

        Ran verified = bench.Run("ledger", "verify");
        return verified.Code == ExitCode.Done ? null : $"the record is not whole: {verified.Out}{verified.Error}";
    }

    private static JsonElement Show(Workbench bench) => JsonDocument.Parse(bench.Run("show", "C", "--format", "json").Out).RootElement[0];

    private static string? FirstExperiment(Workbench bench) => JsonDocument.Parse(bench.Run("results", "C", "--format", "json").Out).RootElement[0].GetProperty("experiment").GetString();

    /// <summary>A name as files give it: trimmed and composed.</summary>
    private static string Clean(string text) => Composition.Compose(Written(text).Trim());

    /// <summary>A text as a file of UTF-8 holds it: half of a character cannot be written.</summary>
    private static string Written(string text) => Encoding.UTF8.GetString(Encoding.UTF8.GetBytes(text));

    private static string Quote(string text) => $"\"{text.Replace("\"", "\"\"", StringComparison.Ordinal)}\"";

    private static string Json(string text) => "\"" + string.Concat(text.Select(c => FormattableString.Invariant($"\\u{(int)c:x4}"))) + "\"";
}
