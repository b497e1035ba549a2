using System.Globalization;
using System.Text;
using Campaigns.App.Commands;

namespace Campaigns.Torture.Incoming;

/// <summary>T15b: files that are small to write and large to read, through the real program: answered in time, in bounded memory, with a place and a reason, and nothing is left of what was refused.</summary>
internal sealed class Bombs : TortureTest
{
    private const int Million = 1_000_000;

    private static readonly TimeSpan Longest = TimeSpan.FromMinutes(2);

    /// <summary>The most of memory that a refusal may take.</summary>
    private const int RefusalMegabytes = 256;

    /// <summary>The most for a plan of a million experiments, which is kept in memory once.</summary>
    private const int PlanMegabytes = 1024;

    public override string Key => "T15b";

    public override string What => "JSON bombs and plans of a million lines";

    public override int Full => 14;

    public override int Short => 11;

    public override void Run(Tally tally, int tries, Random random)
    {
        foreach ((string name, string json) in Jsons())
        {
            tally.Try(name, () => Described(json, ExitCode.Refused));
        }

        tally.Try("a number of 900,000 digits, which is a level all the same", () => Described("{\"code\":\"C\",\"level\":0." + new string('1', 900_000) + "}", ExitCode.Done));

        tally.Try("a plan of a million wrong lines", () => Planned("experiment,replicates\n", i => FormattableString.Invariant($"E{i},many\n"), ExitCode.Refused, RefusalMegabytes));
        if (tries < Full)
        {
            return;
        }

        tally.Try("a plan of a million lines", () => Planned("experiment,groups,replicates\n", i => FormattableString.Invariant($"E{i},A|B|C,4\n"), ExitCode.Done, PlanMegabytes));
        tally.Try("a plan of a million times the same line", () => Planned("experiment\n", _ => "E\n", ExitCode.Refused, RefusalMegabytes));
        tally.Try("a plan with a million groups in one cell", () => Planned("experiment,groups\n", i => i == 0 ? $"E,{string.Join('|', Enumerable.Range(0, Million))}\n" : "", ExitCode.Refused, RefusalMegabytes));
    }

    private static IEnumerable<(string Name, string Json)> Jsons()
    {
        yield return ("100,000 brackets", "{\"code\":\"C\",\"title\":" + new string('[', 100_000) + new string(']', 100_000) + "}");
        yield return ("100,000 braces", string.Concat(Enumerable.Repeat("{\"code\":", 100_000)) + "1" + new string('}', 100_000));
        yield return ("a title of 64 MB", "{\"code\":\"C\",\"title\":\"" + new string('x', 64 << 20) + "\"}");
        yield return ("100,000 keys", "{" + string.Join(',', Enumerable.Range(0, 40_000).Select(i => FormattableString.Invariant($"\"k{i}\":1"))) + "}");
        yield return ("the same key 40,000 times", "{" + string.Join(',', Enumerable.Repeat("\"code\":\"C\"", 40_000)) + "}");
        yield return ("an exponent beyond all", "{\"code\":\"C\",\"level\":1e-999999999}");
        yield return ("a million escapes", "{\"code\":\"C\",\"title\":\"" + string.Concat(Enumerable.Repeat("\\u0041", 150_000)) + "\"}");
        yield return ("blanks without end", "{\"code\":\"C\"" + new string(' ', 64 << 20));
        yield return ("nothing but a bracket", "{");
    }

    private static string? Described(string json, int expected)
    {
        using var bench = new Workbench();
        Directory.CreateDirectory(bench.At("f"));
        bench.Write("f/campaign.json", json);
        bench.Write("f/plan.csv", "experiment\nE1\n");
        (Ran ran, long? peak) = bench.RunMeasured(Longest, "run", bench.At("f"));
        bool isTold = expected == ExitCode.Done || ran.Error.Contains("campaign.json", StringComparison.Ordinal);
        return ran.Code != expected || !isTold || ran.Error.Length > 40_000 ? $"exit code {ran.Code}: {ran.Error[..Math.Min(300, ran.Error.Length)]}"
            : File.Exists(bench.Catalog) != (expected == ExitCode.Done) ? "a catalog was left, or none was made"
            : peak > RefusalMegabytes ? FormattableString.Invariant($"took {peak} MB") : null;
    }

    private static string? Planned(string head, Func<int, string> line, int expected, int megabytes)
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        var text = new StringBuilder(head, 24 * Million);
        for (int i = 0; i < Million; i++)
        {
            text.Append(line(i));
        }

        (Ran ran, long? peak) = bench.RunMeasured(Longest, "plan", "C", bench.Write("p.csv", text.ToString()));
        string rows = bench.Run("list", "--format", "csv").Out.Split('\n')[1];
        bool isEmpty = !rows.Contains(Million.ToString(CultureInfo.InvariantCulture), StringComparison.Ordinal);
        return ran.Code != expected || ran.Error.Length > 40_000 ? $"exit code {ran.Code}: {ran.Error[..Math.Min(300, ran.Error.Length)]}"
            : isEmpty != (expected != ExitCode.Done) ? $"the catalog holds {rows}"
            : peak > megabytes ? FormattableString.Invariant($"took {peak} MB") : null;
    }
}
